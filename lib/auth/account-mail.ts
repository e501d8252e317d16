import { db } from '@/db/client'
import { env } from '@/lib/env'
import { safeNext } from '@/lib/http/safe-next'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import type { MailMessage, Message } from '@/lib/mail/message'
import { countAttempt } from './attempts'

type Person = { name: string; email: string }

/** Seconds that a mailed link is good for. */
export const confirmFor = 24 * 60 * 60
export const resetFor = 60 * 60

/** Tokens stand behind the question mark: the path alone is what logs show. */
const withToken = (path: string, token: string) => `${path}?token=${encodeURIComponent(token)}`
const inSeconds = (seconds: number) => new Date(Date.now() + seconds * 1000).toISOString()

/**
 * The page behind the link asks for a press of a button: programs that open links in mails confirm nothing. `url` is
 * better-auth's own link, which is not mailed; where its caller wants to go on to is taken along.
 */
export function mailConfirmation({ name, email }: Person, token: string, url?: string): Promise<void> {
  const next = url === undefined ? null : safeNext(new URL(url).searchParams.get('callbackURL'))
  const path = `${withToken('/verify', token)}${next && next !== '/' ? `&next=${encodeURIComponent(next)}` : ''}`
  return mailIfFew(email, { kind: 'verifyAddress', name, path, until: inSeconds(confirmFor) })
}

export const mailReset = ({ name, email }: Person, token: string): Promise<void> =>
  mailIfFew(email, { kind: 'resetPassword', name, path: withToken('/reset', token), until: inSeconds(resetFor) })

export const mailAlreadyRegistered = ({ name, email }: Person): Promise<void> =>
  mailIfFew(email, { kind: 'alreadyRegistered', name, signInPath: '/sign-in' })

export async function mailNotice({ name, email }: Person, event: Message<'securityNotice'>['event']): Promise<void> {
  const message = { kind: 'securityNotice', name, event, at: new Date().toISOString(), path: '/account' } as const
  await enqueueMail(db, { to: email, message, teamId: null })
}

/** To the former address. */
export async function mailAddressChanged({ name, email }: Person, newAddress: string): Promise<void> {
  const message = { kind: 'addressChanged', name, newAddress, at: new Date().toISOString() } as const
  await enqueueMail(db, { to: email, message, teamId: null })
}

/** What anybody can have sent to any address: no more than a few in an hour. The page that asked does not tell. */
async function mailIfFew(to: string, message: MailMessage): Promise<void> {
  if (env.isTest || (await countAttempt('mail', to))) await enqueueMail(db, { to, message, teamId: null })
}
