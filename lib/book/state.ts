import { type BookRecord, type Kind, kindOrder, type RecordOf } from './kinds'

/** A book as records by kind and id. Never edited in place: `apply` gives a new one that shares what did not change. */
export type BookState = { readonly [K in Kind]: ReadonlyMap<string, RecordOf<K>> }

export function emptyState(): BookState {
  return Object.fromEntries(kindOrder.map((kind) => [kind, new Map()])) as never
}

/** Builds a state from records in any order. A later record of the same kind and id wins. */
export function stateOf(records: Iterable<BookRecord>): BookState {
  const state = emptyState() as { [K in Kind]: Map<string, BookRecord> }
  for (const record of records) state[record.kind].set(record.id, record)
  return state as never
}

/** Every record, kinds in an order in which each comes after those it points at. */
export function recordsOf(state: BookState): BookRecord[] {
  return kindOrder.flatMap((kind) => [...state[kind].values()])
}

/** Records in the order in which people put them: by position, ties by id, so that it is the same everywhere. */
export function inOrder<R extends { id: string; position: number }>(records: ReadonlyMap<string, R>): R[] {
  return [...records.values()].sort((a, b) => a.position - b.position || (a.id < b.id ? -1 : 1))
}

/** The one `book` record. A state without it is a bug. */
export function bookOf(state: BookState): RecordOf<'book'> {
  for (const book of state.book.values()) return book
  throw new Error('The state holds no book record')
}
