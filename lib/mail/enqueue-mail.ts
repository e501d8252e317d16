import { z } from 'zod'
import type { Runner } from '@/db/client'
import { mailDelivery } from '@/db/schema/mail'
import { env } from '@/lib/env'
import { sendJob } from '@/lib/queue/send-job'
import { type MailMessage, mailMessage, runsOut } from './message'
import { render } from './render'
import { seal } from './seal'

const address = z.email().max(254)

/** `teamId`: whose owners see it in their delivery log; null for mails about somebody's own account. */
type Mail = { to: string; message: MailMessage; teamId: string | null }

/**
 * Queues a mail. In a transaction it goes out if and only if that commits: the row that holds it and the job that sends
 * it are written there. Gives back the id of the delivery. Throws for an address or a message that cannot be (a bug).
 */
export async function enqueueMail(runner: Runner, { to, message, teamId }: Mail): Promise<string> {
  const recipient = address.parse(to)
  const content = mailMessage.parse(message)
  const id = crypto.randomUUID()
  await runner.transaction(async (tx) => {
    await tx.insert(mailDelivery).values({
      id,
      teamId,
      to: recipient,
      kind: content.kind,
      subject: render(content, env.authUrl).subject,
      sealed: seal(JSON.stringify(content), id, env.authSecret),
      validUntil: runsOut(content),
      messageId: `<${id}@${messageHost()}>`,
    })
    await sendJob(tx, 'deliver-mail', { delivery: id })
  })
  return id
}

/** A number is no name of a host here. */
function messageHost(): string {
  const { hostname } = new URL(env.authUrl)
  return /[a-z]/i.test(hostname) && !hostname.includes(':') ? hostname : 'tallybrook.invalid'
}
