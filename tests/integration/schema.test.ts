import { sql } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { fieldsOf, kindOrder, references, schemas } from '@/lib/book/kinds'
import { kindTables, rowKinds } from '@/lib/data/records/tables'

type Constraint = { table: string; name: string; type: string; deferred: boolean; onDelete: string; definition: string }

async function constraints(): Promise<Constraint[]> {
  const { rows } = await db.execute<Constraint>(sql`
    select r.relname as "table", c.conname as name, c.contype as type, c.condeferred as deferred,
      c.confdeltype as "onDelete", pg_get_constraintdef(c.oid) as definition
    from pg_constraint c join pg_class r on r.oid = c.conrelid join pg_namespace n on n.oid = r.relnamespace
    where n.nspname = 'public'`)
  return rows
}

const snake = (field: string) => field.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`)

describe('the tables of records', () => {
  it('hold the fields of their kinds, and no others', async () => {
    for (const kind of rowKinds) {
      const { rows } = await db.execute<{ name: string }>(sql`
        select column_name as name from information_schema.columns
        where table_schema = 'public' and table_name = ${kindTables[kind].name}`)
      const columns = rows.map(({ name }) => name).sort()
      expect(columns, kind).toEqual(['book_id', 'id', ...fieldsOf[kind].map(snake)].sort())
    }
  })

  it('allow a field to be empty exactly where its kind does', async () => {
    for (const kind of rowKinds) {
      const { rows } = await db.execute<{ name: string; nullable: boolean }>(sql`
        select column_name as name, is_nullable = 'YES' as nullable from information_schema.columns
        where table_schema = 'public' and table_name = ${kindTables[kind].name}`)
      for (const field of fieldsOf[kind]) {
        const shape = schemas[kind].shape as unknown as Record<
          string,
          { safeParse: (value: unknown) => { success: boolean } }
        >
        const mayBeNull = shape[field]?.safeParse(null).success
        expect(rows.find(({ name }) => name === snake(field))?.nullable, `${kind}.${field}`).toBe(mayBeNull)
      }
    }
  })

  it('know the same words as their kinds', async () => {
    const checks = (await constraints()).filter(({ type }) => type === 'c')
    let compared = 0
    for (const kind of kindOrder)
      for (const field of fieldsOf[kind]) {
        const words = wordsOf((schemas[kind].shape as Record<string, unknown>)[field])
        if (!words) continue
        const table = kind === 'book' ? 'book' : kindTables[kind].name
        const found = checks.find(({ name }) => name === `${table}_${snake(field)}_known`)
        const known = [...(found?.definition ?? '').matchAll(/'([^']*)'::text/g)].map(([, word]) => word)
        expect(known.sort(), `${kind}.${field}`).toEqual([...words].sort())
        compared++
      }
    expect(compared).toBeGreaterThan(8)
  })

  it('refer only within a book, settled at commit', async () => {
    const all = await constraints()
    for (const kind of rowKinds)
      for (const [field, target] of Object.entries(references[kind])) {
        if (target === 'book') continue
        const { name: table } = kindTables[kind]
        const found = all.find(({ name }) => name === `${table}_${snake(field)}_fk`)
        const targetTable = kindTables[target as keyof typeof kindTables].name
        expect(found?.definition, `${kind}.${field}`).toContain(
          `FOREIGN KEY (book_id, ${snake(field)}) REFERENCES ${targetTable}(book_id, id)`,
        )
        expect(found?.deferred, `${kind}.${field}`).toBe(true)
      }
  })

  it('have one of each tag in a book, settled at commit', async () => {
    const all = await constraints()
    const tagged = rowKinds.filter((kind) => fieldsOf[kind].includes('tag'))
    expect(tagged.length).toBe(6)
    for (const kind of tagged) {
      const found = all.find(({ name }) => name === `${kindTables[kind].name}_book_id_tag_key`)
      expect(found, kind).toMatchObject({ type: 'u', deferred: true })
    }
  })
})

it('nothing cascades: what goes with a removal is always said', async () => {
  const foreign = (await constraints()).filter(({ type }) => type === 'f')
  expect(foreign.length).toBeGreaterThan(40)
  expect(foreign.filter(({ onDelete }) => onDelete !== 'a')).toEqual([])
})

/** The words of an enumeration, through `nullable`. */
function wordsOf(schema: unknown): readonly string[] | undefined {
  const holder = schema as { options?: readonly string[]; unwrap?: () => unknown }
  if (Array.isArray(holder.options) && holder.options.every((option) => typeof option === 'string'))
    return holder.options
  return typeof holder.unwrap === 'function' ? wordsOf(holder.unwrap()) : undefined
}
