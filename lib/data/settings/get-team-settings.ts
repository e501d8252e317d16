import { z } from 'zod'
import type { Context } from '@/lib/auth/context'
import { ok, type Result } from '@/lib/errors'
import { inTeam } from '../door/enter'
import { settingsOf, type TeamSettings } from '../door/team-settings'
import { teamSlug } from '../door/words'

const input = z.strictObject({ team: teamSlug })

export type TeamSettingsView = TeamSettings & { name: string }

/** What a team has chosen for its books and people, or the defaults. */
export function getTeamSettings(ctx: Context, given: z.input<typeof input>): Promise<Result<TeamSettingsView>> {
  return inTeam(
    ctx,
    'settings.see',
    input,
    given,
    async ({ tx, team }) => ok({ name: team.name, ...(await settingsOf(tx, team.id)) }),
    { readOnly: true },
  )
}
