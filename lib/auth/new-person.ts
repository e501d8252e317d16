import { hashPassword } from 'better-auth/crypto'
import { and, eq } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { account, session, user } from '@/db/schema/account'
import { newId } from '@/lib/book/ids'

/** Somebody whose address a mailed link has proven. `passwordHash`: by `hashNewPassword`. */
type NewPerson = { email: string; name: string; passwordHash: string }

/** Slow on purpose: done before a transaction, not in it. */
export const hashNewPassword = (password: string): Promise<string> => hashPassword(password)

/**
 * Makes the account of a person with a proven address, in no team yet. An account that somebody made with this address
 * without ever confirming it is taken over: whoever made it could not read its mail. Gives back the id; null where the
 * address has an account that was confirmed.
 */
export async function makeProvenPerson(tx: Transaction, person: NewPerson): Promise<string | null> {
  const { email, name, passwordHash: password } = person
  const fresh = { id: newId(), email, name, emailVerified: false }
  await tx.insert(user).values(fresh).onConflictDoNothing({ target: user.email })
  const { id, emailVerified } = user
  const [found] = await tx.select({ id, emailVerified }).from(user).where(eq(user.email, email)).for('update')
  if (!found || found.emailVerified) return null
  const userId = found.id
  await tx.update(user).set({ name, emailVerified: true, updatedAt: new Date() }).where(eq(user.id, userId))
  await tx.delete(session).where(eq(session.userId, userId))
  await tx.delete(account).where(and(eq(account.userId, userId), eq(account.providerId, 'credential')))
  await tx.insert(account).values({ id: newId(), userId, accountId: userId, providerId: 'credential', password })
  return userId
}
