import Link from 'next/link'
import { buttonClasses } from '@/components/ui/button'
import type { TeamEventView } from '@/lib/data/audit/list-team-events'
import { eventSentence } from './event-words'
import { Moment } from './moment'

type EventsListProps = {
  events: readonly TeamEventView[]
  /** Where older ones are, and the newest; null where there are none, or they are these. */
  older: string | null
  newest: string | null
}

/** What was done in a team, as sentences, the newest first. */
export function EventsList({ events, older, newest }: EventsListProps) {
  return (
    <section aria-labelledby="events" className="grid gap-3">
      <header>
        <h2 id="events" className="text-lg">
          What was done
        </h2>
        <p className="text-ink-2">
          People, projects, books and settings. It cannot be changed. What was edited in a book is in its own history.
        </p>
      </header>
      {events.length === 0 ? (
        <p>Nothing is older than this.</p>
      ) : (
        <ol className="sheet overflow-hidden">
          {events.map((event) => (
            <li
              key={event.id}
              className="grid gap-x-4 border-b border-hair px-3 py-2 last:border-b-0 sm:grid-cols-[11rem_1fr]"
            >
              <span className="text-sm leading-[1.6] text-ink-2 tabular-nums">
                <Moment at={event.at} />
              </span>
              <span className="wrap-anywhere">{eventSentence(event)}</span>
            </li>
          ))}
        </ol>
      )}
      <nav aria-label="Pages" className="flex flex-wrap gap-2">
        {newest ? (
          <Link href={newest} className={buttonClasses()}>
            Newest
          </Link>
        ) : null}
        {older ? (
          <Link href={older} className={buttonClasses()}>
            Older
          </Link>
        ) : null}
      </nav>
    </section>
  )
}
