import type { FieldUpdate } from '../change'
import { calledBy } from '../check'
import { renameIn } from '../formula-names'
import type { BookRecord, Kind, RecordOf } from '../kinds'
import { type BookState, bookOf } from '../state'
import { counted, type Edit, edit, type MakeId, refuse, updateOf } from './draft'
import { positionsAfter } from './positions'
import { type ListedKind, listedIn, takenTags } from './tags'

/** What a person may set directly on a record: neither its place nor what makes it that record. */
export type Settable = {
  stream: Pick<RecordOf<'stream'>, 'name' | 'phase' | 'density' | 'temperature' | 'pressure' | 'note'>
  component: Pick<RecordOf<'component'>, 'name' | 'formula' | 'molarMass'>
  unit: Pick<RecordOf<'unit'>, 'name' | 'unitKind' | 'balance' | 'note'>
  reaction: Pick<RecordOf<'reaction'>, 'name' | 'unitId'>
  parameter: Pick<RecordOf<'parameter'>, 'value' | 'note'>
  case: Pick<RecordOf<'case'>, 'name'>
  inventory: Pick<RecordOf<'inventory'>, 'value' | 'unit' | 'note'>
  book: Pick<RecordOf<'book'>, 'name' | 'description' | 'documentNumber' | 'basis' | 'flowUnit'>
}

const fieldNames: Readonly<Record<string, string>> = {
  unitKind: 'kind',
  unitId: 'unit',
  molarMass: 'molar mass',
  documentNumber: 'document number',
  flowUnit: 'flow unit',
}

/** Name, phase, density, kind of a unit, … of one record. Text fields lose blanks at both ends; an empty nullable one is null. */
export function setFields<K extends keyof Settable>(
  state: BookState,
  kind: K,
  id: string,
  fields: Partial<Settable[K]>,
  makeId: MakeId,
): Edit {
  return setManyFields(state, [{ kind, id, fields }], makeId)
}

export type FieldsOf = { [K in keyof Settable]: { kind: K; id: string; fields: Partial<Settable[K]> } }[keyof Settable]

/** The same for many records in one change, as a paste over names does. */
export function setManyFields(
  state: BookState,
  list: readonly { kind: keyof Settable; id: string; fields: object }[],
  makeId: MakeId,
): Edit {
  const merged = new Map<string, { record: BookRecord; fields: Record<string, unknown> }>()
  for (const { kind, id, fields } of list) {
    const record = (state[kind] as ReadonlyMap<string, BookRecord>).get(id)
    if (!record) return refuse(`This ${kind} is no longer in the book.`)
    const entry = merged.get(`${kind}:${id}`) ?? { record, fields: {} }
    for (const [field, value] of Object.entries(fields)) entry.fields[field] = tidy(record, field, value)
    merged.set(`${kind}:${id}`, entry)
  }
  const update = [...merged.values()].map(({ record, fields }) => updateOf(record, fields as never))
  const changed = update.filter((entry) => entry !== undefined)
  return edit(state, makeId, fieldsLabel(state, changed), { update: changed })
}

/** A book's settings. Its basis and flow unit cannot change once numbers lean on them. */
export function setBook(state: BookState, fields: Partial<Settable['book']>, makeId: MakeId): Edit {
  return setFields(state, 'book', bookOf(state).id, fields, makeId)
}

/** What to do with typed fractions of a stream that do not add up. `difference` names the component. */
export function setFractions(
  state: BookState,
  streamId: string,
  fractions: 'asTyped' | 'scale' | { difference: string },
  makeId: MakeId,
): Edit {
  const stream = state.stream.get(streamId)
  if (!stream) return refuse('This stream is no longer in the book.')
  const byDifference = typeof fractions === 'object' ? state.component.get(fractions.difference) : undefined
  if (typeof fractions === 'object' && !byDifference) return refuse('This component is no longer in the book.')
  const update = updateOf(stream, {
    fractions: typeof fractions === 'object' ? 'difference' : fractions,
    differenceComponentId: byDifference?.id ?? null,
  })
  const words = byDifference
    ? `${byDifference.tag} by difference`
    : fractions === 'scale'
      ? 'scaled to 100 %'
      : 'as typed'
  return edit(state, makeId, `Fractions of ${stream.tag}: ${words}`, { update: [update] })
}

/** A new tag. Formulas of rules that name the record are rewritten in the same change. */
export function renameTag(state: BookState, kind: ListedKind, id: string, tag: string, makeId: MakeId): Edit {
  const record = (state[kind] as ReadonlyMap<string, Extract<BookRecord, { tag: string }>>).get(id)
  if (!record) return refuse(`This ${kind} is no longer in the book.`)
  const next = tag.trim()
  if (next === '') return refuse(`A ${kind} needs a tag: ${record.tag} is kept.`)
  const taken = takenTags(state, kind)
  if (next !== record.tag.trim() && taken.has(next))
    return refuse(`There is already a ${kind} ${next}: ${record.tag} is kept.`)
  const update: (FieldUpdate | undefined)[] = [updateOf(record, { tag: next } as never)]
  if (kind === 'stream' || kind === 'component' || kind === 'parameter')
    for (const rule of state.rule.values()) {
      if (rule.ruleKind !== 'formula' || rule.text === null) continue
      const text = renameIn(rule.text, kind, record.tag.trim(), next)
      if (text === undefined)
        return refuse(
          `The formula of rule ${rule.tag} names ${record.tag}: there, “${next}” is no name that can be used.`,
        )
      update.push(updateOf(rule, { text }))
    }
  return edit(state, makeId, `Rename ${kind} ${record.tag} to ${next}`, { update })
}

/** Moves one record to follow another; null: to the front. */
export function moveAfter(state: BookState, kind: ListedKind, id: string, after: string | null, makeId: MakeId): Edit {
  const record = (state[kind] as ReadonlyMap<string, Extract<BookRecord, { position: number; tag: string }>>).get(id)
  if (!record) return refuse(`This ${kind} is no longer in the book.`)
  const all = listedIn(state, kind)
  const index = all.findIndex((other) => other.id === id)
  const label = `Move ${kind} ${record.tag}`
  if (after === id || (all[index - 1]?.id ?? null) === after) return edit(state, makeId, label, {})
  const others = all.filter((other) => other.id !== id)
  if (after !== null && !others.some((other) => other.id === after))
    return refuse(`The ${kind} to put this after is no longer in the book.`)
  const { positions, update } = positionsAfter(others, after, 1)
  return edit(state, makeId, label, { update: [...update, updateOf(record, { position: positions[0] } as never)] })
}

function tidy(record: BookRecord, field: string, value: unknown): unknown {
  if (typeof value !== 'string') return value
  const trimmed = value.trim()
  const nullable = (record as unknown as Record<string, unknown>)[field] === null || nullableText.has(field)
  return trimmed === '' && nullable ? null : trimmed
}
const nullableText = new Set(['phase', 'temperature', 'pressure', 'note', 'formula', 'unit'])

function fieldsLabel(state: BookState, changed: readonly FieldUpdate[]): string {
  const [first, ...more] = changed
  if (!first) return 'No change'
  if (more.length > 0) return `${counted(changed.length, 'record')} edited`
  const record = (state[first.kind as Kind] as ReadonlyMap<string, BookRecord>).get(first.id)
  const words = Object.entries(first.fields).map(([field, [, to]]) => {
    const shown = field === 'unitId' ? (state.unit.get(String(to))?.tag ?? to) : to
    return `${fieldNames[field] ?? field} ${shown === null || shown === '' ? 'cleared' : shown}`
  })
  const who = record ? calledBy(record) : first.kind
  return `${who[0]?.toUpperCase()}${who.slice(1)}: ${words.join(', ')}`
}
