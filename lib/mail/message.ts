import { z } from 'zod'
import { safeNext } from '@/lib/http/safe-next'
import { harmlessName } from './harmless-name'

/** What the mails say, by kind. Kept as JSON between queueing and sending, so moments are ISO strings. */

/** Those of lib/auth, which stands above this room: a caller's role that is not here does not compile. */
export const mailRoles = ['owner', 'engineer', 'analyst', 'checker', 'reader'] as const
export type MailRole = (typeof mailRoles)[number]

const name = z.string().max(1000).transform(harmlessName)
const path = z
  .string()
  .refine((value) => safeNext(value) !== null, 'is not a path of this site')
  .transform((value) => safeNext(value) ?? '/')
const moment = z.iso.datetime({ offset: true })

const invitation = z.strictObject({
  kind: z.literal('invitation'),
  team: name,
  inviter: name,
  role: z.enum(mailRoles),
  /** Empty for roles that see every project. */
  projects: z.array(name).max(500),
  path,
  until: moment,
})

const verifyAddress = z.strictObject({ kind: z.literal('verifyAddress'), name, path, until: moment })

const resetPassword = z.strictObject({ kind: z.literal('resetPassword'), name, path, until: moment })

/** To somebody who has an account and signs up again: the page must not tell, the mail may. */
const alreadyRegistered = z.strictObject({ kind: z.literal('alreadyRegistered'), name, signInPath: path })

/** To the present address, before it is changed. */
const changeAddress = z.strictObject({
  kind: z.literal('changeAddress'),
  name,
  newAddress: z.email(),
  path,
  until: moment,
})

/** To the former address, after it was changed. */
const addressChanged = z.strictObject({ kind: z.literal('addressChanged'), name, newAddress: z.email(), at: moment })

export const securityEvents = ['passwordChanged', 'secondFactorOn', 'secondFactorOff', 'sessionsEnded'] as const

const securityNotice = z.strictObject({
  kind: z.literal('securityNotice'),
  name,
  event: z.enum(securityEvents),
  at: moment,
  path,
})

export const membershipEvents = ['deactivated', 'reactivated', 'removed'] as const

const membership = z.strictObject({ kind: z.literal('membership'), name, team: name, event: z.enum(membershipEvents) })

const roleChanged = z.strictObject({ kind: z.literal('roleChanged'), name, team: name, role: z.enum(mailRoles), path })

export const mailMessage = z.discriminatedUnion('kind', [
  invitation,
  verifyAddress,
  resetPassword,
  alreadyRegistered,
  changeAddress,
  addressChanged,
  securityNotice,
  membership,
  roleChanged,
])

export type MailMessage = z.input<typeof mailMessage>
export type MailKind = MailMessage['kind']
export type Message<K extends MailKind> = Extract<MailMessage, { kind: K }>

/** When the link in it runs out: later than that it is not worth sending. */
export function runsOut(message: MailMessage): Date | null {
  return 'until' in message ? new Date(message.until) : null
}
