import { and, eq, ne } from 'drizzle-orm'
import { z } from 'zod'
import { session, user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import { asPerson } from '../door/enter'

const input = z.strictObject({})

/** Ends all sessions of the caller but the one that asks, and tells by mail. Gives back how many. */
export function endOtherSessions(ctx: Context, given: z.input<typeof input>): Promise<Result<{ ended: number }>> {
  return asPerson(ctx, input, given, async (tx, userId) => {
    if (!ctx.sessionId) return fail('badInput', 'It is not known which session asks, so none was ended.')
    const others = and(eq(session.userId, userId), ne(session.id, ctx.sessionId))
    const ended = await tx.delete(session).where(others).returning({ id: session.id })
    const [me] = await tx.select({ name: user.name, email: user.email }).from(user).where(eq(user.id, userId))
    if (me && ended.length > 0) {
      const at = new Date().toISOString()
      const message = { kind: 'securityNotice', name: me.name, event: 'sessionsEnded', at, path: '/account' } as const
      await enqueueMail(tx, { to: me.email, message, teamId: null })
    }
    return ok({ ended: ended.length })
  })
}
