import type { Transaction } from '@/db/client'
import { member, project, team, teamEvent } from '@/db/schema/team'
import { newId } from '@/lib/book/ids'
import { slugFrom } from './slugs'

type NewTeam = { name: string; ownerId: string }

/** Makes a team with its first owner and a first project to keep books in. Gives back its address. */
export async function makeTeam(tx: Transaction, { name, ownerId }: NewTeam, addressFrom = name): Promise<string> {
  const { id: teamId, slug } = await insertTeam(tx, name, slugFrom(addressFrom))
  await tx.insert(member).values({ id: newId(), teamId, userId: ownerId, role: 'owner' })
  const projectId = newId()
  await tx.insert(project).values({ id: projectId, teamId, name: 'First project', createdBy: ownerId })
  const event = { teamId, by: ownerId }
  await tx.insert(teamEvent).values([
    { ...event, id: newId(), action: 'team.create', subjectKind: 'team', subjectId: teamId, detail: { name } },
    { ...event, id: newId(), action: 'project.create', subjectKind: 'project', subjectId: projectId },
  ])
  return slug
}

/** Two people of one name may sign up at the same moment: the address is tried until it is free. */
async function insertTeam(tx: Transaction, name: string, wanted: string): Promise<{ id: string; slug: string }> {
  const candidates = [
    wanted,
    `${wanted}-2`,
    `${wanted}-3`,
    ...Array.from({ length: 5 }, () => `${wanted}-${newId().slice(0, 6)}`),
  ]
  for (const slug of candidates) {
    const [made] = await tx
      .insert(team)
      .values({ id: newId(), name, slug })
      .onConflictDoNothing({ target: team.slug })
      .returning({ id: team.id, slug: team.slug })
    if (made) return made
  }
  throw new Error(`No free address for the team of ${wanted}`)
}
