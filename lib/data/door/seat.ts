import { and, eq, isNull } from 'drizzle-orm'
import type { Transaction } from '@/db/client'
import { book } from '@/db/schema/book'
import { member, project, team } from '@/db/schema/team'
import { type Action, isRole, mayDo, type Role } from '@/lib/auth/permissions'
import { ok, type Result } from '@/lib/errors'
import { noSuchBook, noSuchTeam, roleTooLow } from './refusals'
import { canBeTeam } from './words'

/** Somebody at work in one team: what a verb needs to know of who asks, read in the verb's own transaction. */
export type Seat = { tx: Transaction; userId: string; team: { id: string; slug: string; name: string }; role: Role }

export type BookRow = typeof book.$inferSelect
export type BookSeat = Seat & { book: BookRow; project: { id: string; name: string } }

const teamColumns = { id: team.id, slug: team.slug, name: team.name }

/** The caller's seat in the team at `slug`, if the caller is in it now and the role allows the action. */
export async function seatInTeam(tx: Transaction, userId: string, slug: string, action: Action): Promise<Result<Seat>> {
  if (!canBeTeam(slug)) return noSuchTeam()
  const [row] = await tx
    .select({ team: teamColumns, role: member.role })
    .from(team)
    .innerJoin(member, and(eq(member.teamId, team.id), eq(member.userId, userId), isNull(member.deactivatedAt)))
    .where(eq(team.slug, slug))
  if (!row || !isRole(row.role)) return noSuchTeam()
  if (!mayDo(row.role, action)) return roleTooLow(row.role)
  return ok({ tx, userId, ...row })
}

/** The caller's seat at a book of a team that the caller is in. `lock`: nobody else edits it until this transaction ends. */
export async function seatAtBook(
  tx: Transaction,
  userId: string,
  wanted: { book: string; team?: string },
  action: Action,
  { lock = false }: { lock?: boolean } = {},
): Promise<Result<BookSeat>> {
  const query = tx
    .select({ book, project: { id: project.id, name: project.name }, team: teamColumns, role: member.role })
    .from(book)
    .innerJoin(team, eq(team.id, book.teamId))
    .innerJoin(project, eq(project.id, book.projectId))
    .innerJoin(member, and(eq(member.teamId, book.teamId), eq(member.userId, userId), isNull(member.deactivatedAt)))
    .where(and(eq(book.id, wanted.book), wanted.team === undefined ? undefined : eq(team.slug, wanted.team)))
  const [row] = lock ? await query.for('update', { of: book }) : await query
  if (!row || !isRole(row.role)) return noSuchBook()
  if (!mayDo(row.role, action)) return roleTooLow(row.role)
  return ok({ tx, userId, ...row })
}
