import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { failParse, ok, type Result } from '@/lib/errors'
import { invitationOf } from '../door/invitations'
import { transact } from '../door/transact'
import { mailedToken } from '../door/words'

const input = z.strictObject({ token: mailedToken })

export type InvitationLook = {
  team: string
  inviter: string
  role: Role
  projects: string[]
  email: string
  expiresAt: Date
  /** Whether this address has an account: sign in and accept, or make one and accept. Told to who has the mail only. */
  hasAccount: boolean
  /** Who looks: nobody signed in, the one who is invited, or somebody signed in with another address. */
  you: { kind: 'nobody' } | { kind: 'invited' } | { kind: 'somebodyElse'; email: string }
}

/** What an invitation is for, for the page that its mailed link opens; also for who is signed out. */
export async function lookInvitation(ctx: Context, given: z.input<typeof input>): Promise<Result<InvitationLook>> {
  const parsed = input.safeParse(given)
  if (!parsed.success) return failParse(parsed.error)
  return transact(
    async (tx) => {
      const open = await invitationOf(tx, parsed.data.token)
      if (!open.ok) return open
      const { invitation, team, inviter, projects } = open.value
      const { email, role, expiresAt } = invitation
      const proven = and(eq(user.email, email), eq(user.emailVerified, true))
      const [account] = await tx.select({ id: user.id }).from(user).where(proven)
      const me = ctx.userId === null ? [] : await tx.select().from(user).where(eq(user.id, ctx.userId))
      return ok({
        team: team.name,
        inviter,
        role,
        projects: projects.map(({ name }) => name),
        email,
        expiresAt,
        hasAccount: account !== undefined,
        you: whoLooks(me[0]?.email, email),
      })
    },
    { readOnly: true },
  )
}

function whoLooks(mine: string | undefined, invited: string): InvitationLook['you'] {
  if (mine === undefined) return { kind: 'nobody' }
  return mine === invited ? { kind: 'invited' } : { kind: 'somebodyElse', email: mine }
}
