import { and, desc, eq, gt, sql } from 'drizzle-orm'
import { z } from 'zod'
import { session } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'

const input = z.strictObject({})

export type SessionView = {
  id: string
  /** The one that asks. */
  isThis: boolean
  signedInAt: Date
  /** To the day: a session is noted as seen once a day. */
  seenAt: Date
  expiresAt: Date
  ipAddress: string | null
  userAgent: string | null
}

/** Where the caller is signed in, the latest seen first. Never the secrets of the sessions. */
export function listMySessions(ctx: Context, given: z.input<typeof input>): Promise<Result<SessionView[]>> {
  const { id, createdAt: signedInAt, updatedAt: seenAt, expiresAt, ipAddress, userAgent } = session
  return asPerson(
    ctx,
    input,
    given,
    async (tx, userId) => {
      const rows = await tx
        .select({ id, signedInAt, seenAt, expiresAt, ipAddress, userAgent })
        .from(session)
        .where(and(eq(session.userId, userId), gt(session.expiresAt, sql`now()`)))
        .orderBy(desc(seenAt), desc(id))
      return ok(rows.map((row) => ({ ...row, isThis: row.id === ctx.sessionId })))
    },
    { readOnly: true },
  )
}
