'use client'

import { ShieldCheck } from 'lucide-react'
import type { ReactNode } from 'react'
import { Tag } from '@/components/ui/tag'
import type { Role } from '@/lib/auth/permissions'
import { Day } from './day'
import { RoleSelect } from './role-select'
import { listed, roleName } from './role-words'
import type { MemberRow } from './types'

type MembersTableProps = {
  members: readonly MemberRow[]
  /** The role that somebody is being given just now. */
  pending: { userId: string; role: Role } | null
  /** null: the list is only read. */
  onRole: ((member: MemberRow, role: Role) => void) | null
  memberActions: ((member: MemberRow) => ReactNode) | null
}

const head = 'border-b border-hair px-3 py-2 text-start font-normal text-ink-2'
const cell = 'border-b border-hair px-3 py-2.5 max-sm:block max-sm:border-0 max-sm:py-0.5'

/** The people of a team. On a narrow screen each is a block of lines. */
export function MembersTable({ members, pending, onRole, memberActions }: MembersTableProps) {
  return (
    <table className="w-full border-separate border-spacing-0 max-sm:block [&>tbody>tr:last-child>*]:border-b-0">
      <caption className="sr-only">People of the team</caption>
      <thead className="max-sm:sr-only">
        <tr className="bg-rail">
          <th scope="col" className={head}>
            Person
          </th>
          <th scope="col" className={`${head} w-40`}>
            Role
          </th>
          <th scope="col" className={head}>
            Projects
          </th>
          <th scope="col" className={`${head} w-60`}>
            State
          </th>
          {memberActions ? (
            <th scope="col" className={`${head} w-12`}>
              <span className="sr-only">Actions</span>
            </th>
          ) : null}
        </tr>
      </thead>
      <tbody className="max-sm:block">
        {members.map((member) => (
          <tr
            key={member.userId}
            className="max-sm:relative max-sm:block max-sm:border-b max-sm:border-hair max-sm:py-2.5 max-sm:last:border-b-0"
          >
            <th scope="row" className={`${cell} text-start font-normal max-sm:pe-12`}>
              <PersonName member={member} />
            </th>
            <td className={cell}>
              {onRole && member.state === 'active' ? (
                <RoleSelect
                  name={member.name}
                  role={pending?.userId === member.userId ? pending.role : member.role}
                  isBusy={pending?.userId === member.userId}
                  onChange={(role) => onRole(member, role)}
                />
              ) : (
                roleName(member.role)
              )}
            </td>
            <td className={`${cell} wrap-anywhere text-ink-2`}>{projectWords(member)}</td>
            <td className={`${cell} text-ink-2`}>
              <StateWords member={member} />
            </td>
            {memberActions ? (
              <td className={`${cell} text-end max-sm:absolute max-sm:end-0 max-sm:top-2 sm:py-1.5`}>
                {memberActions(member)}
              </td>
            ) : null}
          </tr>
        ))}
      </tbody>
    </table>
  )
}

function PersonName({ member }: { member: MemberRow }) {
  return (
    <>
      <span className="block font-semibold wrap-anywhere">
        {member.name}
        {member.isYou ? <span className="font-normal text-ink-3"> (you)</span> : null}
      </span>
      <span className="block text-sm wrap-anywhere text-ink-2">{member.email}</span>
      {member.hasSecondFactor ? (
        <span className="mt-0.5 flex items-center gap-1 text-xs text-ink-2">
          <ShieldCheck className="size-3.5 text-solved-edge" aria-hidden="true" /> signs in with a second step
        </span>
      ) : null}
    </>
  )
}

function projectWords({ projects, role }: MemberRow): string {
  if (projects === 'all') return 'Every project'
  if (projects.length === 0) return `None yet: ${role === 'analyst' ? 'the laboratory' : 'this person'} sees nothing`
  return listed(projects.map(({ name }) => name))
}

function StateWords({ member }: { member: MemberRow }) {
  if (member.deactivatedAt)
    return (
      <>
        <Tag tone="absent">Deactivated</Tag>{' '}
        <span className="text-sm">
          since <Day at={member.deactivatedAt} />
        </span>
      </>
    )
  return (
    <span className="text-sm whitespace-nowrap">
      Active since <Day at={member.joinedAt} />
    </span>
  )
}
