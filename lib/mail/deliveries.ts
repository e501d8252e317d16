import { and, eq, inArray, isNull, lt, or, sql } from 'drizzle-orm'
import { db } from '@/db/client'
import { mailDelivery } from '@/db/schema/mail'

export type Delivery = typeof mailDelivery.$inferSelect

const isOpen = inArray(mailDelivery.state, ['queued', 'failed'])
const isFree = or(isNull(mailDelivery.heldUntil), lt(mailDelivery.heldUntil, sql`now()`))
const now = sql<Date>`now()`

/** What a worker found when it wanted to send a mail. */
export type Claim = { kind: 'mine'; delivery: Delivery } | { kind: 'done' } | { kind: 'held' }

/**
 * Takes a mail for `seconds`, in one statement: of several workers one gets it. 'held': another worker is sending it, or
 * died doing so less than that ago. 'done': sent, given up, or gone.
 */
export async function claimDelivery(id: string, seconds: number): Promise<Claim> {
  const [delivery] = await db
    .update(mailDelivery)
    .set({
      heldUntil: sql`now() + make_interval(secs => ${seconds})`,
      attempts: sql`${mailDelivery.attempts} + 1`,
    })
    .where(and(eq(mailDelivery.id, id), isOpen, isFree))
    .returning()
  if (delivery) return { kind: 'mine', delivery }
  const [left] = await db
    .select({ id: mailDelivery.id })
    .from(mailDelivery)
    .where(and(eq(mailDelivery.id, id), isOpen))
  return left ? { kind: 'held' } : { kind: 'done' }
}

export async function noteSent(id: string): Promise<void> {
  await db
    .update(mailDelivery)
    .set({ state: 'sent', sentAt: now, sealed: null, lastError: null, heldUntil: null })
    .where(and(eq(mailDelivery.id, id), isOpen))
}

/** It will be tried again. */
export async function noteFailed(id: string, lastError: string): Promise<void> {
  await db
    .update(mailDelivery)
    .set({ state: 'failed', lastError, heldUntil: null })
    .where(and(eq(mailDelivery.id, id), isOpen))
}

/** It will not be tried again, and what it said is forgotten. */
export async function giveUp(id: string, lastError: string): Promise<void> {
  await db
    .update(mailDelivery)
    .set({ state: 'given up', lastError, sealed: null, heldUntil: null })
    .where(and(eq(mailDelivery.id, id), isOpen))
}

/**
 * Gives up what no worker will come back to: mails whose link has run out, and mails so old that their job is gone (its
 * server died at the last try). So no secret stays longer than it is good for. Gives back how many.
 */
export async function giveUpStale(): Promise<number> {
  const stale = await db
    .update(mailDelivery)
    .set({
      state: 'given up',
      sealed: null,
      heldUntil: null,
      lastError: sql`coalesce(${mailDelivery.lastError}, 'It could not be sent in time.')`,
    })
    .where(
      and(
        isOpen,
        isFree,
        or(lt(mailDelivery.validUntil, now), lt(mailDelivery.createdAt, sql`now() - interval '2 days'`)),
      ),
    )
    .returning({ id: mailDelivery.id })
  return stale.length
}
