import { db } from '@/db/client'
import { user } from '@/db/schema/account'
import { member, project, projectMember, team } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { type Role, roles } from '@/lib/auth/permissions'
import { newId } from '@/lib/book/ids'
import { createBook } from '@/lib/data/book/create-book'
import type { Result } from '@/lib/errors'

export type Person = Context & { userId: string; role: Role }
export type TestTeam = {
  id: string
  slug: string
  /** One person for each role; the analyst and the reader belong to `project`. */
  people: Record<Role, Person>
  /** An analyst and a reader who belong to `otherProject` instead; the other roles belong to all. */
  elsewhere: Record<Role, Person>
  /** One for each role who has been let go. */
  gone: Record<Role, Person>
  project: string
  otherProject: string
}

export const nobody: Context = { userId: null, requestId: 'test' }

/** A team of its own for one test: tests share a database, and nothing else. */
export async function makeTeam(): Promise<TestTeam> {
  const id = newId()
  const slug = `team-${id}`
  await db.insert(team).values({ id, slug, name: `Team ${id}` })
  const people = await makePeople(id)
  const elsewhere = await makePeople(id)
  const gone = await makePeople(id, new Date())
  const [projectId, otherProject] = [newId(), newId()]
  const createdBy = people.owner.userId
  await db.insert(project).values([
    { id: projectId, teamId: id, name: 'Mill', createdBy },
    { id: otherProject, teamId: id, name: 'Quarry', createdBy },
  ])
  const belong = (projectOf: string, who: Record<Role, Person>) =>
    (['analyst', 'reader'] as const).map((role) => ({ teamId: id, projectId: projectOf, userId: who[role].userId }))
  await db.insert(projectMember).values([...belong(projectId, people), ...belong(otherProject, elsewhere)])
  return { id, slug, people, elsewhere, gone, project: projectId, otherProject }
}

async function makePeople(teamId: string, deactivatedAt: Date | null = null): Promise<Record<Role, Person>> {
  const made = roles.map((role) => ({ userId: newId(), requestId: 'test', role }))
  await db
    .insert(user)
    .values(made.map(({ userId, role }) => ({ id: userId, name: `The ${role}`, email: `${userId}@x.example` })))
  await db.insert(member).values(made.map(({ userId, role }) => ({ id: newId(), teamId, userId, role, deactivatedAt })))
  return Object.fromEntries(made.map((person) => [person.role, person])) as Record<Role, Person>
}

/** The value of a result that has to be ok. */
export function value<T>(result: Result<T>): T {
  if (result.ok) return result.value
  throw new Error(`Refused: ${result.error.code}: ${result.error.message} ${JSON.stringify(result.error.issues ?? '')}`)
}

/** What a result was refused with; 'ok' where it was not. */
export const codeOf = (result: Result<unknown>): string => (result.ok ? 'ok' : result.error.code)

type Origin = Parameters<typeof createBook>[1]['from']
export const blank: Origin = { kind: 'blank', basis: 'mass', flowUnit: 'kg/h' }

export async function makeBook(at: TestTeam, from: Origin = blank): Promise<string> {
  const book = { team: at.slug, projectId: at.project, name: 'Press section', from }
  return value(await createBook(at.people.engineer, book)).id
}
