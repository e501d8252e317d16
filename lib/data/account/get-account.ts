import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'
import { signedOut } from '../door/refusals'

const input = z.strictObject({})

export type AccountView = { name: string; email: string; hasSecondFactor: boolean; createdAt: Date }

/** The caller's own account. */
export function getAccount(ctx: Context, given: z.input<typeof input>): Promise<Result<AccountView>> {
  const { name, email, twoFactorEnabled: hasSecondFactor, createdAt } = user
  return asPerson(
    ctx,
    input,
    given,
    async (tx, userId) => {
      const view = { name, email, hasSecondFactor, createdAt }
      const [me] = await tx.select(view).from(user).where(eq(user.id, userId))
      return me ? ok(me) : signedOut()
    },
    { readOnly: true },
  )
}
