import type { Role } from '@/lib/auth/permissions'

/** What each role may do, in words, for those who choose one for somebody. */
export const roleWords: Record<Role, { who: string; may: string }> = {
  owner: {
    who: 'Whoever runs the team',
    may: 'May do everything: people, projects, settings and books.',
  },
  engineer: {
    who: 'Process engineer, metallurgist',
    may: 'Makes and edits books in every project.',
  },
  analyst: {
    who: 'Laboratory',
    may: 'Edits no book. Sees the projects chosen here, and only what the laboratory is asked for.',
  },
  checker: {
    who: 'Checking or lead engineer',
    may: 'Reads every book of every project, and edits none.',
  },
  reader: {
    who: 'Operations, client',
    may: 'Reads what was issued in the projects chosen here, and downloads it.',
  },
}

export const roleName = (role: Role): string => role.charAt(0).toUpperCase() + role.slice(1)

/** "an engineer" */
export const aRole = (role: Role): string => `${/^[aeiou]/.test(role) ? 'an' : 'a'} ${role}`

const list = new Intl.ListFormat('en-GB')
export const listed = (names: readonly string[]): string => list.format(names)
