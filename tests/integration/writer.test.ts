import { beforeEach, describe, expect, it } from 'vitest'
import { type Change, invert } from '@/lib/book/change'
import { newId } from '@/lib/book/ids'
import { archiveBook } from '@/lib/data/book/archive-book'
import { listChanges } from '@/lib/data/book/list-changes'
import { writeChanges } from '@/lib/data/book/write-changes'
import {
  absence,
  baseCase,
  change,
  component,
  flow,
  link,
  mustWrite,
  rowsOf,
  snapshot,
  sorted,
  stream,
  unit,
  update,
  write,
} from './records'
import { makeBook, makeTeam, type Person, type TestTeam, value } from './world'

let at: TestTeam
let engineer: Person
let owner: Person
let book: string

beforeEach(async () => {
  at = await makeTeam()
  ;({ engineer, owner } = at.people)
  book = await makeBook(at)
})

const numberNow = async () => (await snapshot(engineer, book)).number

describe('one change', () => {
  it('takes the next number, and is listed with who made it', async () => {
    const water = component('W')
    const made = change({ create: [water], label: 'Component W' })
    expect(await write(engineer, book, made)).toEqual([{ id: made.id, ok: true, number: 2 }])
    const listed = value(await listChanges(owner, { book, after: 1 }))
    expect(listed.number).toBe(2)
    expect(listed.changes).toMatchObject([
      { number: 2, change: made, by: { id: engineer.userId, name: 'The engineer' } },
    ])
    expect(listed.changes[0]?.at).toBeInstanceOf(Date)
    expect(await rowsOf(book)).toContainEqual(water)
  })

  it('updates the fields that it names and no others', async () => {
    const water = component('W')
    await mustWrite(engineer, book, change({ create: [water] }))
    await mustWrite(
      engineer,
      book,
      change({ update: [update('component', water.id, { name: ['', 'Water'], molarMass: [null, 18.015] })] }),
    )
    expect(await rowsOf(book)).toContainEqual({ ...water, name: 'Water', molarMass: 18.015 })
  })

  it('updates the book itself, which the list then shows', async () => {
    await mustWrite(
      engineer,
      book,
      change({ update: [update('book', book, { name: ['Press section', 'Presses'], documentNumber: ['', 'P-1'] })] }),
    )
    expect((await rowsOf(book)).find(({ kind }) => kind === 'book')).toMatchObject({
      name: 'Presses',
      documentNumber: 'P-1',
    })
  })

  it('may swap two tags, and give a new stream the tag of one it removes', async () => {
    const [a, b, c] = [stream('1'), stream('2'), stream('3')]
    await mustWrite(engineer, book, change({ create: [a, b, c] }))
    const swap = [update('stream', a.id, { tag: ['1', '2'] }), update('stream', b.id, { tag: ['2', '1'] })]
    const next = stream('3')
    await mustWrite(engineer, book, change({ update: swap, remove: [c], create: [next] }))
    expect(await rowsOf(book)).toEqual(expect.arrayContaining([{ ...a, tag: '2' }, { ...b, tag: '1' }, next]))
  })

  it('may point a record at one that it makes, and away from one that it removes', async () => {
    const [first, second, feed] = [component('A'), component('B'), stream('1')]
    const byDifference = { ...feed, fractions: 'difference' as const, differenceComponentId: first.id }
    await mustWrite(engineer, book, change({ create: [byDifference, first] }))
    const turn = update('stream', feed.id, { differenceComponentId: [first.id, second.id] })
    await mustWrite(engineer, book, change({ remove: [first], update: [turn], create: [second] }))
    expect(await rowsOf(book)).toContainEqual({ ...byDifference, differenceComponentId: second.id })
  })

  it('may remove a record and make it anew under its id', async () => {
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    await mustWrite(engineer, book, change({ remove: [feed], create: [{ ...feed, name: 'Feed' }] }))
    expect(await rowsOf(book)).toContainEqual({ ...feed, name: 'Feed' })
  })

  it('keeps text and numbers to the last digit', async () => {
    const odd = {
      ...component('ä "1"\n\t\\u0000 §😀'),
      name: "'; drop table book; --",
      molarMass: 0.1 + 0.2,
      position: 1e-300,
    }
    await mustWrite(engineer, book, change({ create: [odd] }))
    expect(await rowsOf(book)).toContainEqual(odd)
  })

  it('is undone by its inverse to the very rows there were', async () => {
    const [water, feed, press] = [component('W'), stream('1'), unit('P')]
    const caseId = await baseCase(engineer, book)
    await mustWrite(engineer, book, change({ create: [water, feed, press] }))
    const before = await rowsOf(book)
    const messy: Change = change({
      create: [absence(feed.id, water.id), link(feed.id, 'in', press.id), flow(caseId, feed.id, 5), stream('2')],
      update: [update('unit', press.id, { unitKind: ['mixer', 'splitter'], tag: ['P', 'Q'] })],
      remove: [],
    })
    await mustWrite(engineer, book, messy)
    const undo = invert(messy, newId())
    expect(await rowsOf(book)).not.toEqual(before)
    await mustWrite(engineer, book, undo)
    expect(await rowsOf(book)).toEqual(before)
    await mustWrite(engineer, book, invert(undo, newId()))
    await mustWrite(engineer, book, invert(messy, newId()))
    expect(await rowsOf(book)).toEqual(before)
  })
})

describe('the same id again', () => {
  it('is answered with the first result and written once', async () => {
    const made = change({ create: [stream('1')] })
    await mustWrite(engineer, book, made)
    await mustWrite(engineer, book, change({ create: [stream('2')] }))
    const again = value(await writeChanges(engineer, { book, changes: [structuredClone(made)] }))
    expect(again).toEqual({ number: 3, results: [{ id: made.id, ok: true, number: 2 }] })
    expect(value(await listChanges(engineer, { book, after: 0 })).changes).toHaveLength(3)
  })

  it('with the keys of its body in another order, too', async () => {
    const made = change({ create: [stream('1')] })
    await mustWrite(engineer, book, made)
    const turned = {
      ...made,
      create: made.create.map((record) => Object.fromEntries(Object.entries(record).reverse())),
    }
    expect(await write(engineer, book, turned as never)).toEqual([{ id: made.id, ok: true, number: 2 }])
  })

  it('with another body is refused', async () => {
    const made = change({ create: [stream('1')] })
    await mustWrite(engineer, book, made)
    for (const other of [
      { ...made, create: [stream('2')] },
      { ...made, label: 'Another' },
    ])
      expect(await write(engineer, book, other)).toEqual([
        { id: made.id, ok: false, code: 'rejected', problems: 'idReused' },
      ])
    expect(await numberNow()).toBe(2)
  })

  it('is answered even when the book has been archived since', async () => {
    const made = change({ create: [stream('1')] })
    await mustWrite(engineer, book, made)
    value(await archiveBook(owner, { team: at.slug, book }))
    expect(await write(engineer, book, made)).toEqual([{ id: made.id, ok: true, number: 2 }])
  })

  it('in another book is another change', async () => {
    const made = change({ create: [stream('1')] })
    const otherBook = await makeBook(at)
    await mustWrite(engineer, book, made)
    await mustWrite(engineer, otherBook, made)
    expect(sorted(await rowsOf(otherBook))).toContainEqual(made.create[0])
  })

  it('sent twice at one moment is written once', async () => {
    const made = change({ create: [stream('1')] })
    const results = await Promise.all(Array.from({ length: 6 }, () => write(engineer, book, made)))
    for (const result of results) expect(result).toEqual([{ id: made.id, ok: true, number: 2 }])
    expect(await numberNow()).toBe(2)
  })
})
