import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { session } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { fail, ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'
import { recordId } from '../door/words'

const input = z.strictObject({ session: recordId })

/** Ends one of the caller's own sessions: signed out there with the next request. */
export function endSession(ctx: Context, given: z.input<typeof input>): Promise<Result<{ session: string }>> {
  return asPerson(ctx, input, given, async (tx, userId, { session: id }) => {
    const mine = and(eq(session.userId, userId), eq(session.id, id))
    const [ended] = await tx.delete(session).where(mine).returning({ id: session.id })
    return ended ? ok({ session: id }) : fail('notFound', 'There is no such session of yours. It may have ended.')
  })
}
