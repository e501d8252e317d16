import { eq } from 'drizzle-orm'
import { z } from 'zod'
import { user } from '@/db/schema/account'
import type { Context } from '@/lib/auth/context'
import type { Role } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { signedOut } from '../door/refusals'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

export type TeamView = {
  id: string
  slug: string
  name: string
  role: Role
  user: { id: string; name: string; email: string }
}

/** A team that the caller is in, with the caller and the caller's role in it. */
export function getTeam(ctx: Context, given: z.input<typeof input>): Promise<Result<TeamView>> {
  return inTeam(
    ctx,
    'team.see',
    input,
    given,
    async ({ tx, team, role, userId }) => {
      const me = { id: user.id, name: user.name, email: user.email }
      const [caller] = await tx.select(me).from(user).where(eq(user.id, userId))
      return caller ? ok({ ...team, role, user: caller }) : signedOut()
    },
    { readOnly: true },
  )
}
