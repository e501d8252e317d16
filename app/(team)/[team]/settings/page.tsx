import type { Metadata } from 'next'
import { SettingsForm } from '@/components/settings/settings-form'
import { TeamRoom } from '@/components/settings/team-room'
import { mayDo } from '@/lib/auth/permissions'
import { getTeamSettings } from '@/lib/data/settings/get-team-settings'
import { openTeam, valueFor } from '../open-team'
import { updateTeamSettings } from './actions'

export const metadata: Metadata = { title: 'Team settings' }

export default async function SettingsPage({ params }: PageProps<'/[team]/settings'>) {
  const { team: slug } = await params
  const path = `/${slug}/settings`
  const { ctx, team } = await openTeam(slug, path)
  const settings = valueFor(await getTeamSettings(ctx, { team: slug }), path)
  return (
    <TeamRoom team={team} room="settings">
      <SettingsForm
        settings={settings}
        mayChange={mayDo(team.role, 'settings.change')}
        updateSettings={updateTeamSettings.bind(null, slug)}
      />
    </TeamRoom>
  )
}
