import { eq } from 'drizzle-orm'
import { afterEach, expect, it, vi } from 'vitest'
import { GET } from '@/app/api/books/[book]/table.xlsx/route'
import { db } from '@/db/client'
import { book as bookTable } from '@/db/schema/book'
import { auth } from '@/lib/auth/auth'
import { exportStreamTable } from '@/lib/data/book/export-stream-table'
import { readWorkbook, rowStarting, rowsOf, sheetOf } from '@/tests/workbook'
import { codeOf, makeBook, makeTeam, value } from './world'

afterEach(() => {
  vi.restoreAllMocks()
})

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

it('downloads as an attachment that is not kept by anybody on the way', async () => {
  const at = await makeTeam()
  const book = await makeBook(at)
  vi.spyOn(auth.api, 'getSession').mockResolvedValue({ user: { id: at.people.engineer.userId } } as never)
  const request = new Request(`http://127.0.0.1:3000/api/books/${book}/table.xlsx`)
  const response = await GET(request, { params: Promise.resolve({ book }) })
  expect(response.status).toBe(200)
  expect(response.headers.get('content-disposition')).toBe(
    'attachment; filename="Press section - stream table.xlsx"; filename*=UTF-8\'\'Press%20section%20-%20stream%20table.xlsx',
  )
  expect(response.headers.get('content-type')).toContain('spreadsheetml.sheet')
  expect(response.headers.get('cache-control')).toBe('no-store')
  const bytes = new Uint8Array(await response.arrayBuffer())
  expect(readWorkbook(bytes).SheetNames).toContain('Closure')
})
