import { z } from 'zod'
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
export const flowUnit = text(40).min(1, 'needs a unit')

/** An address that cannot be a team's is not looked up. */
export const canBeTeam = isTeamSlug
