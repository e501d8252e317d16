import { sql } from 'drizzle-orm'
import { check, index, integer, pgTable, text, timestamp } from 'drizzle-orm/pg-core'
import { team } from './team'

const moment = (name: string) => timestamp(name, { withTimezone: true })

/** Every mail: waiting to be sent, sent, or given up. Owners read those of their team. */
export const mailDelivery = pgTable(
  'mail_delivery',
  {
    id: text('id').primaryKey(),
    /** Null: about somebody's account, and no team's business. */
    teamId: text('team_id').references(() => team.id),
    to: text('recipient').notNull(),
    /** Not checked against a list: later kinds need no migration. */
    kind: text('kind').notNull(),
    subject: text('subject').notNull(),
    state: text('state', { enum: ['queued', 'failed', 'sent', 'given up'] })
      .notNull()
      .default('queued'),
    attempts: integer('attempts').notNull().default(0),
    /** Why the last attempt did not succeed, as a plain sentence. */
    lastError: text('last_error'),
    /** What the mail says, encrypted, and only until it is sent or given up: the links in it are secrets. */
    sealed: text('sealed'),
    /** Not worth sending after this: the link in it has run out. */
    validUntil: moment('valid_until'),
    /** A worker is sending it and has until then; nobody else touches it. */
    heldUntil: moment('held_until'),
    /** The same at every attempt, so that a mail that arrives twice can be told for one. */
    messageId: text('message_id').notNull().unique(),
    createdAt: moment('created_at').notNull().defaultNow(),
    sentAt: moment('sent_at'),
  },
  (t) => [
    index('mail_delivery_team_id_created_at_idx').on(t.teamId, t.createdAt),
    index('mail_delivery_open_idx').on(t.createdAt).where(sql`${t.state} in ('queued', 'failed')`),
    check('mail_delivery_state_known', sql`${t.state} in ('queued', 'failed', 'sent', 'given up')`),
    check('mail_delivery_sealed_while_open', sql`(${t.state} in ('queued', 'failed')) = (${t.sealed} is not null)`),
    check('mail_delivery_sent_at', sql`(${t.state} = 'sent') = (${t.sentAt} is not null)`),
    check('mail_delivery_attempts_count', sql`${t.attempts} >= 0`),
  ],
)
