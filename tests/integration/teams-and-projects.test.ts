import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { member, teamEvent } from '@/db/schema/team'
import { newId } from '@/lib/book/ids'
import { archiveBook } from '@/lib/data/book/archive-book'
import { createBook } from '@/lib/data/book/create-book'
import { createProject } from '@/lib/data/project/create-project'
import { listProjects } from '@/lib/data/project/list-projects'
import { renameProject } from '@/lib/data/project/rename-project'
import { getTeam } from '@/lib/data/team/get-team'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { blank, codeOf, makeBook, makeTeam, value } from './world'

describe('teams', () => {
  it('are the ones that one is in, with the role in each', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { userId } = at.people.owner
    await db.insert(member).values({ id: newId(), teamId: other.id, userId, role: 'reader' })
    const mine = value(await listMyTeams(at.people.owner, {}))
    expect(mine.map(({ slug, role }) => [slug, role]).sort()).toEqual(
      [
        [at.slug, 'owner'],
        [other.slug, 'reader'],
      ].sort(),
    )
    expect(value(await getTeam(at.people.owner, { team: other.slug })).role).toBe('reader')
    expect(codeOf(await createProject(at.people.owner, { team: other.slug, name: 'Kiln' }))).toBe('notAllowed')
  })

  it('tell who one is', async () => {
    const at = await makeTeam()
    const { userId } = at.people.checker
    expect(value(await getTeam(at.people.checker, { team: at.slug }))).toEqual({
      id: at.id,
      slug: at.slug,
      name: `Team ${at.id}`,
      role: 'checker',
      user: { id: userId, name: 'The checker', email: `${userId}@x.example` },
    })
  })

  it.each(['nobody-has-this', 'api', 'A B', "'; select 1", '', 'x\u0000'])('are not found at "%s"', async (slug) => {
    const at = await makeTeam()
    expect(codeOf(await getTeam(at.people.owner, { team: slug }))).toBe('notFound')
  })
})

describe('projects', () => {
  const names = async (at: Awaited<ReturnType<typeof makeTeam>>, who: keyof typeof at.people, from = at.people) =>
    value(await listProjects(from[who], { team: at.slug })).map(({ name }) => name)

  it('are all seen by owners, engineers and checkers, and by others where they belong', async () => {
    const at = await makeTeam()
    for (const role of ['owner', 'engineer', 'checker'] as const)
      expect(await names(at, role)).toEqual(['Mill', 'Quarry'])
    for (const role of ['analyst', 'reader'] as const) {
      expect(await names(at, role)).toEqual(['Mill'])
      expect(await names(at, role, at.elsewhere)).toEqual(['Quarry'])
    }
  })

  it('count the books that one may open', async () => {
    const at = await makeTeam()
    const book = await makeBook(at)
    await makeBook(at)
    const counts = async (who: 'engineer' | 'reader') =>
      value(await listProjects(at.people[who], { team: at.slug })).map(({ bookCount }) => bookCount)
    expect(await counts('engineer')).toEqual([2, 0])
    expect(await counts('reader')).toEqual([0])
    value(await archiveBook(at.people.owner, { team: at.slug, book }))
    expect(await counts('engineer')).toEqual([1, 0])
  })

  it('are made and renamed by an owner, and both are noted', async () => {
    const at = await makeTeam()
    const { owner } = at.people
    const { id } = value(await createProject(owner, { team: at.slug, name: '  Kiln ' }))
    expect(await names(at, 'owner')).toEqual(['Kiln', 'Mill', 'Quarry'])
    value(await renameProject(owner, { team: at.slug, project: id, name: 'Lime kiln' }))
    expect(await names(at, 'owner')).toEqual(['Lime kiln', 'Mill', 'Quarry'])
    const events = await db.select().from(teamEvent).where(eq(teamEvent.subjectId, id)).orderBy(teamEvent.at)
    expect(events).toMatchObject([
      { teamId: at.id, by: owner.userId, action: 'project.create', detail: { name: 'Kiln' } },
      { teamId: at.id, by: owner.userId, action: 'project.rename', detail: { from: 'Kiln', to: 'Lime kiln' } },
    ])
  })

  it('have names of their own', async () => {
    const at = await makeTeam()
    const { owner } = at.people
    const made = await createProject(owner, { team: at.slug, name: 'Mill' })
    expect(made).toMatchObject({ ok: false, error: { code: 'conflict', message: expect.stringContaining('Mill') } })
    expect(codeOf(await renameProject(owner, { team: at.slug, project: at.otherProject, name: 'Mill' }))).toBe(
      'conflict',
    )
    value(await renameProject(owner, { team: at.slug, project: at.project, name: 'Mill' }))
    const results = await Promise.all(
      Array.from({ length: 5 }, () => createProject(owner, { team: at.slug, name: 'Kiln' })),
    )
    expect(results.map(codeOf).sort()).toEqual(['conflict', 'conflict', 'conflict', 'conflict', 'ok'])
  })

  it.each(['', '   ', 'x'.repeat(121), 'a\u0000b'])('cannot be called "%s"', async (name) => {
    const at = await makeTeam()
    expect(codeOf(await createProject(at.people.owner, { team: at.slug, name }))).toBe('badInput')
  })

  it('of another team are not there: for its books, its name, its owner', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { owner } = at.people
    const book = { team: at.slug, projectId: other.project, name: 'Press', from: blank }
    expect(codeOf(await createBook(owner, book))).toBe('notFound')
    expect(codeOf(await renameProject(owner, { team: at.slug, project: other.project, name: 'Kiln' }))).toBe('notFound')
  })
})
