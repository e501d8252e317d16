import { TeamFrame } from '@/components/team/team-frame'
import { listMyTeams } from '@/lib/data/team/list-my-teams'
import { createTeam, leaveTeam } from './actions'
import { readTeam, requestContext } from './open-team'

export default async function TeamLayout({ children, params }: LayoutProps<'/[team]'>) {
  const team = await readTeam((await params).team)
  // The page in it knows its own address, and leads to signing in or to "not found".
  if (!team.ok) return children
  const teams = await listMyTeams(await requestContext(), {})
  const { slug, name, role, user } = team.value
  return (
    <TeamFrame
      team={{ slug, name, role }}
      teams={teams.ok ? teams.value.map((mine) => ({ slug: mine.slug, name: mine.name })) : []}
      person={{ name: user.name, email: user.email }}
      actions={{ createTeam, leaveTeam: leaveTeam.bind(null, slug) }}
    >
      {children}
    </TeamFrame>
  )
}
