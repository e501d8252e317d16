import { eq, sql } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'
import { personName } from '../door/words'

const input = z.strictObject({ name: personName })

/** Changes the caller's own name, also where it stands beside what they did before. */
export function changeName(ctx: Context, given: z.input<typeof input>): Promise<Result<{ name: string }>> {
  return asPerson(ctx, input, given, async (tx, userId, { name }) => {
    await tx.update(user).set({ name, updatedAt: sql`now()` }).where(eq(user.id, userId))
    return ok({ name })
  })
}
