'use server'

import { perform } from '@/app/perform'
import type { SettingsChanges } from '@/components/settings/types'
import * as update from '@/lib/data/settings/update-team-settings'

/** The name of the team stands in its frame too, round every page. */
const shownAt = { path: '/[team]', kind: 'layout' } as const

export async function updateTeamSettings(team: string, changes: SettingsChanges) {
  return perform((ctx) => update.updateTeamSettings(ctx, { team, changes }), shownAt)
}
