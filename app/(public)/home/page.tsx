import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { createTeam } from '@/app/(team)/[team]/actions'
import { FrontHeader } from '@/components/front/front-header'
import { NoTeam } from '@/components/team/no-team'
import { contextFrom } from '@/lib/auth/context'
import { listMyTeams } from '@/lib/data/team/list-my-teams'

/** Where signing in leads: to the first of one's teams. */
export default async function HomePage() {
  const teams = await listMyTeams(await contextFrom(await headers()), {})
  if (!teams.ok) redirect('/sign-in')
  const first = teams.value[0]
  if (first) redirect(`/${first.slug}/books`)
  return (
    <>
      <FrontHeader isSignedIn={false} bare />
      <main id="main" className="mx-auto max-w-2xl pt-[10vh]">
        <NoTeam createTeam={createTeam} />
      </main>
    </>
  )
}
