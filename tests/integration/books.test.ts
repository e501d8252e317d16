import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { book as bookTable } from '@/db/schema/book'
import { teamEvent } from '@/db/schema/team'
import { starterNames, starters } from '@/lib/book/starters'
import { archiveBook } from '@/lib/data/book/archive-book'
import { createBook } from '@/lib/data/book/create-book'
import { duplicateBook } from '@/lib/data/book/duplicate-book'
import { getBook } from '@/lib/data/book/get-book'
import { listBooks } from '@/lib/data/book/list-books'
import { listChanges } from '@/lib/data/book/list-changes'
import { restoreBook } from '@/lib/data/book/restore-book'
import { change, component, mustWrite, rowsOf, snapshot, sorted, stream } from './records'
import { codeOf, makeBook, makeTeam, value } from './world'

describe('a new book', () => {
  it('blank has one operating case', async () => {
    const at = await makeTeam()
    const { engineer } = at.people
    const from = { kind: 'blank', basis: 'mole', flowUnit: 'kmol/h' } as const
    const { id } = value(await createBook(engineer, { team: at.slug, projectId: at.project, name: ' Reactor ', from }))
    const seen = await snapshot(engineer, id)
    expect(seen).toMatchObject({
      id,
      team: { slug: at.slug },
      project: { id: at.project, name: 'Mill' },
      number: 1,
      role: 'engineer',
      mayEdit: true,
      archived: false,
    })
    expect(seen.records).toMatchObject([
      { kind: 'book', id, name: 'Reactor', description: '', documentNumber: '', basis: 'mole', flowUnit: 'kmol/h' },
      { kind: 'case', name: 'Base case' },
    ])
  })

  it.each(starterNames)('from the starter %s holds its plant', async (starter) => {
    const at = await makeTeam()
    const id = await makeBook(at, { kind: 'starter', starter })
    const { problem } = starters[starter]
    const records = (await snapshot(at.people.engineer, id)).records
    const tags = (kind: string) =>
      records.flatMap((record) => (record.kind === kind && 'tag' in record ? [record.tag] : []))
    expect(records[0]).toMatchObject({ kind: 'book', id, name: 'Press section', basis: problem.basis })
    expect(tags('stream').sort()).toEqual(problem.streams.map((s) => s.id).sort())
    expect(tags('component').sort()).toEqual(problem.components.map((c) => c.id).sort())
    expect(tags('unit').sort()).toEqual(problem.units.map((u) => u.id).sort())
    expect(records.filter(({ kind }) => kind === 'given')).toHaveLength(problem.givens?.length ?? 0)
    expect(sorted(records)).toEqual(await rowsOf(id))
  })

  it.each([
    ['a unit that does not fit its basis', { kind: 'blank', basis: 'mass', flowUnit: 'kmol/h' }],
    ['a unit that is none', { kind: 'blank', basis: 'mass', flowUnit: 'furlongs' }],
    ['an unknown starter', { kind: 'starter', starter: 'constructor' }],
    ['an unknown basis', { kind: 'blank', basis: 'volume', flowUnit: 'm3/h' }],
    ['nothing', {}],
  ])('from %s is refused', async (_, from) => {
    const at = await makeTeam()
    const input = { team: at.slug, projectId: at.project, name: 'Press', from }
    expect(codeOf(await createBook(at.people.engineer, input as never))).toBe('badInput')
  })
})

describe('a duplicate', () => {
  it('has the records of the first and goes its own way', async () => {
    const at = await makeTeam()
    const { engineer, owner } = at.people
    const first = await makeBook(at, { kind: 'starter', starter: 'black-mass' })
    const numbered = { kind: 'book' as const, id: first, fields: { documentNumber: ['', 'D-1'] as [string, string] } }
    await mustWrite(engineer, first, change({ update: [numbered] }))
    const { id } = value(await duplicateBook(owner, { team: at.slug, book: first, name: 'A copy' }))
    const [original, copy] = [await rowsOf(first), await rowsOf(id)]
    const plain = (records: typeof copy) => records.filter(({ kind }) => kind !== 'book')
    expect(plain(copy)).toEqual(plain(original))
    expect(copy.find(({ kind }) => kind === 'book')).toMatchObject({ id, name: 'A copy', documentNumber: '' })
    await mustWrite(owner, id, change({ create: [stream('new')] }))
    expect(await rowsOf(first)).toEqual(original)
    expect(value(await listChanges(owner, { book: id, after: 0 })).changes.map((c) => c.change.label)).toEqual([
      'Copy of Press section',
      'An edit',
    ])
  })
})

describe('the list', () => {
  it('holds what is at work, last changed first, with who changed it', async () => {
    const at = await makeTeam()
    const { engineer, owner } = at.people
    const [a, b] = [await makeBook(at), await makeBook(at)]
    await mustWrite(owner, a, change({ create: [stream('1')] }))
    const listed = value(await listBooks(engineer, { team: at.slug }))
    expect(listed.map(({ id }) => id)).toEqual([a, b])
    expect(listed[0]).toMatchObject({
      name: 'Press section',
      projectId: at.project,
      projectName: 'Mill',
      state: 'draft',
      number: 2,
      basis: 'mass',
      archivedAt: null,
      changedBy: { id: owner.userId, name: 'The owner' },
    })
    expect(listed[0]?.changedAt).toBeInstanceOf(Date)
    expect(listed[1]?.changedBy?.id).toBe(engineer.userId)
  })

  it('counts the cells of the first case, and counts again when the book has changed', async () => {
    const at = await makeTeam()
    const { engineer } = at.people
    const id = await makeBook(at, { kind: 'starter', starter: 'salt' })
    const summary = async () => value(await listBooks(engineer, { team: at.slug }))[0]?.summary
    const solved = await summary()
    expect(solved).toMatchObject({ unknown: 0, atOdds: 0, degreesOfFreedom: 0 })
    expect(solved?.given).toBeGreaterThan(10)
    expect(solved?.solvable).toBeGreaterThan(50)
    expect(await summary()).toEqual(solved)
    const given = (await snapshot(engineer, id)).records.find((r) => r.kind === 'given' && r.quantity === 'flow')
    await mustWrite(engineer, id, change({ remove: given ? [given] : [] }))
    const open = await summary()
    expect(open).toMatchObject({ degreesOfFreedom: 1, given: (solved?.given ?? 0) - 1 })
    expect(open?.unknown).toBeGreaterThan(10)
    await mustWrite(engineer, id, change({ create: given ? [given] : [] }))
    expect(await summary()).toEqual(solved)
  })

  it('has no counts for a book that is too large to count on the way', async () => {
    const at = await makeTeam()
    const { engineer } = at.people
    const id = await makeBook(at)
    const tags = Array.from({ length: 200 }, (_, i) => `${i}`)
    await mustWrite(engineer, id, change({ create: tags.map((tag) => stream(tag)) }))
    await mustWrite(engineer, id, change({ create: tags.slice(0, 20).map((tag) => component(tag)) }))
    expect(value(await listBooks(engineer, { team: at.slug }))[0]?.summary).toBeNull()
  })

  it('is empty for those who open no book', async () => {
    const at = await makeTeam()
    await makeBook(at)
    for (const role of ['analyst', 'reader'] as const)
      expect(value(await listBooks(at.people[role], { team: at.slug }))).toEqual([])
  })

  it('loses an archived book and gets it back, both noted once', async () => {
    const at = await makeTeam()
    const { owner, checker } = at.people
    const id = await makeBook(at)
    const ids = async (archived?: boolean) =>
      value(await listBooks(checker, { team: at.slug, archived })).map((b) => b.id)
    const wanted = { team: at.slug, book: id }
    for (let i = 0; i < 2; i++) value(await archiveBook(owner, wanted))
    expect([await ids(), await ids(true)]).toEqual([[], [id]])
    expect(value(await getBook(owner, { book: id }))).toMatchObject({ archived: true, mayEdit: false })
    for (let i = 0; i < 2; i++) value(await restoreBook(owner, wanted))
    expect([await ids(), await ids(true)]).toEqual([[id], []])
    const events = await db.select().from(teamEvent).where(eq(teamEvent.subjectId, id)).orderBy(teamEvent.at)
    expect(events.map(({ action }) => action)).toEqual(['book.create', 'book.archive', 'book.restore'])
  })
})

describe('a book', () => {
  it('is found under its own team only', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { owner } = at.people
    const book = await makeBook(at)
    expect(codeOf(await getBook(owner, { book, team: at.slug }))).toBe('ok')
    expect(codeOf(await getBook(owner, { book, team: other.slug }))).toBe('notFound')
    expect(codeOf(await archiveBook(owner, { book, team: other.slug }))).toBe('notFound')
    expect(codeOf(await getBook(owner, { book: 'no-such-book' }))).toBe('notFound')
    expect(codeOf(await getBook(owner, { book: 'x\u0000' }))).not.toBe('ok')
  })

  it('cannot stand in a project of another team, whoever writes it', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const book = await makeBook(at)
    const moved = db.update(bookTable).set({ projectId: other.project }).where(eq(bookTable.id, book))
    await expect(moved).rejects.toMatchObject({ cause: { constraint: 'book_project_fk' } })
  })
})
