import { setTimeout as wait } from 'node:timers/promises'
import { eq, sql } from 'drizzle-orm'
import { afterEach, beforeAll, describe, expect, inject, it } from 'vitest'
import { db } from '@/db/client'
import { mailDelivery } from '@/db/schema/mail'
import { listDeliveries } from '@/lib/data/mail/list-deliveries'
import type { Worker } from '@/lib/jobs/worker'
import { deliverMail } from '@/lib/mail/deliver-mail'
import { claimDelivery, giveUpStale } from '@/lib/mail/deliveries'
import { enqueueMail } from '@/lib/mail/enqueue-mail'
import type { Outgoing } from '@/lib/mail/transport'
import { prepareQueues } from '@/lib/queue/prepare-queues'
import { makeTeam, value } from '../world'
import * as room from './mail-room'

/** What a test, here or in another file, left waiting is not the next one's. */
async function emptyQueue(): Promise<void> {
  await db.execute(sql`delete from pgboss.job where name = 'deliver-mail'`)
  await db.delete(mailDelivery)
}

const open: { close: () => Promise<unknown> }[] = []
beforeAll(emptyQueue)
afterEach(async () => {
  for (const one of open.splice(0).reverse()) await one.close()
  await emptyQueue()
})

async function work(way: ReturnType<typeof room.post>): Promise<Worker> {
  const worker = await room.workWith(way)
  open.push({ close: () => worker.stop(5000) })
  return worker
}

const queue = (to = 'ada@example.com') => enqueueMail(db, { to, message: room.reset, teamId: null })

describe('a queued mail', () => {
  it('goes out over SMTP once its transaction has committed, and leaves no secret behind', async () => {
    const standIn = await room.openStandIn()
    open.push(standIn)
    const to = 'smtp.once@example.com'
    const place = () => standIn.mails().findIndex((mail) => mail.to.includes(to))
    await work(room.post({ url: standIn.url }))
    const id = await db.transaction(async (tx) => {
      const queued = await enqueueMail(tx, { to, message: room.reset, teamId: null })
      await wait(1500) // the worker looks more than once meanwhile
      expect(place()).toBe(-1)
      return queued
    })
    const row = await room.untilState(id, 'sent')
    expect(row).toMatchObject({
      to,
      kind: 'resetPassword',
      attempts: 1,
      sealed: null,
      heldUntil: null,
    })
    expect(row.sentAt).toBeInstanceOf(Date)

    const mail = standIn.mails()[place()]
    expect(mail).toMatchObject({
      from: 'no-reply@tallybrook.example',
      to: [to],
      subject: 'Choose a new password',
      messageId: row.messageId,
    })
    expect(mail?.text).toContain(`http://127.0.0.1:3000/reset?token=${room.secretToken}\n`)
    expect(mail?.html).toContain(`href="http://127.0.0.1:3000/reset?token=${room.secretToken}"`)
    expect(standIn.raw()[place()]).toMatch(/^Auto-Submitted: auto-generated\r$/im)
    expect(standIn.raw()[place()]).toContain('multipart/alternative')
  })

  it('is not there where its transaction was rolled back', async () => {
    const sent: Outgoing[] = []
    await work(room.post({ send: async (mail) => void sent.push(mail) }))
    let id = ''
    const undone = db.transaction(async (tx) => {
      id = await enqueueMail(tx, { to: 'ada@example.com', message: room.reset, teamId: null })
      expect(await room.jobsOf(id)).toEqual([]) // seen from outside
      throw new Error('undone')
    })
    await expect(undone).rejects.toThrow('undone')
    await expect(room.rowOf(id)).rejects.toThrow('No delivery')
    expect(await room.jobsOf(id)).toEqual([])
    await room.untilState(await queue('bob@example.com'), 'sent')
    expect(sent.map(({ to }) => to)).toEqual(['bob@example.com'])
  })

  it('is unreadable in the database while it waits', async () => {
    const id = await queue()
    const { rows } = await db.execute(sql`
      select to_jsonb(d)::text as kept from mail_delivery d union all select to_jsonb(j)::text from pgboss.job j`)
    expect(rows.length).toBeGreaterThanOrEqual(2)
    expect(JSON.stringify(rows)).toContain(id)
    expect(JSON.stringify(rows)).not.toContain(room.secretToken)
  })

  it('is refused at once where it could not be sent', async () => {
    for (const to of ['ada', 'a@b.example\r\nBcc: c@d.example', 'a@b.example, c@d.example', 'Ada <a@b.example>', ''])
      await expect(queue(to)).rejects.toThrow()
    expect(await db.select().from(mailDelivery)).toEqual([])
  })
})

describe('a mail that does not go out', () => {
  it('is tried again later, under the same Message-ID', async () => {
    const sent: string[] = []
    let isDown = true
    const send = async ({ messageId }: Outgoing) => {
      sent.push(messageId)
      if (isDown) throw Object.assign(new Error('down'), { code: 'ECONNECTION' })
    }
    await work(room.post({ send }))
    const id = await queue()
    const failed = await room.untilState(id, 'failed')
    expect(failed).toMatchObject({ attempts: 1, lastError: 'The mail server could not be reached.', sentAt: null })
    expect(failed.sealed).not.toBeNull()
    isDown = false
    await room.untilWaiting(id, 1)
    await room.bringForward(id)
    expect(await room.untilState(id, 'sent')).toMatchObject({ attempts: 2, lastError: null, sealed: null })
    expect(sent).toEqual([failed.messageId, failed.messageId])
  })

  it('waits longer each time', async () => {
    await work(room.post({ url: 'smtp://127.0.0.1:1' }))
    const id = await queue()
    const waits: number[] = []
    for (let failures = 1; failures <= 3; failures++) {
      waits.push(await room.untilWaiting(id, failures))
      await room.bringForward(id)
    }
    // 30 to 60 s, then 60 to 120 s, then 120 to 240 s.
    for (const [place, seconds] of waits.entries()) {
      expect(seconds).toBeGreaterThan(30 * 2 ** place - 5)
      expect(seconds).toBeLessThan(60 * 2 ** place + 5)
    }
  })

  it('is given up after the last try, and what it said is forgotten', async () => {
    const { rows } = await db.execute(sql`select retry_limit from pgboss.queue where name = 'deliver-mail'`)
    expect(rows).toEqual([{ retry_limit: 10 }])
    const id = await queue()
    await db.execute(sql`update pgboss.job set retry_limit = 2 where name = 'deliver-mail'`)
    await work(room.post({ url: 'smtp://127.0.0.1:1' }))
    for (const failures of [1, 2]) {
      await room.untilWaiting(id, failures)
      await room.bringForward(id)
    }
    const row = await room.untilState(id, 'given up')
    expect(row).toMatchObject({ attempts: 3, sealed: null, lastError: 'The mail server could not be reached.' })
  })

  it('is given up at once where the address is refused for good', async () => {
    const server = await room.openRefusing(550, '5.1.1 no such user')
    open.push(server)
    await work(room.post({ url: server.url }))
    const id = await queue()
    expect(await room.untilState(id, 'given up', 'failed')).toMatchObject({
      state: 'given up',
      attempts: 1,
      sealed: null,
      lastError: 'The mail server refused the address (550 5.1.1). It may be mistyped or no longer in use.',
    })
    await wait(1500)
    expect(server.asked()).toBe(1)
  })

  it('is kept where the server only asks for patience, or where none is set up', async () => {
    const server = await room.openRefusing(451, '4.7.1 greylisted')
    open.push(server)
    const id = await queue()
    const run = { isLastTry: false }
    await expect(deliverMail(id, run, room.post({ url: server.url }))).rejects.toThrow('(451 4.7.1)')
    expect(await room.rowOf(id)).toMatchObject({ state: 'failed', attempts: 1 })
    await expect(deliverMail(id, run, room.post({ url: null }))).rejects.toThrow('SMTP_URL is not set')
    expect(await room.rowOf(id)).toMatchObject({ state: 'failed', attempts: 2 })
  })

  it('is not sent once its link has run out', async () => {
    const sent: Outgoing[] = []
    const way = room.post({ send: async (mail) => void sent.push(mail) })
    const until = new Date(Date.now() + 200).toISOString()
    const late = () => enqueueMail(db, { to: 'ada@example.com', message: { ...room.reset, until }, teamId: null })
    const [tried, left] = [await late(), await late()]
    await wait(300)
    await deliverMail(tried, { isLastTry: false }, way)
    expect(await giveUpStale()).toBe(1)
    for (const id of [tried, left]) expect(await room.rowOf(id)).toMatchObject({ state: 'given up', sealed: null })
    expect(sent).toEqual([])
  })

  it('is not guessed at where the secret of the server has changed', async () => {
    const id = await queue()
    await deliverMail(id, { isLastTry: false }, { ...room.post({ url: null }), secret: 'another'.repeat(6) })
    expect(await room.rowOf(id)).toMatchObject({ state: 'given up', sealed: null })
  })
})

describe('several workers', () => {
  it('send each mail once', async () => {
    const sent: string[] = []
    const send = async ({ messageId }: Outgoing) => {
      await wait(20)
      sent.push(messageId)
    }
    const ids = await Promise.all(Array.from({ length: 12 }, (_, place) => queue(`p${place}@example.com`)))
    // The same job twice over, as a queue that promises "at least once" may do.
    await db.execute(
      sql`insert into pgboss.job (name, data) select name, data from pgboss.job where name = 'deliver-mail'`,
    )
    await Promise.all([work(room.post({ send })), work(room.post({ send })), work(room.post({ send }))])
    for (const id of ids) await room.untilState(id, 'sent')
    await wait(1500)
    expect(sent).toHaveLength(12)
    expect(new Set(sent).size).toBe(12)
  })

  it('leave a mail alone that one holds, and take it up when that one died', async () => {
    const sent: Outgoing[] = []
    const way = room.post({ send: async (mail) => void sent.push(mail) })
    const id = await queue()
    expect(await claimDelivery(id, 1)).toMatchObject({ kind: 'mine' })
    await expect(deliverMail(id, { isLastTry: false }, way)).rejects.toThrow('another worker')
    expect(sent).toEqual([])
    await wait(1100)
    await deliverMail(id, { isLastTry: false }, way)
    await deliverMail(id, { isLastTry: false }, way)
    expect(sent).toHaveLength(1)
    expect(await room.rowOf(id)).toMatchObject({ state: 'sent', attempts: 2 })
  })

  it('stop when what they have begun is done', async () => {
    const sent: Outgoing[] = []
    let hasBegun = false
    const send = async (mail: Outgoing) => {
      hasBegun = true
      await wait(1200)
      sent.push(mail)
    }
    const worker = await room.workWith(room.post({ send }))
    const id = await queue()
    while (!hasBegun) await wait(20)
    await worker.stop(5000)
    expect(sent).toHaveLength(1)
    expect(await room.rowOf(id)).toMatchObject({ state: 'sent' })
    expect(await room.jobsOf(id)).toMatchObject([{ state: 'completed' }])
  })
})

describe('the delivery log', () => {
  it("shows a team's own mails, the newest first, and nothing of what they say", async () => {
    const [at, other] = [await makeTeam(), await makeTeam()]
    const message = {
      kind: 'invitation' as const,
      team: 'Kestrel',
      inviter: 'Ada',
      role: 'analyst' as const,
      projects: [],
      path: `/invitation?token=${room.secretToken}`,
      until: '2099-01-01T00:00:00Z',
    }
    const first = await enqueueMail(db, { to: 'one@example.com', message, teamId: at.id })
    const second = await enqueueMail(db, { to: 'two@example.com', message, teamId: at.id })
    await enqueueMail(db, { to: 'three@example.com', message, teamId: other.id })
    await queue('account@example.com')
    const list = value(await listDeliveries(at.people.owner, { team: at.slug }))
    expect(list.map(({ id }) => id)).toEqual([second, first])
    expect(list[0]).toMatchObject({ to: 'two@example.com', subject: 'Ada invites you to “Kestrel”', state: 'queued' })
    expect(Object.keys(list[0] ?? {})).not.toContain('sealed')
    expect(value(await listDeliveries(at.people.owner, { team: at.slug, limit: 1 }))).toHaveLength(1)
  })

  it('cannot say "sent" and still hold what was said', async () => {
    const id = await queue()
    const wrong = db.update(mailDelivery).set({ state: 'sent', sentAt: new Date() }).where(eq(mailDelivery.id, id))
    await expect(wrong).rejects.toThrow()
  })
})

it('prepares its queues again without harm', async () => {
  const id = await queue()
  await prepareQueues(inject('databaseUrl'))
  expect(await room.jobsOf(id)).toHaveLength(1)
  const { rows } = await db.execute(sql`select name, cron from pgboss.schedule`)
  expect(rows).toEqual([{ name: 'sweep-mail', cron: '*/10 * * * *' }])
})
