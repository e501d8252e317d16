import { sql } from 'drizzle-orm'
import {
  check,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  unique,
} from 'drizzle-orm/pg-core'
import { user } from './account'
import { project, team } from './team'

const moment = (name: string) => timestamp(name, { withTimezone: true })

/** A book. Its row is what an edit locks, and `number` counts its changes; name to flowUnit are its `book` record. */
export const book = pgTable(
  'book',
  {
    id: text('id').primaryKey(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    projectId: text('project_id').notNull(),
    number: integer('number').notNull().default(0),
    name: text('name').notNull(),
    description: text('description').notNull().default(''),
    documentNumber: text('document_number').notNull().default(''),
    basis: text('basis', { enum: ['mass', 'mole'] }).notNull(),
    flowUnit: text('flow_unit').notNull(),
    archivedAt: moment('archived_at'),
    createdBy: text('created_by')
      .notNull()
      .references(() => user.id),
    createdAt: moment('created_at').notNull().defaultNow(),
    changedBy: text('changed_by')
      .notNull()
      .references(() => user.id),
    changedAt: moment('changed_at').notNull().defaultNow(),
  },
  (t) => [
    foreignKey({
      name: 'book_project_fk',
      columns: [t.teamId, t.projectId],
      foreignColumns: [project.teamId, project.id],
    }),
    index('book_team_id_project_id_idx').on(t.teamId, t.projectId),
    check('book_basis_known', sql`${t.basis} in ('mass', 'mole')`),
    check('book_named', sql`length(btrim(${t.name})) > 0`),
    check('book_number_counts', sql`${t.number} >= 0`),
  ],
)

/** Every edit of a book, in order. `body` is the change without its id and label, in the shape of `schemaVersion`. */
export const bookChange = pgTable(
  'book_change',
  {
    bookId: text('book_id')
      .notNull()
      .references(() => book.id),
    number: integer('number').notNull(),
    /** Made by the writer: the same id again is answered with the first result. */
    id: text('id').notNull(),
    schemaVersion: integer('schema_version').notNull(),
    label: text('label').notNull(),
    body: jsonb('body').notNull(),
    bodyHash: text('body_hash').notNull(),
    by: text('by')
      .notNull()
      .references(() => user.id),
    at: moment('at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ name: 'book_change_pkey', columns: [t.bookId, t.number] }),
    unique('book_change_book_id_id_key').on(t.bookId, t.id),
    check('book_change_number_counts', sql`${t.number} > 0`),
  ],
)

/** What the list shows of the first operating case. True of the book while `number` is still the book's. */
export const bookSummary = pgTable('book_summary', {
  bookId: text('book_id')
    .primaryKey()
    .references(() => book.id),
  number: integer('number').notNull(),
  given: integer('given').notNull(),
  solvable: integer('solvable').notNull(),
  unknown: integer('unknown').notNull(),
  atOdds: integer('at_odds').notNull(),
  degreesOfFreedom: integer('degrees_of_freedom').notNull(),
  at: moment('at').notNull().defaultNow(),
})
