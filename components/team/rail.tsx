'use client'

import { BookOpen, Users } from 'lucide-react'
import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { classNames } from '@/components/ui/class-names'
import { WaveMark } from '@/components/ui/wave-mark'
import { mayDo } from '@/lib/auth/permissions'
import { PersonMenu, type PersonMenuProps } from './person-menu'

/** The team's rooms: a rail at the leading edge, a bar at the top of a narrow screen. */
export function Rail(props: PersonMenuProps) {
  const pathname = usePathname()
  const books = `/${props.team.slug}/books`
  const members = `/${props.team.slug}/members`
  const isWithin = (path: string) => pathname === path || pathname.startsWith(`${path}/`)
  return (
    <header className="sticky top-0 z-30 flex h-(--top-bar) flex-none items-center gap-2 border-b border-hair bg-rail px-3 sm:h-dvh sm:w-16 sm:flex-col sm:gap-1.5 sm:border-e sm:border-b-0 sm:px-0 sm:py-3.5">
      <Link href={books} aria-label={`Tallybrook, ${props.team.name}`} className="rounded-md p-1 sm:mb-2.5">
        <WaveMark className="w-7 text-brook" />
      </Link>
      <nav aria-label="Rooms" className="flex gap-1.5 sm:flex-col">
        <RailLink href={books} isCurrent={isWithin(books)}>
          <BookOpen className="size-[18px]" aria-hidden="true" />
          Books
        </RailLink>
        {mayDo(props.team.role, 'member.list') ? (
          <RailLink href={members} isCurrent={[members, `/${props.team.slug}/settings`].some(isWithin)}>
            <Users className="size-[18px]" aria-hidden="true" />
            Team
          </RailLink>
        ) : null}
      </nav>
      <div className="ms-auto sm:ms-0 sm:mt-auto">
        <PersonMenu {...props} />
      </div>
    </header>
  )
}

function RailLink({ href, isCurrent, children }: { href: string; isCurrent: boolean; children: React.ReactNode }) {
  return (
    <Link
      href={href}
      aria-current={isCurrent ? 'page' : undefined}
      className={classNames(
        'flex items-center gap-2 rounded-control px-3 py-1.5 text-xs sm:w-[52px] sm:flex-col sm:gap-0.5 sm:px-0 sm:py-2',
        isCurrent ? 'bg-brook-wash font-semibold text-brook' : 'text-ink-2 hover:text-ink',
      )}
    >
      {children}
    </Link>
  )
}
