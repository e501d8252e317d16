import { getTableColumns, getTableName } from 'drizzle-orm'
import type { PgColumn, PgTable } from 'drizzle-orm/pg-core'
import { given, operatingCase } from '@/db/schema/givens'
import { measure, measurePart } from '@/db/schema/measures'
import { coefficient, parameter, reaction, rule, ruleStream } from '@/db/schema/relations'
import { absence, component, inventory, link, stream, unit } from '@/db/schema/structure'
import { fieldsOf, type Kind, kindOrder } from '@/lib/book/kinds'

/** Every kind but `book`, whose one record is the book's own row. A new kind: its table here, and nothing else. */
export type RowKind = Exclude<Kind, 'book'>

const tables = {
  component,
  stream,
  absence,
  unit,
  inventory,
  link,
  reaction,
  coefficient,
  parameter,
  rule,
  ruleStream,
  measure,
  measurePart,
  case: operatingCase,
  given,
} satisfies Record<RowKind, PgTable>

/** A field of a record as a column: its name and type in the database. */
export type FieldColumn = { field: string; name: string; type: string; column: PgColumn }
export type KindTable = { table: PgTable; name: string; bookId: PgColumn; id: PgColumn; fields: readonly FieldColumn[] }

function describe(kind: RowKind): KindTable {
  const table: PgTable = tables[kind]
  const columns = getTableColumns(table) as Record<string, PgColumn>
  const column = (field: string): PgColumn => {
    const found = columns[field]
    if (!found) throw new Error(`The table of ${kind} has no column for ${field}`)
    return found
  }
  const fields = ['id', ...fieldsOf[kind]].map((field) => {
    const found = column(field)
    return { field, name: found.name, type: found.getSQLType(), column: found }
  })
  return { table, name: getTableName(table), bookId: column('bookId'), id: column('id'), fields }
}

export const rowKinds = kindOrder.filter((kind): kind is RowKind => kind !== 'book')
export const kindTables = Object.fromEntries(rowKinds.map((kind) => [kind, describe(kind)])) as Readonly<
  Record<RowKind, KindTable>
>
