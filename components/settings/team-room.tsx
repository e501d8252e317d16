import Link from 'next/link'
import type { ReactNode } from 'react'
import { classNames } from '@/components/ui/class-names'
import { type Action, mayDo } from '@/lib/auth/permissions'

type Room = 'members' | 'settings' | 'events' | 'mail'
type TeamRoomProps = { team: { slug: string; name: string; role: string }; room: Room; children: ReactNode }

const rooms: { room: Room; name: string; path: string; needs: Action }[] = [
  { room: 'members', name: 'People', path: 'members', needs: 'member.list' },
  { room: 'settings', name: 'Settings', path: 'settings', needs: 'settings.see' },
  { room: 'events', name: 'What was done', path: 'settings/events', needs: 'event.list' },
  { room: 'mail', name: 'Mail sent', path: 'settings/mail', needs: 'mail.list' },
]

/** The frame of the pages about a team itself. Shows the ways that this role has; each page asks again. */
export function TeamRoom({ team, room, children }: TeamRoomProps) {
  const open = rooms.filter(({ needs }) => mayDo(team.role, needs))
  return (
    <main id="main" className="mx-auto max-w-[1240px]">
      <header className="px-4 pt-4 sm:px-6">
        <h1 className="text-[1.5rem] leading-tight">Team</h1>
        <p className="truncate text-ink-2">{team.name}</p>
        <nav aria-label="About the team" className="mt-3 flex gap-1 overflow-x-auto border-b border-hair">
          {open.map(({ room: to, name, path }) => (
            <Link
              key={to}
              href={`/${team.slug}/${path}`}
              aria-current={to === room ? 'page' : undefined}
              className={classNames(
                '-mb-px border-b-2 px-3 py-2 whitespace-nowrap -outline-offset-2',
                to === room ? 'border-brook font-semibold text-ink' : 'border-transparent text-ink-2 hover:text-ink',
              )}
            >
              {name}
            </Link>
          ))}
        </nav>
      </header>
      <div className="grid gap-6 px-4 pt-5 pb-12 sm:px-6">{children}</div>
    </main>
  )
}
