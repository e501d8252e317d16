import { desc, eq } from 'drizzle-orm'
import { z } from 'zod'
import { mailDelivery } from '@/db/schema/mail'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug, limit: z.number().int().min(1).max(500).default(100) })

export type DeliveryView = {
  id: string
  to: string
  kind: string
  subject: string
  state: 'queued' | 'failed' | 'sent' | 'given up'
  attempts: number
  /** Why the last attempt did not succeed, as a plain sentence. */
  lastError: string | null
  messageId: string
  createdAt: Date
  sentAt: Date | null
}

/** The mails that a team has sent or is sending, the newest first. What they say is not kept. */
export function listDeliveries(ctx: Context, given: z.input<typeof input>): Promise<Result<DeliveryView[]>> {
  const { id, to, kind, subject, state, attempts, lastError, messageId, createdAt, sentAt } = mailDelivery
  const view = { id, to, kind, subject, state, attempts, lastError, messageId, createdAt, sentAt }
  return inTeam(
    ctx,
    'mail.list',
    input,
    given,
    async ({ tx, team }, { limit }) =>
      ok(
        await tx
          .select(view)
          .from(mailDelivery)
          .where(eq(mailDelivery.teamId, team.id))
          .orderBy(desc(mailDelivery.createdAt), desc(mailDelivery.id))
          .limit(limit),
      ),
    { readOnly: true },
  )
}
