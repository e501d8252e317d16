import { and, count, eq } from 'drizzle-orm'
import { z } from 'zod'
import { member } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { makeTeam } from '@/lib/auth/new-team'
import { fail, ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'
import { teamName } from '../door/words'

const input = z.strictObject({ name: teamName })

/** Far more than anybody runs; so that addresses of teams are not taken by the thousand. */
const mostOwned = 50

/** Makes another team, which the caller owns, with a first project in it. Gives back its address. */
export function createTeam(ctx: Context, given: z.input<typeof input>): Promise<Result<{ slug: string }>> {
  return asPerson(ctx, input, given, async (tx, userId, { name }) => {
    const owned = and(eq(member.userId, userId), eq(member.role, 'owner'))
    const [already] = await tx.select({ teams: count() }).from(member).where(owned)
    if ((already?.teams ?? 0) >= mostOwned)
      return fail('tooMany', `You own ${mostOwned} teams already, which is the most that one person may own.`)
    return ok({ slug: await makeTeam(tx, { name, ownerId: userId }) })
  })
}
