import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { eq, sql } from 'drizzle-orm'
import { SMTPServer } from 'smtp-server'
import { inject } from 'vitest'
import { db } from '@/db/client'
import { mailDelivery } from '@/db/schema/mail'
import { makeLogger } from '@/lib/http/logger'
import { handlers } from '@/lib/jobs/handlers'
import { startWorker, type Worker } from '@/lib/jobs/worker'
import { startMailStandIn } from '@/lib/local/mail-stand-in.mjs'
import { deliverMail, type Post } from '@/lib/mail/deliver-mail'
import type { Delivery } from '@/lib/mail/deliveries'
import type { MailMessage } from '@/lib/mail/message'
import type { StandInMail } from '@/lib/mail/stand-in'
import { type Outgoing, sendMail } from '@/lib/mail/transport'

export const secretToken = 'kept-from-everybody-4711'

export const reset = {
  kind: 'resetPassword',
  name: 'Ada',
  path: `/reset?token=${secretToken}`,
  until: '2099-01-01T00:00:00Z',
} as const satisfies MailMessage

const from = 'Tallybrook <no-reply@tallybrook.example>'

/** How mail is sent in a test: over SMTP to `url`, or by a function of the test's own. */
export function post(how: { url?: string | null; send?: (mail: Outgoing) => Promise<void> }): Post {
  const { url = 'smtp://127.0.0.1:1', send } = how
  return {
    server: url === null ? null : { url, from },
    baseUrl: 'http://127.0.0.1:3000',
    secret: process.env.BETTER_AUTH_SECRET ?? '',
    send: send ? (_, mail) => send(mail) : sendMail,
  }
}

/** A worker as the server runs it, but with this way to send. */
export function workWith(way: Post): Promise<Worker> {
  const ours = { ...handlers, 'deliver-mail': deliver(way) }
  return startWorker(inject('databaseUrl'), ours, makeLogger('silent'))
}

const deliver =
  (way: Post): (typeof handlers)['deliver-mail'] =>
  ({ delivery }, run) =>
    deliverMail(delivery, run, way)

export async function rowOf(id: string): Promise<Delivery> {
  const [row] = await db.select().from(mailDelivery).where(eq(mailDelivery.id, id))
  if (!row) throw new Error(`No delivery ${id}`)
  return row
}

/** Waits until a delivery is in one of these states. */
export async function untilState(id: string, ...states: Delivery['state'][]): Promise<Delivery> {
  for (let look = 0; look < 200; look++) {
    const row = await rowOf(id)
    if (states.includes(row.state)) return row
    await wait(50)
  }
  throw new Error(`The mail is still ${JSON.stringify(await rowOf(id))}`)
}

type Job = { state: string; retryCount: number; waitSeconds: number }

export async function jobsOf(id: string): Promise<Job[]> {
  const { rows } = await db.execute<Job>(
    sql`select state, retry_count as "retryCount", extract(epoch from start_after - now())::float8 as "waitSeconds"
      from pgboss.job where name = 'deliver-mail' and data->>'delivery' = ${id}`,
  )
  return rows
}

/** Waits until a mail has failed so many times and waits for another try. Gives back for how many seconds. */
export async function untilWaiting(id: string, failures: number): Promise<number> {
  for (let look = 0; look < 200; look++) {
    const [job] = await jobsOf(id)
    if (job?.state === 'retry' && job.retryCount === failures - 1) return job.waitSeconds
    await wait(50)
  }
  throw new Error(`The mail is not waiting for another try: ${JSON.stringify(await jobsOf(id))}`)
}

/** The next try of a mail comes now, not after its wait. */
export async function bringForward(id: string): Promise<void> {
  await db.execute(
    sql`update pgboss.job set start_after = now() - interval '1 second' where data->>'delivery' = ${id} and state = 'retry'`,
  )
}

/** The stand-in that `npm start` runs, with what it has taken. */
export async function openStandIn() {
  const folder = mkdtempSync(path.join(tmpdir(), 'tallybrook-mail-'))
  const standIn = await startMailStandIn(folder)
  const read = (ending: string) =>
    readdirSync(folder)
      .filter((name) => name.endsWith(ending))
      .sort()
      .map((name) => readFileSync(path.join(folder, name), 'utf8'))
  return {
    url: standIn.url,
    folder,
    mails: () => read('.json').map((text) => JSON.parse(text) as StandInMail),
    raw: () => read('.eml'),
    close: async () => {
      await standIn.close()
      rmSync(folder, { recursive: true })
    },
  }
}

/** A mail server that refuses every address with this answer. */
export async function openRefusing(responseCode: number, words: string) {
  let asked = 0
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    logger: false,
    onRcptTo(_address, _session, done) {
      asked++
      done(Object.assign(new Error(words), { responseCode }))
    },
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const address = server.server.address()
  const port = typeof address === 'object' && address ? address.port : 0
  return {
    url: `smtp://127.0.0.1:${port}`,
    asked: () => asked,
    close: () => new Promise<void>((resolve) => server.close(() => resolve())),
  }
}
