import { eq } from 'drizzle-orm'
import { expect, it } from 'vitest'
import { GET } from '@/app/api/books/[book]/table.xlsx/route'
import { db } from '@/db/client'
import { book as bookTable } from '@/db/schema/book'
import { exportStreamTable } from '@/lib/data/book/export-stream-table'
import { readWorkbook, rowStarting, rowsOf, sheetOf } from '@/tests/workbook'
import { codeOf, makeBook, makeTeam, value } from './world'

it('writes the book as it stands, under a name that says what it is', async () => {
  const at = await makeTeam()
  const book = await makeBook(at, { kind: 'starter', starter: 'salt' })
  await db.update(bookTable).set({ documentNumber: 'KF-100' }).where(eq(bookTable.id, book))
  const { name, bytes } = value(await exportStreamTable(at.people.checker, { book, team: at.slug }))
  expect(name).toBe('KF-100 Press section - stream table.xlsx')
  const table = sheetOf(readWorkbook(bytes), 'Stream table')
  expect(rowStarting(table, 'Total flow').values[2]).toBe(50_000)
  const fields = rowsOf(table).slice(0, 6).flat()
  expect(fields).toContain(`Team ${at.id}`)
  expect(fields).toContain('Mill')
  expect(fields).toContain('The engineer')
})

it('finds no operating case that the book does not have', async () => {
  const at = await makeTeam()
  const book = await makeBook(at)
  expect(codeOf(await exportStreamTable(at.people.engineer, { book, case: 'elsewhere' }))).toBe('notFound')
})

it('answers a download that is signed out in JSON', async () => {
  const at = await makeTeam()
  const book = await makeBook(at)
  const request = new Request(`http://127.0.0.1:3000/api/books/${book}/table.xlsx`)
  const response = await GET(request, { params: Promise.resolve({ book }) })
  expect(response.status).toBe(401)
  expect(response.headers.get('cache-control')).toBe('no-store')
  expect(await response.json()).toMatchObject({ error: { code: 'signedOut' } })
})
