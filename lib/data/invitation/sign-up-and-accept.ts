import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import type { Transaction } from '@/db/client'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { hashNewPassword, makeProvenPerson } from '@/lib/auth/new-person'
import { fail, failParse, ok, type Result } from '@/lib/errors'
import { invitationOf, type OpenInvitation } from '../door/invitations'
import { joinTeam } from '../door/join-team'
import { transact } from '../door/transact'
import { mailedToken, newPassword, personName } from '../door/words'

const input = z.strictObject({ token: mailedToken, name: personName, password: newPassword })

/**
 * Makes an account of the invited address and joins the team. The address counts as confirmed: the token was mailed to
 * it. No team of their own is made for them. Nobody is signed in by this: sign in with the password just chosen.
 */
export async function signUpAndAccept(
  ctx: Context,
  given: z.input<typeof input>,
): Promise<Result<{ team: string; email: string }>> {
  if (ctx.userId !== null)
    return fail('notAllowed', 'You are signed in. Accept the invitation with your account, or sign out first.')
  const parsed = input.safeParse(given)
  if (!parsed.success) return failParse(parsed.error)
  const { token, name, password } = parsed.data
  // Looked at first, so that a wrong token costs no hashing.
  const possible = await transact((tx) => openFor(tx, token), { readOnly: true })
  if (!possible.ok) return possible
  const passwordHash = await hashNewPassword(password)
  return transact(async (tx) => {
    const open = await openFor(tx, token, { lock: true })
    if (!open.ok) return open
    const { invitation, team } = open.value
    const { email } = invitation
    const userId = await makeProvenPerson(tx, { email, name, passwordHash })
    if (userId === null) return hasAccount(email)
    const joined = await joinTeam(tx, open.value, userId)
    return joined.ok ? ok({ team: team.slug, email }) : joined
  })
}

/** The invitation, if its address has no account that somebody has confirmed. */
async function openFor(
  tx: Transaction,
  token: string,
  manner: { lock?: boolean } = {},
): Promise<Result<OpenInvitation>> {
  const open = await invitationOf(tx, token, manner)
  if (!open.ok) return open
  const { email } = open.value.invitation
  const proven = and(eq(user.email, email), eq(user.emailVerified, true))
  const [account] = await tx.select({ id: user.id }).from(user).where(proven)
  return account ? hasAccount(email) : open
}

const hasAccount = (email: string) =>
  fail('conflict', `${email} has an account already. Sign in with it and accept then.`)
