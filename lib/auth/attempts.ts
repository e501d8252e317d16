import { createHash } from 'node:crypto'
import { eq, lt, sql } from 'drizzle-orm'
import { db } from '@/db/client'
import { attempt } from '@/db/schema/account'

/** What is counted against one address, known here or not, from wherever it is tried. `most` within `minutes`. */
const limits = {
  signIn: { most: 20, minutes: 15 },
  mail: { most: 5, minutes: 60 },
} as const
type Tried = keyof typeof limits

const longestMinutes = 60
const keyOf = (tried: Tried, address: string) =>
  `${tried}:${createHash('sha256').update(address.trim().toLowerCase()).digest('base64url')}`
const started = (minutes: number) => sql`now() - make_interval(mins => ${minutes})`

/** Counts one more try. False: too many within the time, this one included. */
export async function countAttempt(tried: Tried, address: string): Promise<boolean> {
  const { most, minutes } = limits[tried]
  const isOver = sql`${attempt.since} < ${started(minutes)}`
  const [row] = await db
    .insert(attempt)
    .values({ key: keyOf(tried, address), count: 1 })
    .onConflictDoUpdate({
      target: attempt.key,
      set: {
        count: sql`case when ${isOver} then 1 else ${attempt.count} + 1 end`,
        since: sql`case when ${isOver} then now() else ${attempt.since} end`,
      },
    })
    .returning({ count: attempt.count })
  const count = row?.count ?? 1
  if (count === 1) await db.delete(attempt).where(lt(attempt.since, started(longestMinutes)))
  return count <= most
}

/** It was the right person after all: nothing is held against the address. */
export async function forgetAttempts(tried: Tried, address: string): Promise<void> {
  await db.delete(attempt).where(eq(attempt.key, keyOf(tried, address)))
}
