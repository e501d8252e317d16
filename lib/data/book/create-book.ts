import { and, eq } from 'drizzle-orm'
import { z } from 'zod'
import { project } from '@/db/schema/team'
import type { Context } from '@/lib/auth/context'
import { bookUnits } from '@/lib/balance'
import { starterNames } from '@/lib/book/starters'
import { ok, type Result } from '@/lib/errors'
import { note } from '../door/audit'
import { inTeam } from '../door/enter'
import { noSuchProject } from '../door/refusals'
import type { Seat } from '../door/seat'
import { settingsOf } from '../door/team-settings'
import { visibleProjects } from '../door/visible-projects'
import { bookName, flowUnit, recordId, teamSlug } from '../door/words'
import { contentFrom } from '../records/book-content'
import { insertBook } from '../records/new-book'

/** `flowUnit` left out: the team's for this basis. */
const blank = z
  .strictObject({ kind: z.literal('blank'), basis: z.enum(['mass', 'mole']), flowUnit: flowUnit.optional() })
  .refine(({ basis, flowUnit: unit }) => unit === undefined || bookUnits(basis, unit) !== undefined, {
    path: ['flowUnit'],
    message:
      'is not a unit that fits the basis: kg/h, t/d, lb/h and the like by mass; kmol/h, mol/s and the like by mole',
  })
const starter = z.strictObject({ kind: z.literal('starter'), starter: z.enum(starterNames) })
const input = z.strictObject({
  team: teamSlug,
  projectId: recordId,
  name: bookName,
  from: z.discriminatedUnion('kind', [blank, starter]),
})

/** Makes a book in a project: blank, or from a starter. */
export function createBook(ctx: Context, given: z.input<typeof input>): Promise<Result<{ id: string }>> {
  return inTeam(ctx, 'book.create', input, given, async (seat, { projectId, name, from }) => {
    const visible = and(visibleProjects(seat), eq(project.id, projectId))
    const [inProject] = await seat.tx.select({ id: project.id }).from(project).where(visible)
    if (!inProject) return noSuchProject()
    const made = await insertBook(seat, { projectId, ...contentFrom(await withUnit(seat, from), name) })
    if (!made.ok) return made
    const { id } = made.value
    await note(seat, 'book.create', { kind: 'book', id }, { name, projectId, from })
    return ok({ id })
  })
}

async function withUnit({ tx, team }: Seat, from: z.output<typeof input>['from']) {
  if (from.kind !== 'blank') return from
  if (from.flowUnit !== undefined) return { ...from, flowUnit: from.flowUnit }
  const { massFlowUnit, moleFlowUnit } = await settingsOf(tx, team.id)
  return { ...from, flowUnit: from.basis === 'mass' ? massFlowUnit : moleFlowUnit }
}
