import { eq, type SQL, sql } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { book } from '@/db/schema/book'
import type { Change } from '@/lib/book/change'
import type { Kind } from '@/lib/book/kinds'
import { type BookState, bookOf } from '@/lib/book/state'
import { kindTables, type RowKind, rowKinds } from './tables'

/** Rows to a statement: large enough to be quick, small enough to keep its one parameter within a few megabytes. */
const chunk = 5000

type Named = { kind: Kind; id: string }

/**
 * Does to the rows of a book what a change did to its state: removals, then updates, then creations. Foreign keys and tags
 * are settled at commit, so the order within one change is free. A row that is not as expected is a bug and throws.
 */
export async function writeRows(tx: Transaction, bookId: string, after: BookState, change: Change): Promise<void> {
  const removed = idsByKind(change.remove)
  const created = idsByKind(change.create)
  const updated = idsByKind(change.update)
  for (const kind of [...rowKinds].reverse())
    await inChunks(kind, removed.get(kind), (ids) => deleteRows(kind, bookId, ids), tx)
  for (const kind of rowKinds) {
    const recordsOf = (ids: readonly string[]) => JSON.stringify(ids.map((id) => after[kind].get(id)))
    await inChunks(kind, updated.get(kind), (ids) => updateRows(kind, bookId, recordsOf(ids)), tx)
    await inChunks(kind, created.get(kind), (ids) => insertRows(kind, bookId, recordsOf(ids)), tx)
  }
  if (updated.has('book')) await updateBook(tx, bookId, after)
}

function idsByKind(records: readonly Named[]): Map<Kind, Set<string>> {
  const ids = new Map<Kind, Set<string>>()
  for (const { kind, id } of records) ids.set(kind, (ids.get(kind) ?? new Set()).add(id))
  return ids
}

async function inChunks(
  kind: RowKind,
  all: ReadonlySet<string> | undefined,
  statement: (ids: string[]) => SQL,
  tx: Transaction,
): Promise<void> {
  const ids = [...(all ?? [])]
  for (let at = 0; at < ids.length; at += chunk) {
    const some = ids.slice(at, at + chunk)
    const { rowCount } = await tx.execute(statement(some))
    if (rowCount !== some.length) throw new Error(`Wrote ${rowCount} rows of ${kind} where ${some.length} were due`)
  }
}

const names = (list: readonly { name: string }[]): SQL =>
  sql.join(
    list.map(({ name }) => sql.identifier(name)),
    sql`, `,
  )

/** The records of a JSON array as rows. Keys of the JSON are field names, so they are renamed to columns on the way. */
function rowsOf(kind: RowKind, records: string): SQL {
  const shape = kindTables[kind].fields.map(({ field, type }) => sql`${sql.identifier(field)} ${sql.raw(type)}`)
  const renamed = kindTables[kind].fields.map(
    ({ field, name }) => sql`${sql.identifier(field)} as ${sql.identifier(name)}`,
  )
  return sql`(select ${sql.join(renamed, sql`, `)} from jsonb_to_recordset(${records}::jsonb) as sent(${sql.join(shape, sql`, `)}))`
}

function deleteRows(kind: RowKind, bookId: string, ids: string[]): SQL {
  return sql`delete from ${kindTables[kind].table} where book_id = ${bookId} and id = any(${sql.param(ids)}::text[])`
}

function insertRows(kind: RowKind, bookId: string, records: string): SQL {
  const { table, fields } = kindTables[kind]
  return sql`insert into ${table} (book_id, ${names(fields)}) select ${bookId}, ${names(fields)} from ${rowsOf(kind, records)} as new`
}

function updateRows(kind: RowKind, bookId: string, records: string): SQL {
  const { table, fields } = kindTables[kind]
  const sets = fields
    .filter(({ name }) => name !== 'id')
    .map(({ name }) => sql`${sql.identifier(name)} = new.${sql.identifier(name)}`)
  return sql`update ${table} as old set ${sql.join(sets, sql`, `)} from ${rowsOf(kind, records)} as new
    where old.book_id = ${bookId} and old.id = new.id`
}

async function updateBook(tx: Transaction, bookId: string, after: BookState): Promise<void> {
  const { name, description, documentNumber, basis, flowUnit } = bookOf(after)
  await tx.update(book).set({ name, description, documentNumber, basis, flowUnit }).where(eq(book.id, bookId))
}
