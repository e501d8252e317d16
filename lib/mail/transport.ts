import { setTimeout as wait } from 'node:timers/promises'
import { createTransport } from 'nodemailer'
import type { Rendered } from './render'

/** Where mail goes out, and in whose name: SMTP_URL and MAIL_FROM. */
export type MailServer = { url: string; from: string }

export type Outgoing = Rendered & { to: string; messageId: string }

/** The limits below are on silence; a server that dribbles is left after this. */
const longestMs = 60_000

const loopback = ['127.0.0.1', 'localhost', '[::1]']

/** Hands one mail to the mail server; resolves when the server has taken it. Throws nodemailer's error (see trouble.ts). */
export async function sendMail({ url, from }: MailServer, mail: Outgoing): Promise<void> {
  const { hostname, username } = new URL(url)
  const isHere = loopback.includes(hostname)
  const transport = createTransport({
    url,
    // A name and password never travel in the clear, whatever the server offers.
    ...(isHere ? { ignoreTLS: true } : { requireTLS: username !== '' }),
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 20_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  })
  const sending = transport.sendMail({
    from,
    // As an object: never parsed as a list of addresses.
    to: { name: '', address: mail.to },
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
    messageId: mail.messageId,
    headers: { 'Auto-Submitted': 'auto-generated', 'X-Auto-Response-Suppress': 'All' },
  })
  try {
    await Promise.race([sending, tooLong()])
  } finally {
    transport.close()
  }
}

async function tooLong(): Promise<never> {
  await wait(longestMs, undefined, { ref: false })
  throw Object.assign(new Error('Sending took too long'), { code: 'ETIMEDOUT' })
}
