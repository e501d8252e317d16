import { and, asc, eq, isNull } from 'drizzle-orm'
import { z } from 'zod'
import { member, team } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { asPerson } from '../door/enter'

const input = z.strictObject({})

export type MyTeam = { id: string; slug: string; name: string; role: Role }

/** The teams that the caller is in, by name. */
export function listMyTeams(ctx: Context, given: z.input<typeof input>): Promise<Result<MyTeam[]>> {
  const mine = { id: team.id, slug: team.slug, name: team.name, role: member.role }
  return asPerson(
    ctx,
    input,
    given,
    async (tx, userId) =>
      ok(
        await tx
          .select(mine)
          .from(member)
          .innerJoin(team, eq(team.id, member.teamId))
          .where(and(eq(member.userId, userId), isNull(member.deactivatedAt)))
          .orderBy(asc(team.name), asc(team.id)),
      ),
    { readOnly: true },
  )
}
