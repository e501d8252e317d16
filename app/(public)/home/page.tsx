import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import { FrontHeader } from '@/components/front/front-header'
import { EmptyState } from '@/components/ui/empty-state'
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
        <EmptyState level={1} title="You are in no team just now">
          <p>
            Your account is fine, but no team counts you as a member. Ask the owner of your team to let you in again.
          </p>
        </EmptyState>
      </main>
    </>
  )
}
