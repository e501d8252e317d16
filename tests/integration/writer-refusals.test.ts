import { beforeEach, describe, expect, it } from 'vitest'
import { newId } from '@/lib/book/ids'
import { archiveBook } from '@/lib/data/book/archive-book'
import { writeChanges } from '@/lib/data/book/write-changes'
import {
  absence,
  baseCase,
  change,
  component,
  flow,
  mustWrite,
  rowsOf,
  snapshot,
  stream,
  update,
  write,
} from './records'
import { codeOf, makeBook, makeTeam, type Person, type TestTeam, value } from './world'

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

describe('a change that cannot stand', () => {
  it('on a field that is no longer what it was: both values, and nothing written', async () => {
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    await mustWrite(owner, book, change({ update: [update('stream', feed.id, { name: ['', 'Brine'] })] }))
    const before = await rowsOf(book)
    const late = change({ create: [component('W')], update: [update('stream', feed.id, { name: ['', 'Feed'] })] })
    expect(await write(engineer, book, late)).toEqual([
      {
        id: late.id,
        ok: false,
        code: 'conflict',
        conflicts: [
          { code: 'field', kind: 'stream', id: feed.id, field: 'name', from: '', theirs: 'Brine', mine: 'Feed' },
        ],
      },
    ])
    expect(await rowsOf(book)).toEqual(before)
    expect(await numberNow()).toBe(3)
  })

  it('on another field of a record that somebody else changed: it stands', async () => {
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    await mustWrite(owner, book, change({ update: [update('stream', feed.id, { name: ['', 'Brine'] })] }))
    await mustWrite(engineer, book, change({ update: [update('stream', feed.id, { phase: [null, 'L'] })] }))
    expect(await rowsOf(book)).toContainEqual({ ...feed, name: 'Brine', phase: 'L' })
  })

  it('on a record that is gone', async () => {
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    await mustWrite(owner, book, change({ remove: [feed] }))
    const late = change({ update: [update('stream', feed.id, { name: ['', 'Feed'] })] })
    expect(await write(engineer, book, late)).toMatchObject([
      { ok: false, code: 'conflict', conflicts: [{ code: 'gone', kind: 'stream', id: feed.id }] },
    ])
  })

  it('in a place that somebody else has filled: both records', async () => {
    const feed = stream('1')
    const caseId = await baseCase(engineer, book)
    await mustWrite(engineer, book, change({ create: [feed] }))
    const [theirs, mine] = [flow(caseId, feed.id, 5), flow(caseId, feed.id, 6)]
    await mustWrite(owner, book, change({ create: [theirs] }))
    expect(await write(engineer, book, change({ create: [mine] }))).toMatchObject([
      { ok: false, code: 'conflict', conflicts: [{ code: 'exists', kind: 'given', theirs, mine }] },
    ])
  })

  it('removing a record without what hangs on it', async () => {
    const [feed, water] = [stream('1'), component('W')]
    await mustWrite(engineer, book, change({ create: [feed, water, absence(feed.id, water.id)] }))
    const before = await rowsOf(book)
    const [result] = await write(engineer, book, change({ remove: [feed] }))
    expect(result).toMatchObject({ ok: false, code: 'rejected', problems: [{ kind: 'absence', field: 'streamId' }] })
    expect(await rowsOf(book)).toEqual(before)
    await mustWrite(engineer, book, change({ remove: [absence(feed.id, water.id), feed] }))
  })

  it('pointing into another book', async () => {
    const foreign = component('W')
    const otherBook = await makeBook(at)
    await mustWrite(engineer, otherBook, change({ create: [foreign] }))
    const feed = stream('1')
    const crossing = change({ create: [feed, absence(feed.id, foreign.id)] })
    expect(await write(engineer, book, crossing)).toMatchObject([
      { ok: false, code: 'rejected', problems: [{ kind: 'absence' }] },
    ])
  })

  it('with a tag that is taken', async () => {
    await mustWrite(engineer, book, change({ create: [stream('1')] }))
    const [result] = await write(engineer, book, change({ create: [stream(' 1')] }))
    expect(result).toMatchObject({ ok: false, code: 'rejected', problems: [{ kind: 'stream', field: 'tag' }] })
  })

  it.each([
    ['id', 'elsewhere'],
    ['kind', 'unit'],
    ['bookId', 'other'],
    ['__proto__', 'x'],
  ])('changing what is no field of its kind: %s', async (field, to) => {
    const feed = stream('1')
    await mustWrite(engineer, book, change({ create: [feed] }))
    const from = field === 'id' ? feed.id : field === 'kind' ? 'stream' : null
    const fields = JSON.parse(`{ ${JSON.stringify(field)}: ${JSON.stringify([from, to])} }`)
    const result = await write(engineer, book, change({ update: [update('stream', feed.id, fields)] }))
    expect(result).toMatchObject([{ ok: false, code: 'rejected', problems: [{ id: feed.id, field }] }])
    expect(await rowsOf(book)).toContainEqual(feed)
  })

  it('making or removing the book itself', async () => {
    const own = (await rowsOf(book)).find(({ kind }) => kind === 'book')
    if (own?.kind !== 'book') throw new Error('no book record')
    expect(await write(engineer, book, change({ create: [{ ...own, id: newId() }] }))).toMatchObject([
      { ok: false, code: 'rejected' },
    ])
    expect(await write(engineer, book, change({ remove: [own] }))).toMatchObject([{ ok: false, code: 'rejected' }])
  })

  it.each(['a\u0000b', 'a\ud800b'])('with a character that cannot be kept', async (name) => {
    const result = await write(engineer, book, change({ create: [{ ...component('W'), name }] }))
    expect(result).toMatchObject([{ ok: false, code: 'rejected', problems: [{ field: 'name' }] }])
  })

  it('stops those behind it', async () => {
    const first = change({ create: [stream('1')] })
    const bad = change({ create: [stream('1')] })
    const behind = change({ create: [stream('2')] })
    const answer = value(await writeChanges(engineer, { book, changes: [first, bad, behind] }))
    expect(answer.results.map(({ id, ok }) => [id, ok])).toEqual([
      [first.id, true],
      [bad.id, false],
    ])
    expect(answer.number).toBe(2)
    expect((await rowsOf(book)).filter(({ kind }) => kind === 'stream')).toEqual(first.create)
  })

  it('to an archived book', async () => {
    value(await archiveBook(owner, { team: at.slug, book }))
    const before = await rowsOf(book)
    expect(codeOf(await writeChanges(engineer, { book, changes: [change({ create: [stream('1')] })] }))).toBe(
      'conflict',
    )
    expect(await rowsOf(book)).toEqual(before)
  })

  it('that is no change at all', async () => {
    const shapes: unknown[] = [
      undefined,
      null,
      'x',
      {},
      { id: 'x' },
      { ...change({}), extra: 1 },
      { ...change({}), create: [{ kind: 'ghost' }] },
    ]
    for (const shape of shapes)
      expect(codeOf(await writeChanges(engineer, { book, changes: [shape] as never }))).toBe('badInput')
    expect(codeOf(await writeChanges(engineer, { book, changes: [] }))).toBe('badInput')
    expect(await numberNow()).toBe(1)
  })
})
