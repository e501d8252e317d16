import type { Metadata } from 'next'
import { EventsList } from '@/components/settings/events-list'
import { TeamRoom } from '@/components/settings/team-room'
import { listTeamEvents } from '@/lib/data/audit/list-team-events'
import { openTeam, valueFor } from '../../open-team'

export const metadata: Metadata = { title: 'What was done' }

export default async function EventsPage({ params, searchParams }: PageProps<'/[team]/settings/events'>) {
  const { team: slug } = await params
  const { after } = await searchParams
  const path = `/${slug}/settings/events`
  const { ctx, team } = await openTeam(slug, path)
  const page = await listTeamEvents(ctx, { team: slug, limit: 50, ...(typeof after === 'string' && { after }) })
  const { events, next } = valueFor(page, path)
  return (
    <TeamRoom team={team} room="events">
      <EventsList
        events={events}
        older={next === null ? null : `${path}?after=${encodeURIComponent(next)}`}
        newest={after === undefined ? null : path}
      />
    </TeamRoom>
  )
}
