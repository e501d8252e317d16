import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { db } from '@/db/client'
import { user } from '@/db/schema/account'
import { member, teamEvent } from '@/db/schema/team'
import type { Role } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { getBook } from '@/lib/data/book/get-book'
import { listBooks } from '@/lib/data/book/list-books'
import { listChanges } from '@/lib/data/book/list-changes'
import { writeChanges } from '@/lib/data/book/write-changes'
import { changeRole } from '@/lib/data/member/change-role'
import { deactivateMember } from '@/lib/data/member/deactivate-member'
import { listMembers } from '@/lib/data/member/list-members'
import { reactivateMember } from '@/lib/data/member/reactivate-member'
import { removeMember } from '@/lib/data/member/remove-member'
import { setMemberProjects } from '@/lib/data/member/set-member-projects'
import { listProjects } from '@/lib/data/project/list-projects'
import { setProjectMembers } from '@/lib/data/project/set-project-members'
import { leaveTeam } from '@/lib/data/team/leave-team'
import { mailsTo } from './post-box'
import { change, component } from './records'
import { codeOf, makeBook, makeTeam, type Person, type TestTeam, value } from './world'

const emailOf = ({ userId }: Person) => `${userId}@x.example`
const projectsOf = async (at: TestTeam, who: Person) =>
  value(await listProjects(who, { team: at.slug })).map(({ name }) => name)
const rolesOf = async (at: TestTeam) =>
  new Map((await db.select().from(member).where(eq(member.teamId, at.id))).map((row) => [row.userId, row]))

/** A team whose owners are these many, and nobody else's. */
async function teamOfOwners(count: 1 | 2): Promise<TestTeam> {
  const at = await makeTeam()
  if (count === 1) await db.delete(member).where(eq(member.userId, at.elsewhere.owner.userId))
  return at
}

describe('the list of members', () => {
  it('tells role, state and projects of each, those let go at the end', async () => {
    const at = await teamOfOwners(1)
    const { owner, analyst } = at.people
    const members = value(await listMembers(owner, { team: at.slug }))
    expect(members).toHaveLength(14)
    expect(members.slice(-5).every(({ state, deactivatedAt }) => state === 'deactivated' && deactivatedAt)).toBe(true)
    const row = (who: Person) => members.find(({ userId }) => userId === who.userId)
    expect(row(owner)).toMatchObject({
      role: 'owner',
      state: 'active',
      projects: 'all',
      isYou: true,
      isLastOwner: true,
    })
    expect(row(analyst)).toMatchObject({
      name: 'The analyst',
      email: emailOf(analyst),
      projects: [{ id: at.project, name: 'Mill' }],
      hasSecondFactor: false,
      isYou: false,
      isLastOwner: false,
    })
    expect(members.filter(({ isLastOwner }) => isLastOwner)).toHaveLength(1)
  })
})

describe('a role', () => {
  it('is changed at once, noted and mailed', async () => {
    const at = await makeTeam()
    const { owner, reader } = at.people
    const book = await makeBook(at)
    expect(codeOf(await getBook(reader, { book }))).toBe('notAllowed')
    value(await changeRole(owner, { team: at.slug, user: reader.userId, role: 'engineer' }))
    expect(value(await getBook(reader, { book })).mayEdit).toBe(true)
    const events = await db.select().from(teamEvent).where(eq(teamEvent.subjectId, reader.userId))
    expect(events).toMatchObject([
      { action: 'member.changeRole', by: owner.userId, detail: { name: 'The reader', from: 'reader', to: 'engineer' } },
    ])
    expect(await mailsTo(emailOf(reader))).toMatchObject([
      { kind: 'roleChanged', role: 'engineer', path: `/${at.slug}` },
    ])
  })

  it('that sees every project forgets the list of projects, so that it does not come back unasked', async () => {
    const at = await makeTeam()
    const { owner, reader } = at.people
    const become = (role: Role, projects?: string[]) =>
      changeRole(owner, { team: at.slug, user: reader.userId, role, ...(projects && { projects }) })
    value(await become('checker'))
    expect(await projectsOf(at, reader)).toEqual(['Mill', 'Quarry'])
    value(await become('reader'))
    expect(await projectsOf(at, reader)).toEqual([])
    value(await become('analyst', [at.otherProject, at.otherProject]))
    expect(await projectsOf(at, reader)).toEqual(['Quarry'])
    value(await become('reader'))
    expect(await projectsOf(at, reader)).toEqual(['Quarry'])
  })

  it('is not given for a project of another team, nor to a stranger', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { owner, checker } = at.people
    const give = (user: string, projects: string[]) =>
      changeRole(owner, { team: at.slug, user, role: 'reader', projects })
    expect(codeOf(await give(checker.userId, [other.project]))).toBe('notFound')
    expect(codeOf(await give(other.people.checker.userId, []))).toBe('notFound')
    expect((await rolesOf(at)).get(checker.userId)?.role).toBe('checker')
  })

  it.each(['admin', '', 'owner,reader'])('cannot be "%s"', async (role) => {
    const at = await makeTeam()
    const wanted = { team: at.slug, user: at.people.reader.userId, role: role as Role }
    expect(codeOf(await changeRole(at.people.owner, wanted))).toBe('badInput')
  })
})

describe('the last owner', () => {
  it('stays: is not demoted, let go, taken out, and does not leave', async () => {
    const at = await teamOfOwners(1)
    const { owner } = at.people
    const me = { team: at.slug, user: owner.userId }
    const results = [
      await changeRole(owner, { ...me, role: 'engineer' }),
      await deactivateMember(owner, me),
      await removeMember(owner, me),
      await leaveTeam(owner, { team: at.slug }),
    ]
    expect(results.map(codeOf)).toEqual(Array(4).fill('conflict'))
    expect((await rolesOf(at)).get(owner.userId)).toMatchObject({ role: 'owner', deactivatedAt: null })
    value(await changeRole(owner, { ...me, role: 'owner' }))
    value(await changeRole(owner, { team: at.slug, user: at.people.engineer.userId, role: 'owner' }))
    value(await leaveTeam(owner, { team: at.slug }))
  })

  it('is not counted among those who were let go', async () => {
    const at = await teamOfOwners(1)
    value(await changeRole(at.people.owner, { team: at.slug, user: at.gone.engineer.userId, role: 'owner' }))
    expect(codeOf(await leaveTeam(at.people.owner, { team: at.slug }))).toBe('conflict')
  })

  const ways: [string, (at: TestTeam, by: Person, of: Person) => Promise<{ ok: boolean }>][] = [
    ['demote', (at, by, of) => changeRole(by, { team: at.slug, user: of.userId, role: 'reader' })],
    ['let go', (at, by, of) => deactivateMember(by, { team: at.slug, user: of.userId })],
    ['take out', (at, by, of) => removeMember(by, { team: at.slug, user: of.userId })],
    ['leave', (at, _, of) => leaveTeam(of, { team: at.slug })],
  ]
  it.each(ways)('remains where two owners %s each other at the same moment', async (_, act) => {
    for (let turn = 0; turn < 5; turn++) {
      const at = await teamOfOwners(2)
      const [one, two] = [at.people.owner, at.elsewhere.owner]
      const results = await Promise.all([act(at, one, two), act(at, two, one)])
      expect(results.filter(({ ok }) => ok)).toHaveLength(1)
      const owners = [...(await rolesOf(at)).values()].filter((row) => row.role === 'owner' && !row.deactivatedAt)
      expect(owners).toHaveLength(1)
    }
  })

  it('who was demoted a moment ago demotes nobody, though there is a third', async () => {
    for (let turn = 0; turn < 5; turn++) {
      const at = await teamOfOwners(2)
      const [one, two] = [at.people.owner, at.elsewhere.owner]
      value(await changeRole(one, { team: at.slug, user: at.people.checker.userId, role: 'owner' }))
      const demote = (by: Person, of: Person) => changeRole(by, { team: at.slug, user: of.userId, role: 'engineer' })
      const codes = (await Promise.all([demote(one, two), demote(two, one)])).map(codeOf).sort()
      expect(codes).toEqual(['notAllowed', 'ok'])
    }
  })
})

describe('somebody who is let go', () => {
  it('is out with the next request, and the name stays on what they did', async () => {
    const at = await makeTeam()
    const { owner, engineer, checker } = at.people
    const book = await makeBook(at)
    value(await writeChanges(engineer, { book, changes: [change({ create: [component('W')] })] }))
    value(await deactivateMember(owner, { team: at.slug, user: engineer.userId }))
    const asks = [
      await getBook(engineer, { book }),
      await listBooks(engineer, { team: at.slug }),
      await writeChanges(engineer, { book, changes: [change({ create: [component('V')] })] }),
      await listMembers(engineer, { team: at.slug }),
    ]
    expect(asks.map(codeOf)).toEqual(Array(4).fill('notFound'))
    const { changes } = value(await listChanges(checker, { book, after: 1 }))
    expect(changes).toMatchObject([{ by: { id: engineer.userId, name: 'The engineer' } }])
    expect(await mailsTo(emailOf(engineer))).toMatchObject([{ kind: 'membership', event: 'deactivated' }])
    expect(codeOf(await deactivateMember(owner, { team: at.slug, user: engineer.userId }))).toBe('conflict')
  })

  it('comes back with the role and the projects from before', async () => {
    const at = await makeTeam()
    const { owner, reader } = at.people
    value(await deactivateMember(owner, { team: at.slug, user: reader.userId }))
    value(await reactivateMember(owner, { team: at.slug, user: reader.userId }))
    expect(await projectsOf(at, reader)).toEqual(['Mill'])
    expect(codeOf(await reactivateMember(owner, { team: at.slug, user: reader.userId }))).toBe('conflict')
    expect((await mailsTo(emailOf(reader)))[0]).toMatchObject({ event: 'reactivated' })
  })
})

describe('somebody who is taken out, or leaves', () => {
  it('is in no project either, and stays by name', async () => {
    const at = await makeTeam()
    const { owner, engineer, analyst, reader } = at.people
    const book = await makeBook(at)
    for (const { userId } of [engineer, analyst]) value(await removeMember(owner, { team: at.slug, user: userId }))
    value(await leaveTeam(reader, { team: at.slug }))
    for (const who of [engineer, analyst, reader])
      expect(codeOf(await listProjects(who, { team: at.slug }))).toBe('notFound')
    expect((await rolesOf(at)).has(reader.userId)).toBe(false)
    expect(value(await listChanges(owner, { book, after: 0 })).changes[0]?.by.name).toBe('The engineer')
    expect(await db.select().from(user).where(eq(user.id, engineer.userId))).toHaveLength(1)
    expect(await mailsTo(emailOf(engineer))).toMatchObject([{ event: 'removed' }])
    expect(await mailsTo(emailOf(reader))).toEqual([])
  })
})

describe('belonging to projects', () => {
  it('is set for one person, or for one project', async () => {
    const at = await makeTeam()
    const { owner, analyst, reader } = at.people
    const both = [at.project, at.otherProject]
    value(await setMemberProjects(owner, { team: at.slug, user: analyst.userId, projects: both }))
    expect(await projectsOf(at, analyst)).toEqual(['Mill', 'Quarry'])
    value(await setProjectMembers(owner, { team: at.slug, project: at.project, users: [reader.userId] }))
    expect(await projectsOf(at, analyst)).toEqual(['Quarry'])
    expect(await projectsOf(at, reader)).toEqual(['Mill'])
    value(await setProjectMembers(owner, { team: at.slug, project: at.project, users: [] }))
    expect(await projectsOf(at, reader)).toEqual([])
  })

  it('is refused for a project or a person of another team, and for who sees all in any case', async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const { owner, analyst, checker } = at.people
    const team = at.slug
    const results = [
      await setMemberProjects(owner, { team, user: analyst.userId, projects: [at.project, other.project] }),
      await setMemberProjects(owner, { team, user: other.people.analyst.userId, projects: [at.project] }),
      await setMemberProjects(owner, { team, user: checker.userId, projects: [at.project] }),
      await setProjectMembers(owner, { team, project: other.project, users: [analyst.userId] }),
      await setProjectMembers(owner, { team, project: at.project, users: [other.people.reader.userId] }),
      await setProjectMembers(owner, { team, project: at.project, users: [analyst.userId, newId()] }),
      await setProjectMembers(owner, { team, project: at.project, users: [checker.userId] }),
    ]
    const missing = 'notFound'
    expect(results.map(codeOf)).toEqual([missing, missing, 'conflict', missing, missing, missing, 'conflict'])
    expect(await projectsOf(at, analyst)).toEqual(['Mill'])
  })
})
