import { env } from '@/lib/env'
import { logger } from '@/lib/http/logger'
import { claimDelivery, type Delivery, giveUp, noteFailed, noteSent } from './deliveries'
import { type MailMessage, mailMessage } from './message'
import { render } from './render'
import { unseal } from './seal'
import { type MailServer, type Outgoing, sendMail } from './transport'
import { type MailTrouble, troubleOf } from './trouble'

/** Longer than any attempt can take (see the limits in transport.ts), and no longer than the job. */
const heldSeconds = 80

export type Post = { server: MailServer | null; baseUrl: string; secret: string; send: typeof sendMail }

const ours = (): Post => ({ server: env.mailServer, baseUrl: env.authUrl, secret: env.authSecret, send: sendMail })

/**
 * Sends one queued mail and keeps its delivery log. Throws where it should be tried again. A mail goes out at least
 * once: twice only where a server dies between the mail server's "taken" and our note of it, under one Message-ID then.
 */
export async function deliverMail(
  id: string,
  { isLastTry }: { isLastTry: boolean },
  post: Post = ours(),
): Promise<void> {
  const claim = await claimDelivery(id, heldSeconds)
  if (claim.kind === 'done') return
  if (claim.kind === 'held') throw new Error(`The mail ${id} is being sent by another worker`)
  const trouble = await attempt(claim.delivery, post)
  if (trouble === undefined) return noteSent(id)
  logger().warn({ delivery: id, kind: claim.delivery.kind, trouble: trouble.sentence }, 'mail not sent')
  if (trouble.isFinal || isLastTry) return giveUp(id, trouble.sentence)
  await noteFailed(id, trouble.sentence)
  throw new Error(trouble.sentence)
}

async function attempt(delivery: Delivery, { server, baseUrl, secret, send }: Post): Promise<MailTrouble | undefined> {
  if (delivery.validUntil && delivery.validUntil.getTime() <= Date.now())
    return { sentence: 'The link in it had run out before it could be sent.', isFinal: true }
  const message = contentOf(delivery, secret)
  if (message === null)
    return {
      sentence: 'It cannot be read any more: the secret or the program of this server has changed since.',
      isFinal: true,
    }
  if (server === null) return { sentence: 'No mail server is set up here: SMTP_URL is not set.', isFinal: false }
  const mail: Outgoing = { ...render(message, baseUrl), to: delivery.to, messageId: delivery.messageId }
  try {
    await send(server, mail)
    return undefined
  } catch (cause) {
    return troubleOf(cause)
  }
}

/** Null where the seal does not open, or where what is in it was a message to an older version only. */
function contentOf({ id, sealed }: Delivery, secret: string): MailMessage | null {
  const text = sealed === null ? null : unseal(sealed, id, secret)
  return text === null ? null : (mailMessage.safeParse(JSON.parse(text)).data ?? null)
}
