'use client'

import { CircleUserRound, DoorOpen, LogOut, Plus } from 'lucide-react'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { LeaveDialog } from '@/components/members/member-dialogs'
import { Menu, MenuChoice, MenuItem, MenuLabel, MenuRule } from '@/components/ui/menu'
import { themeOptions, useThemeChoice } from '@/components/ui/theme'
import { notifyProblem } from '@/components/ui/toast'
import { authClient } from '@/lib/auth/client'
import { NewTeamDialog, type TeamActions } from './new-team-dialog'

export type PersonMenuProps = {
  team: { slug: string; name: string; role: string }
  teams: readonly { slug: string; name: string }[]
  person: { name: string; email: string }
  actions: TeamActions
}

/** "Ada Lovelace" -> "AL". By grapheme, so that no letter is cut in half. */
export function initials(name: string): string {
  const words = name.trim().split(/\s+/)
  const first = (word: string | undefined) =>
    word ? ([...new Intl.Segmenter().segment(word)][0]?.segment.toUpperCase() ?? '') : ''
  return first(words[0]) + (words.length > 1 ? first(words.at(-1)) : '')
}

/** Who is signed in, and as what; account, teams, theme and signing out. */
export function PersonMenu({ team, teams, person, actions }: PersonMenuProps) {
  const router = useRouter()
  const { choice, choose } = useThemeChoice()
  const [isLeaving, setLeaving] = useState(false)
  const [open, setOpen] = useState<'newTeam' | 'leaveTeam' | null>(null)

  const signOut = async () => {
    setLeaving(true)
    try {
      const { error } = await authClient.signOut()
      // A whole page load: nothing of the team stays in the router's cache for the next person at this machine.
      if (!error) return window.location.assign('/sign-in')
    } catch {
      // Said below.
    }
    setLeaving(false)
    notifyProblem('You are still signed in: the server did not answer. Try again.')
  }

  const menu = (
    <Menu
      align="end"
      side="top"
      label={`${person.name}, ${person.email}, ${team.role} of ${team.name}`}
      trigger={
        <button
          type="button"
          className="grid size-8 place-items-center rounded-full border border-hair-2 text-xs hover:border-edge data-[state=open]:border-brook data-[state=open]:text-brook"
        >
          <span aria-hidden="true">{initials(person.name)}</span>
          <span className="sr-only">
            {person.name}, {team.role} of {team.name}
          </span>
        </button>
      }
    >
      <div aria-hidden="true" className="max-w-64 px-2.5 pt-1.5 pb-1">
        <p className="truncate font-semibold">{person.name}</p>
        <p className="truncate text-sm text-ink-2">{person.email}</p>
        <p className="text-sm text-ink-2">
          <span className="inline-block first-letter:uppercase">{team.role}</span> of {team.name}
        </p>
      </div>
      {teams.length > 1 ? (
        <>
          <MenuRule />
          <MenuLabel>Team</MenuLabel>
          <MenuChoice
            label="Team"
            value={team.slug}
            onValueChange={(slug) => router.push(`/${slug}/books`)}
            options={teams.map(({ slug, name }) => ({ value: slug, label: name }))}
          />
        </>
      ) : null}
      <MenuRule />
      <MenuItem icon={<CircleUserRound />} onSelect={() => router.push('/account')}>
        Your account
      </MenuItem>
      <MenuItem icon={<Plus />} onSelect={() => setOpen('newTeam')}>
        New team…
      </MenuItem>
      <MenuItem icon={<DoorOpen />} onSelect={() => setOpen('leaveTeam')}>
        Leave this team…
      </MenuItem>
      <MenuRule />
      <MenuLabel>Light or dark</MenuLabel>
      <MenuChoice stay label="Light or dark" value={choice ?? 'system'} onValueChange={choose} options={themeOptions} />
      <MenuRule />
      <MenuItem icon={<LogOut />} disabled={isLeaving} onSelect={() => void signOut()}>
        Sign out
      </MenuItem>
    </Menu>
  )
  return (
    <>
      {menu}
      {open === 'newTeam' ? <NewTeamDialog createTeam={actions.createTeam} onClose={() => setOpen(null)} /> : null}
      {open === 'leaveTeam' ? (
        <LeaveDialog teamName={team.name} leaveTeam={actions.leaveTeam} onClose={() => setOpen(null)} />
      ) : null}
    </>
  )
}
