import { z } from 'zod'
import { longestPassword, shortestPassword } from '@/lib/auth/password'
import { roles } from '@/lib/auth/permissions'
import { nameProblem } from '@/lib/auth/person-name'
import { isTeamSlug } from '@/lib/auth/slugs'

/** What verbs take, in the shapes that many of them share. */

/** Text that PostgreSQL cannot keep: the null character, and half of a character. */
export const unstorable = /\0|\p{Cs}/u

const text = (longest: number) =>
  z
    .string()
    .trim()
    .max(longest, `is longer than ${longest} characters`)
    .refine((value) => !unstorable.test(value), 'holds a character that cannot be kept')

export const teamSlug = z.string().max(100)
export const recordId = z
  .string()
  .min(1)
  .max(64)
  .refine((value) => !unstorable.test(value), 'is no id')
export const projectName = text(120).min(1, 'needs a name')
export const bookName = text(200).min(1, 'needs a name')
export const teamName = text(120).min(1, 'needs a name')
export const role = z.enum(roles)
/** As better-auth keeps them: in small letters. */
export const mailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, 'is longer than 254 characters')
  .pipe(z.email('is not an e-mail address: it looks like name@company.com'))
/** Longer than any; what is too long or empty is looked for and not found, like any other wrong one. */
export const mailedToken = z.string().transform((token) => token.slice(0, 200))
export const personName = z
  .string()
  .trim()
  .superRefine((name, context) => {
    const problem = nameProblem(name)
    if (problem) context.addIssue({ code: 'custom', message: problem })
  })
export const newPassword = z
  .string()
  .min(shortestPassword, `is too short: use ${shortestPassword} characters or more`)
  .max(longestPassword, `is too long: use ${longestPassword} characters or fewer`)
export const projectIds = z
  .array(recordId)
  .max(500)
  .transform((ids) => [...new Set(ids)])
export const flowUnit = text(40).min(1, 'needs a unit')

/** An address that cannot be a team's is not looked up. */
export const canBeTeam = isTeamSlug
