import { hashPassword } from 'better-auth/crypto'
import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { account, user } from '@/db/schema/account'
import { member, project, projectMember, team } from '@/db/schema/team'
import { isRole, type Role } from '@/lib/auth/permissions'
import accountsFile from './demo-accounts.json'
import { demoNames, demoProjects, demoTeam } from './demo-team'

export const idOf = (role: string): string => `demo-${role}`

const accounts = accountsFile.accounts.map(({ role, email }) => {
  if (!isRole(role)) throw new Error(`demo-accounts.json has the role ${role}, which there is not`)
  return { id: idOf(role), role, email, name: demoNames[role] }
})

/** Makes the accounts, the team, its projects and who belongs to them, where the team is not there yet. */
export async function seedTeam(tx: Transaction): Promise<void> {
  const [there] = await tx.select({ id: team.id }).from(team).where(eq(team.slug, demoTeam.slug))
  if (there?.id === demoTeam.id) return
  if (there) throw new Error(`The address ${demoTeam.slug} belongs to another team: the demo team cannot be made.`)

  const teamId = demoTeam.id
  const makerId = idOf('owner' satisfies Role)
  await tx.insert(user).values(accounts.map(({ id, name, email }) => ({ id, name, email, emailVerified: true })))
  const password = await hashPassword(accountsFile.password)
  const credential = { providerId: 'credential', password }
  await tx.insert(account).values(accounts.map(({ id }) => ({ id, userId: id, accountId: id, ...credential })))
  await tx.insert(team).values(demoTeam)
  await tx.insert(member).values(accounts.map(({ id, role }) => ({ id, teamId, userId: id, role })))
  await tx.insert(project).values(demoProjects.map(({ id, name }) => ({ id, teamId, name, createdBy: makerId })))
  const belongs = demoProjects.flatMap(({ id, members }) =>
    members.map((role) => ({ teamId, projectId: id, userId: idOf(role) })),
  )
  await tx.insert(projectMember).values(belongs)
}
