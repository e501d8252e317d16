import { eq } from 'drizzle-orm'
import type { Runner } from '@/db/client'
import type { BookRecord, RecordOf } from '@/lib/book/kinds'
import { type BookState, stateOf } from '@/lib/book/state'
import type { BookRow } from '../door/seat'
import { stateCache } from './state-cache'
import { kindTables, rowKinds } from './tables'

/** The `book` record that a book's row holds. */
export function bookRecord(row: BookRow): RecordOf<'book'> {
  const { id, name, description, documentNumber, basis, flowUnit } = row
  return { kind: 'book', id, name, description, documentNumber, basis, flowUnit }
}

/** A book's state at its number: from memory, else from its rows. The same care as `loadState`. */
export async function stateOfBook(runner: Runner, row: BookRow): Promise<BookState> {
  return stateCache.get(row.id, row.number) ?? loadState(runner, row)
}

/** A book as its rows say. Call it where they cannot change between the queries: the book locked, or one moment read. */
export async function loadState(runner: Runner, row: BookRow): Promise<BookState> {
  const records: BookRecord[] = [bookRecord(row)]
  for (const kind of rowKinds) {
    const { table, bookId, fields } = kindTables[kind]
    const columns = Object.fromEntries(fields.map(({ field, column }) => [field, column]))
    const rows = await runner.select(columns).from(table).where(eq(bookId, row.id))
    for (const fieldsOfRow of rows) records.push({ kind, ...fieldsOfRow } as unknown as BookRecord)
  }
  return stateOf(records)
}
