import { type SQL, sql } from 'drizzle-orm'
import { type AnyPgColumn, check, doublePrecision, foreignKey, primaryKey, text, unique } from 'drizzle-orm/pg-core'
import { book } from './book'

/**
 * What every table of a kind of record shares. Its key holds the book, and so does every reference: no record can point
 * into another book. Nothing cascades: a removal lists all that goes with it.
 */
export const keyColumns = {
  bookId: text('book_id')
    .notNull()
    .references(() => book.id),
  id: text('id').notNull(),
}

export const reference = (name: string) => text(name).notNull()
export const maybeReference = (name: string) => text(name)
export const number = (name: string) => doublePrecision(name).notNull()
export const maybeNumber = (name: string) => doublePrecision(name)

type Keyed = { bookId: AnyPgColumn; id: AnyPgColumn }

export const keyOf = (table: string, t: Keyed) => primaryKey({ name: `${table}_pkey`, columns: [t.bookId, t.id] })

/** A later migration makes this deferrable: two tags may be swapped within one change. */
export const oneTag = (table: string, t: Keyed & { tag: AnyPgColumn }) =>
  unique(`${table}_book_id_tag_key`).on(t.bookId, t.tag)

/** A later migration makes these deferrable: a change may name what it makes, in any order. */
export const pointsAt = (table: string, t: Keyed, column: AnyPgColumn, target: Keyed) =>
  foreignKey({
    name: `${table}_${column.name}_fk`,
    columns: [t.bookId, column],
    foreignColumns: [target.bookId, target.id],
  })

export const oneOf = (table: string, column: AnyPgColumn, values: readonly string[]) =>
  check(`${table}_${column.name}_known`, sql`${column} in (${list(values)})`)

export const aboveZero = (table: string, column: AnyPgColumn) =>
  check(`${table}_${column.name}_above_zero`, sql`${column} > 0`)

export const holds = (table: string, name: string, condition: SQL) => check(`${table}_${name}`, condition)

export const list = (values: readonly string[]) => sql.raw(values.map((value) => `'${value}'`).join(', '))
