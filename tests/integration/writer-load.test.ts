import { randomBytes } from 'node:crypto'
import { Client } from 'pg'
import { beforeAll, describe, expect, it, vi } from 'vitest'
import type { BookRecord, RecordOf } from '@/lib/book/kinds'
import { listChanges } from '@/lib/data/book/list-changes'
import {
  absence,
  baseCase,
  change,
  component,
  flow,
  mustWrite,
  rowsOf,
  snapshot,
  sorted,
  stream,
  update,
  write,
} from './records'
import { makeBook, makeTeam, type TestTeam, value } from './world'

let at: TestTeam
beforeAll(async () => {
  at = await makeTeam()
})

/** A plant of `streams` x `components`: absences in a tenth of the places, a flow given for each stream. */
function plant(streams: number, components: number, caseId: string): BookRecord[] {
  const columns = Array.from({ length: components }, (_, i) => component(`C${i}`))
  const rows = Array.from({ length: streams }, (_, i) => ({ ...stream(`${i}`), position: i }))
  const absences = rows.flatMap(({ id }, i) =>
    columns.filter((_, j) => (i + j) % 10 === 0).map((c) => absence(id, c.id)),
  )
  return [...columns, ...rows, ...absences, ...rows.map(({ id }, i) => flow(caseId, id, i + 0.1))]
}

/** How many statements the database is sent meanwhile: what a large change costs, whatever else the machine does. */
async function statementsOf(work: () => Promise<unknown>): Promise<number> {
  const query = vi.spyOn(Client.prototype, 'query')
  try {
    await work()
    return query.mock.calls.length
  } finally {
    query.mockRestore()
  }
}

describe('a large change', () => {
  it('of 5,000 records is written in few statements, read and taken back', async () => {
    const { engineer } = at.people
    const book = await makeBook(at)
    const records = plant(714, 50, await baseCase(engineer, book))
    expect(records.length).toBeGreaterThan(5000)
    const before = await rowsOf(book)
    const statements = await statementsOf(() => mustWrite(engineer, book, change({ create: records })))
    expect(await rowsOf(book)).toEqual(sorted([...before, ...records]))
    const edits = records.filter((record): record is RecordOf<'stream'> => record.kind === 'stream')
    await mustWrite(
      engineer,
      book,
      change({ update: edits.map(({ id }) => update('stream', id, { name: ['', 'x'] })) }),
    )
    const renamed = new Map(edits.map(({ id }) => [id, 'x']))
    const after = records.map((record) =>
      record.kind === 'stream' && renamed.has(record.id) ? { ...record, name: 'x' } : record,
    )
    expect(await rowsOf(book)).toEqual(sorted([...before, ...after]))
    await mustWrite(engineer, book, change({ remove: after }))
    expect(await rowsOf(book)).toEqual(before)
    expect(statements).toBeGreaterThan(0)
    expect(statements).toBeLessThan(25)
  })

  it('of 20,000 records, more than a statement takes, stays within its limits', async () => {
    const { engineer } = at.people
    const book = await makeBook(at)
    const records = plant(1000, 50, await baseCase(engineer, book))
    const more = plant(1900, 50, await baseCase(engineer, book)).filter((record) => record.kind !== 'given')
    const others = more.map((record) =>
      'tag' in record ? { ...record, tag: `x${record.tag}` } : record,
    ) as BookRecord[]
    expect(records.length + others.length).toBeGreaterThan(18_000)
    const statements = await statementsOf(() => mustWrite(engineer, book, change({ create: [...records, ...others] })))
    expect(await rowsOf(book)).toHaveLength(records.length + others.length + 2)
    expect(statements).toBeLessThan(30)
  })

  it('and its neighbours are listed a page at a time', async () => {
    const { engineer } = at.people
    const book = await makeBook(at)
    await mustWrite(engineer, book, ...Array.from({ length: 210 }, (_, i) => change({ create: [component(`C${i}`)] })))
    const first = value(await listChanges(engineer, { book, after: 0 }))
    expect(first.number).toBe(211)
    expect(first.changes.map(({ number }) => number)).toEqual(Array.from({ length: 200 }, (_, i) => i + 1))
    const second = value(await listChanges(engineer, { book, after: 200 }))
    expect(second.changes.map(({ number }) => number)).toEqual(Array.from({ length: 11 }, (_, i) => i + 201))
    expect(value(await listChanges(engineer, { book, after: 211 })).changes).toEqual([])
  })

  it('larger than a page is listed alone', async () => {
    const { engineer } = at.people
    const book = await makeBook(at)
    const noise = () => randomBytes(1500).toString('base64')
    const bulky = () => Array.from({ length: 1200 }, () => ({ ...stream(crypto.randomUUID()), note: noise() }))
    for (let i = 0; i < 3; i++) await mustWrite(engineer, book, change({ create: bulky() }))
    const listed = value(await listChanges(engineer, { book, after: 1 }))
    expect(listed.changes.map(({ number }) => number)).toEqual([2])
    expect(value(await listChanges(engineer, { book, after: 2 })).changes.map(({ number }) => number)).toEqual([3])
  })
})

describe('two writers at once', () => {
  it('on one field: one is taken, the other is told both values', async () => {
    const { engineer, owner } = at.people
    const book = await makeBook(at)
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    const named = (name: string) => change({ update: [update('stream', feed.id, { name: ['', name] })] })
    const results = (
      await Promise.all([write(engineer, book, named('mine')), write(owner, book, named('theirs'))])
    ).flat()
    expect(results.filter(({ ok }) => ok)).toHaveLength(1)
    const refused = results.find(({ ok }) => !ok)
    const kept = (await rowsOf(book)).find(({ id }) => id === feed.id) as RecordOf<'stream'>
    const lost = kept.name === 'mine' ? 'theirs' : 'mine'
    expect(refused).toMatchObject({
      code: 'conflict',
      conflicts: [{ field: 'name', from: '', theirs: kept.name, mine: lost }],
    })
  })

  it('on many fields lose nothing and double nothing', async () => {
    const { engineer, owner } = at.people
    const book = await makeBook(at)
    const caseId = await baseCase(engineer, book)
    const streams = Array.from({ length: 40 }, (_, i) => stream(`${i}`))
    await mustWrite(engineer, book, change({ create: streams }))
    const half = (person: typeof engineer, odd: number) =>
      streams
        .filter((_, i) => i % 2 === odd)
        .map((s, i) => write(person, book, change({ create: [flow(caseId, s.id, i)] })))
    const results = (await Promise.all([...half(engineer, 0), ...half(owner, 1)])).flat()
    const numbers = results.map((result) => (result.ok ? result.number : 0)).sort((a, b) => a - b)
    expect(numbers).toEqual(Array.from({ length: 40 }, (_, i) => i + 3))
    expect((await rowsOf(book)).filter(({ kind }) => kind === 'given')).toHaveLength(40)
    const seen = await snapshot(owner, book)
    expect(seen.number).toBe(42)
    expect(sorted(seen.records)).toEqual(await rowsOf(book))
  })

  it('counting up one number, each trying again when told of the other, count every step', async () => {
    const { engineer, owner } = at.people
    const book = await makeBook(at)
    const feed = component('W')
    await mustWrite(engineer, book, change({ create: [feed] }))
    const step = async (person: typeof engineer): Promise<void> => {
      for (;;) {
        const now = (await snapshot(person, book)).records.find(({ id }) => id === feed.id) as RecordOf<'component'>
        const up = update('component', feed.id, { position: [now.position, now.position + 1] })
        const [result] = await write(person, book, change({ update: [up] }))
        if (result?.ok) return
      }
    }
    const many = async (person: typeof engineer) => {
      for (let i = 0; i < 15; i++) await step(person)
    }
    await Promise.all([many(engineer), many(owner), many(engineer)])
    expect(await rowsOf(book)).toContainEqual({ ...feed, position: 46 })
  })
})
