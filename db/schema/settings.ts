import { sql } from 'drizzle-orm'
import { check, doublePrecision, integer, pgTable, text, timestamp } from 'drizzle-orm/pg-core'
import { team } from './team'

/** What a team has chosen for its books. A team without a row has the defaults of these columns. */
export const teamSettings = pgTable(
  'team_settings',
  {
    teamId: text('team_id')
      .primaryKey()
      .references(() => team.id),
    massFlowUnit: text('mass_flow_unit').notNull().default('kg/h'),
    moleFlowUnit: text('mole_flow_unit').notNull().default('kmol/h'),
    /** 'own': that of each person's browser. */
    decimal: text('decimal', { enum: ['own', 'point', 'comma'] })
      .notNull()
      .default('own'),
    /** Significant digits by kind of row; null: as many as the size of the number asks for. */
    flowDigits: integer('flow_digits'),
    fractionDigits: integer('fraction_digits'),
    carriedDigits: integer('carried_digits'),
    /** Per cent of what passes through: how far a balance may miss. Common practice: 0.1 to 1. */
    closureLimit: doublePrecision('closure_limit').notNull().default(0.1),
    /** Per cent: between which sums an analysis counts as complete. Common practice: 98 to 102. */
    analysisLow: doublePrecision('analysis_low').notNull().default(98),
    analysisHigh: doublePrecision('analysis_high').notNull().default(102),
    /** Per cent of the value, one standard deviation: a solved cell less certain than this is marked weak. */
    weakLimit: doublePrecision('weak_limit').notNull().default(10),
    /** Who may be invited, by what stands behind the @; empty: anybody. */
    mailDomains: text('mail_domains').array().notNull().default(sql`'{}'`),
    changedAt: timestamp('changed_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    check('team_settings_decimal_known', sql`${t.decimal} in ('own', 'point', 'comma')`),
    check('team_settings_limits', sql`${t.closureLimit} > 0 and ${t.weakLimit} > 0`),
    check('team_settings_analysis', sql`0 < ${t.analysisLow} and ${t.analysisLow} < ${t.analysisHigh}`),
  ],
)
