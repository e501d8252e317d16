import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { user } from '@/db/schema/account'
import { member, project, team, teamEvent } from '@/db/schema/team'
import { newId } from '@/lib/book/ids'
import { slugFrom } from './slugs'

/**
 * Gives a new person a team of their own with a first project, unless they are in one already. Runs in the transaction
 * that makes the account: there is never a person who signed up and has nowhere to go.
 */
export async function makeFirstTeam(tx: Transaction, userId: string): Promise<void> {
  const [person] = await tx.select({ name: user.name }).from(user).where(eq(user.id, userId))
  if (!person) throw new Error(`No person ${userId} to make a team for`)
  const already = await tx.select({ id: member.id }).from(member).where(eq(member.userId, userId)).limit(1)
  if (already.length > 0) return

  const teamId = await insertTeam(tx, person.name)
  await tx.insert(member).values({ id: newId(), teamId, userId, role: 'owner' })
  const projectId = newId()
  await tx.insert(project).values({ id: projectId, teamId, name: 'First project', createdBy: userId })
  const event = { teamId, by: userId }
  await tx.insert(teamEvent).values([
    { ...event, id: newId(), action: 'team.create', subjectKind: 'team', subjectId: teamId },
    { ...event, id: newId(), action: 'project.create', subjectKind: 'project', subjectId: projectId },
  ])
}

/** Two people of one name may sign up at the same moment: the address is tried until it is free. */
async function insertTeam(tx: Transaction, person: string): Promise<string> {
  const wanted = slugFrom(person)
  const candidates = [
    wanted,
    `${wanted}-2`,
    `${wanted}-3`,
    ...Array.from({ length: 5 }, () => `${wanted}-${newId().slice(0, 6)}`),
  ]
  for (const slug of candidates) {
    const values = { id: newId(), name: `${person}'s team`, slug }
    const [made] = await tx
      .insert(team)
      .values(values)
      .onConflictDoNothing({ target: team.slug })
      .returning({ id: team.id })
    if (made) return made.id
  }
  throw new Error(`No free address for the team of ${wanted}`)
}
