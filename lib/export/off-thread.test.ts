import { expect, it } from 'vitest'
import { demoProblem, stateFrom, title } from '@/tests/export-case'
import { cellAt, readWorkbook, rowStarting, sheetOf } from '@/tests/workbook'
import { streamTableOffThread } from './off-thread'

it('solves and writes a book in another thread, while this one goes on', async () => {
  let turns = 0
  const timer = setInterval(() => {
    turns += 1
  }, 5)
  const made = await streamTableOffThread({ ...stateFrom(demoProblem('a-salt')), title, bookNumber: 3 })
  clearInterval(timer)
  if (!made.ok) throw new Error(made.error.message)
  const sheet = sheetOf(readWorkbook(made.value), 'Stream table')
  const { number, values } = rowStarting(sheet, 'Total flow')
  expect(values[2]).toBe(50_000)
  expect(cellAt(sheet, `I${number}`)?.v).toBeCloseTo(10_938.7, 1)
  expect(turns).toBeGreaterThan(5)
})

it('goes on with a thread that has worked before, also after a pause and side by side', async () => {
  const request = { ...stateFrom(demoProblem('b-citrus')), title, bookNumber: 3 }
  for (const several of [1, 3, 2]) {
    const made = await Promise.all(Array.from({ length: several }, () => streamTableOffThread(request)))
    for (const one of made) expect(one.ok && one.value.byteLength).toBeGreaterThan(10_000)
    await new Promise((resolve) => setTimeout(resolve, 50))
  }
})

it('throws what went wrong inside, with its cause', async () => {
  const broken = { ...stateFrom(demoProblem('a-salt')), title, bookNumber: 3 }
  const withoutBook = { ...broken, state: { ...broken.state, book: new Map() } }
  const failure = await streamTableOffThread(withoutBook).catch((cause: unknown) => cause)
  expect(failure).toBeInstanceOf(Error)
  expect(((failure as Error).cause as Error).message).toContain('no book record')
})
