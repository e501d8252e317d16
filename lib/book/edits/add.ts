import type { RecordOf } from '../kinds'
import type { BookState } from '../state'
import { counted, type Edit, edit, listed, type MakeId, refuse } from './draft'
import { positionsAfter } from './positions'
import { type Listed, type ListedKind, listedIn, nextTag, tagBetween, takenTags } from './tags'

/** `after`: the record that the new ones follow; null: before all; left out: at the end. */
export type Added<K extends ListedKind> = {
  items: readonly Partial<Omit<RecordOf<K>, 'kind' | 'id' | 'position'>>[]
  after?: string | null
}

/** One stream or a pasted list. Without a tag: the next of the series, or 105A between 105 and 106. */
export function addStreams(state: BookState, added: Added<'stream'>, makeId: MakeId): Edit {
  return add(
    state,
    'stream',
    added,
    makeId,
    (item, base): RecordOf<'stream'> => ({
      kind: 'stream',
      name: '',
      phase: null,
      density: null,
      temperature: null,
      pressure: null,
      fractions: 'asTyped',
      differenceComponentId: null,
      cannotMeasure: null,
      note: null,
      ...item,
      ...base,
    }),
  )
}

/** A new component can be in every stream until said otherwise. */
export function addComponents(state: BookState, added: Added<'component'>, makeId: MakeId): Edit {
  return add(
    state,
    'component',
    added,
    makeId,
    (item, base): RecordOf<'component'> => ({
      kind: 'component',
      name: '',
      formula: null,
      molarMass: null,
      ...item,
      ...base,
    }),
  )
}

export function addUnits(state: BookState, added: Added<'unit'>, makeId: MakeId): Edit {
  return add(
    state,
    'unit',
    added,
    makeId,
    (item, base): RecordOf<'unit'> => ({
      kind: 'unit',
      name: '',
      unitKind: 'separator',
      balance: 'components',
      note: null,
      ...item,
      ...base,
    }),
  )
}

/** A free parameter, or one with a value. */
export function addParameters(state: BookState, added: Added<'parameter'>, makeId: MakeId): Edit {
  return add(
    state,
    'parameter',
    added,
    makeId,
    (item, base): RecordOf<'parameter'> => ({
      kind: 'parameter',
      value: null,
      note: null,
      ...item,
      ...base,
    }),
  )
}

type Base = { id: string; tag: string; position: number }

function add<K extends ListedKind>(
  state: BookState,
  kind: K,
  { items, after }: Added<K>,
  makeId: MakeId,
  complete: (item: Added<K>['items'][number], base: Base) => RecordOf<K>,
): Edit {
  const list = listedIn(state, kind)
  const at = after === undefined ? (list.at(-1)?.id ?? null) : after
  const before = at === null ? undefined : list.find(({ id }) => id === at)
  if (at !== null && !before) return refuse(`The ${kind} to put this after is no longer in the book.`)
  const typed = items.map((item) => (item as { tag?: string }).tag?.trim() ?? '')
  const tags = tagsFor(state, kind, typed, list, before)
  if ('error' in tags) return refuse(tags.error)
  const { positions, update } = positionsAfter(list, at, items.length)
  const create = items.map((item, i) =>
    complete(item, { id: makeId(), tag: tags.tags[i] as string, position: positions[i] as number }),
  )
  const label =
    create.length === 1 ? `Add ${kind} ${tags.tags[0]}` : `Add ${counted(create.length, kind)}: ${listed(tags.tags)}`
  return edit(state, makeId, label, { create, update })
}

function tagsFor(
  state: BookState,
  kind: ListedKind,
  typed: readonly string[],
  list: readonly Listed[],
  before: Listed | undefined,
): { tags: string[] } | { error: string } {
  const taken = takenTags(state, kind)
  const doubled = new Set<string>()
  for (const tag of typed) {
    if (tag !== '' && taken.has(tag)) doubled.add(tag)
    taken.add(tag)
  }
  if (doubled.size > 0)
    return { error: `There is already a ${kind} ${listed([...doubled])}: a tag stands for one ${kind}.` }
  const atEnd = before === undefined ? list.length === 0 : list.at(-1)?.id === before.id
  let previous = before?.tag ?? (list.length > 0 ? list.at(-1)?.tag : undefined)
  const tags = typed.map((tag) => {
    const chosen =
      tag !== ''
        ? tag
        : !atEnd && before !== undefined && previous !== undefined
          ? tagBetween(taken, kind, previous)
          : nextTag(taken, kind, previous)
    taken.add(chosen)
    previous = chosen
    return chosen
  })
  return { tags }
}
