import type { FieldUpdate } from '../change'
import { isNamedIn, type NameKind } from '../formula-names'
import { type BookRecord, type Kind, kindOrder, type RecordOf, references } from '../kinds'
import type { BookState } from '../state'
import { counted, type Edit, edit, listed, type MakeId, refuse, updateOf } from './draft'

export const removeStreams = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'stream', ids, makeId)
export const removeComponents = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'component', ids, makeId)
export const removeUnits = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'unit', ids, makeId)
export const removeReactions = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'reaction', ids, makeId)
export const removeRules = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'rule', ids, makeId)
export const removeParameters = (state: BookState, ids: readonly string[], makeId: MakeId): Edit =>
  remove(state, 'parameter', ids, makeId)

type Removable = 'stream' | 'component' | 'unit' | 'reaction' | 'rule' | 'parameter' | 'inventory' | 'measure'

/** Removes records with all that leans on them: links, givens of every case, absences, coefficients, inventories, rules. */
export function remove(state: BookState, kind: Removable, ids: readonly string[], makeId: MakeId): Edit {
  const roots = [...new Set(ids)].map((id) => (state[kind] as ReadonlyMap<string, BookRecord>).get(id))
  if (roots.some((root) => root === undefined)) return refuse(`This ${nouns[kind]} is no longer in the book.`)
  const found = roots.filter((root) => root !== undefined)
  const { removed, update } = goesWith(state, found)
  return edit(state, makeId, labelOf(kind, found, removed), { update, remove: removed })
}

/** All that goes when these go, they included, and what is changed so that it can stay. For the question before removing. */
export function goesWith(
  state: BookState,
  roots: readonly BookRecord[],
): { removed: BookRecord[]; update: (FieldUpdate | undefined)[] } {
  const gone = new Map<Kind, Set<string>>(kindOrder.map((kind) => [kind, new Set<string>()]))
  const removed: BookRecord[] = []
  const kept = new Map<string, FieldUpdate | undefined>()
  let added = false
  const take = (record: BookRecord): void => {
    const ids = gone.get(record.kind) as Set<string>
    if (ids.has(record.id)) return
    ids.add(record.id)
    removed.push(record)
    added = true
  }
  for (const root of roots) take(root)
  // Kinds come after those they point at, so one pass is enough but for rules that streams take along.
  do {
    added = false
    for (const kind of kindOrder) {
      const fields = Object.entries(references[kind]).filter(([, target]) => (gone.get(target)?.size ?? 0) > 0)
      if (fields.length === 0) continue
      for (const record of state[kind].values()) {
        const leans = fields.some(([field, target]) => {
          const value = (record as unknown as Record<string, string | null>)[field]
          return value != null && gone.get(target)?.has(value)
        })
        if (!leans || gone.get(kind)?.has(record.id)) continue
        // A stream outlives the component that it had by difference.
        if (record.kind === 'stream')
          kept.set(record.id, updateOf(record, { fractions: 'asTyped', differenceComponentId: null }))
        else take(record)
      }
    }
    for (const rule of state.rule.values()) if (ruleFalls(state, rule, gone)) take(rule)
    for (const id of emptiedMeasures(state, gone)) take(state.measure.get(id) as BookRecord)
  } while (added)
  const update = [...kept].filter(([id]) => !gone.get('stream')?.has(id)).map(([, entry]) => entry)
  return { removed, update }
}

/** Rows of which a group loses its last component. */
function emptiedMeasures(state: BookState, gone: ReadonlyMap<Kind, ReadonlySet<string>>): Set<string> {
  const losing = new Set<string>()
  const left = new Set<string>()
  for (const { id, measureId, side } of state.measurePart.values())
    (gone.get('measurePart')?.has(id) ? losing : left).add(`${measureId}/${side}`)
  return new Set([...losing].filter((group) => !left.has(group)).map((group) => group.split('/')[0] as string))
}

/** A formula that names what is gone, or "same composition" of fewer than two streams. */
function ruleFalls(state: BookState, rule: RecordOf<'rule'>, gone: ReadonlyMap<Kind, ReadonlySet<string>>): boolean {
  if (rule.ruleKind === 'formula' && rule.text !== null) {
    for (const kind of ['stream', 'component', 'parameter'] as const satisfies readonly NameKind[])
      for (const id of gone.get(kind) ?? []) {
        const tag = state[kind].get(id)?.tag.trim()
        if (tag !== undefined && isNamedIn(rule.text, kind, tag)) return true
      }
    return false
  }
  if (rule.ruleKind !== 'sameComposition' || gone.get('ruleStream')?.size === 0) return false
  let before = 0
  let left = 0
  for (const { id, ruleId } of state.ruleStream.values()) {
    if (ruleId !== rule.id) continue
    before++
    if (!gone.get('ruleStream')?.has(id)) left++
  }
  return left < 2 && before > left
}

const nouns: Record<Removable, string> = {
  stream: 'stream',
  component: 'component',
  unit: 'unit',
  reaction: 'reaction',
  rule: 'rule',
  parameter: 'parameter',
  inventory: 'inventory change',
  measure: 'row',
}

/** Kinds worth naming in "with 4 givens, 2 connections". */
const named: [Kind, string][] = [
  ['given', 'given'],
  ['link', 'connection'],
  ['reaction', 'reaction'],
  ['coefficient', 'coefficient'],
  ['inventory', 'inventory change'],
  ['rule', 'rule'],
  ['measure', 'row'],
]

/** "4 givens, 2 connections and 1 rule", of records that go along; empty when nothing does. */
export function goesWithWords(removed: readonly BookRecord[], besides: Kind): string {
  const parts: string[] = []
  for (const [kind, word] of named) {
    const count = removed.filter((record) => record.kind === kind).length
    if (kind !== besides && count > 0) parts.push(counted(count, word))
  }
  return listed(parts, 10)
}

function labelOf(kind: Removable, roots: readonly BookRecord[], removed: readonly BookRecord[]): string {
  const tags = roots.map((root) => ('tag' in root ? root.tag : 'name' in root ? root.name : ''))
  const what =
    roots.length === 1 ? `${nouns[kind]} ${tags[0]}`.trim() : `${counted(roots.length, nouns[kind])} ${listed(tags)}`
  const along = goesWithWords(removed, kind)
  return along === '' ? `Remove ${what}` : `Remove ${what} with ${along}`
}
