import { pgTable, text, timestamp } from 'drizzle-orm/pg-core'

/** What has been done once to this database and is not done again: "demo" once the demo team stands. */
export const mark = pgTable('mark', {
  name: text('name').primaryKey(),
  at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
})
