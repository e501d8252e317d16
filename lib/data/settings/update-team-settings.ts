import { eq, sql } from 'drizzle-orm'
import { z } from 'zod'
import { teamSettings } from '@/db/schema/settings'
import { team } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { bookUnits } from '@/lib/balance'
import { failParse, ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inLockedTeam } from '../door/enter'
import { settingsOf } from '../door/team-settings'
import { flowUnit, teamName, teamSlug } from '../door/words'
import type { TeamSettingsView } from './get-team-settings'

const unitBy = (basis: 'mass' | 'mole', examples: string) =>
  flowUnit.refine((unit) => bookUnits(basis, unit) !== undefined, `is no ${basis} flow unit: ${examples} and the like`)
const digits = z.number().int().min(2, 'is fewer than 2 digits').max(9, 'is more than 9 digits').nullable()
const percent = z.number().positive('must be above zero').max(100, 'is more than 100 %')
const domain = z
  .string()
  .trim()
  .toLowerCase()
  .transform((text) => text.replace(/^@/, ''))
  .pipe(
    z
      .string()
      .regex(/^(?=.{1,253}$)([a-z0-9-]{1,63}\.)+[a-z0-9-]{2,63}$/, 'is no mail domain: it looks like company.com'),
  )

const changes = z.strictObject({
  name: teamName,
  massFlowUnit: unitBy('mass', 'kg/h, t/d, lb/h'),
  moleFlowUnit: unitBy('mole', 'kmol/h, mol/s'),
  decimal: z.enum(['own', 'point', 'comma']),
  flowDigits: digits,
  fractionDigits: digits,
  carriedDigits: digits,
  closureLimit: percent,
  analysisLow: percent,
  analysisHigh: z.number().positive('must be above zero').max(200, 'is more than 200 %'),
  weakLimit: percent,
  mailDomains: z
    .array(domain)
    .max(50)
    .transform((domains) => [...new Set(domains)]),
})
const input = z.strictObject({ team: teamSlug, changes: changes.partial() })

type Field = keyof z.output<typeof changes>

/** Changes what a team has chosen: the fields that are named, and no others. Gives back all as they are then. */
export function updateTeamSettings(ctx: Context, given: z.input<typeof input>): Promise<Result<TeamSettingsView>> {
  return inLockedTeam(ctx, 'settings.change', input, given, async (seat, { changes: wanted }) => {
    const { tx, team: mine } = seat
    const before: TeamSettingsView = { name: mine.name, ...(await settingsOf(tx, mine.id)) }
    const after: TeamSettingsView = { ...before, ...definedOf(wanted) }
    if (after.analysisLow >= after.analysisHigh) return analysisCrossed()
    const changed = (Object.keys(after) as Field[]).filter((field) => !isSame(before[field], after[field]))
    if (changed.length === 0) return ok(before)
    const { name, ...settings } = after
    if (name !== mine.name) await tx.update(team).set({ name }).where(eq(team.id, mine.id))
    const row = { ...settings, changedAt: sql`now()` }
    await tx
      .insert(teamSettings)
      .values({ teamId: mine.id, ...row })
      .onConflictDoUpdate({ target: teamSettings.teamId, set: row })
    const detail = Object.fromEntries(changed.map((field) => [field, { from: before[field], to: after[field] }]))
    await note(seat, 'settings.change', { kind: 'team', id: mine.id }, detail)
    return ok(after)
  })
}

function analysisCrossed() {
  const what = 'must be above the lower limit'
  return failParse({ issues: [{ path: ['changes', 'analysisHigh'], message: what }] })
}

const isSame = (a: unknown, b: unknown) => JSON.stringify(a) === JSON.stringify(b)

const definedOf = <T extends object>(fields: T): { [K in keyof T]: Exclude<T[K], undefined> } =>
  Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined)) as never
