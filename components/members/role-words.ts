import type { Role } from '@/lib/auth/permissions'

/** Who has which role, and what each may do: words that follow "an analyst". */
export const roleWords: Record<Role, { who: string; may: string }> = {
  owner: { who: 'Whoever runs the team', may: 'may do everything: people, projects, settings and books' },
  engineer: { who: 'Process engineer, metallurgist', may: 'makes and edits books in every project' },
  analyst: {
    who: 'Laboratory',
    may: 'edits no book, and sees in chosen projects what the laboratory is asked for',
  },
  checker: { who: 'Checking or lead engineer', may: 'reads every book of every project, and edits none' },
  reader: { who: 'Operations, client', may: 'reads and downloads what was issued in chosen projects' },
}

const capital = (words: string): string => words.charAt(0).toUpperCase() + words.slice(1)

/** "Makes and edits books in every project." */
export const mayWords = (role: Role): string => `${capital(roleWords[role].may)}.`

/** "An engineer makes and edits books in every project." */
export const roleSentence = (role: Role): string => `${capital(aRole(role))} ${roleWords[role].may}.`

export const roleName = (role: Role): string => capital(role)

/** "an engineer" */
export const aRole = (role: Role): string => `${/^[aeiou]/.test(role) ? 'an' : 'a'} ${role}`

const list = new Intl.ListFormat('en-GB')
export const listed = (names: readonly string[]): string => list.format(names)
