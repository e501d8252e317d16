import { eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { user } from '@/db/schema/account'
import { member } from '@/db/schema/team'
import { makeTeam } from './new-team'

/**
 * Gives a new person a team of their own with a first project, unless they are in one already. Runs in the transaction
 * that makes the account: there is never a person who signed up and has nowhere to go.
 */
export async function makeFirstTeam(tx: Transaction, userId: string): Promise<void> {
  const [person] = await tx.select({ name: user.name }).from(user).where(eq(user.id, userId))
  if (!person) throw new Error(`No person ${userId} to make a team for`)
  const already = await tx.select({ id: member.id }).from(member).where(eq(member.userId, userId)).limit(1)
  if (already.length > 0) return
  await makeTeam(tx, { name: `${person.name}'s team`, ownerId: userId }, person.name)
}
