import type { z } from 'zod'
import type { Transaction } from '@/db/client'
import type { Context } from '@/lib/auth/context'
import type { Action } from '@/lib/auth/permissions'
import { failParse, type Result } from '@/lib/errors'
import { lockTeam } from './lock-team'
import { signedOut } from './refusals'
import { type BookSeat, type Seat, seatAtBook, seatInTeam } from './seat'
import { transact } from './transact'

/** How every verb begins: signed in, input as it should be, then one transaction in which role and team are read. */
type Manner = { readOnly?: boolean; lock?: boolean }

/** For verbs about the caller, in no team. */
export async function asPerson<S extends z.ZodType, T>(
  ctx: Context,
  schema: S,
  input: unknown,
  run: (tx: Transaction, userId: string, input: z.output<S>) => Promise<Result<T>>,
  manner: Manner = {},
): Promise<Result<T>> {
  const { userId } = ctx
  if (userId === null) return signedOut()
  const parsed = schema.safeParse(input)
  if (!parsed.success) return failParse(parsed.error)
  return transact((tx) => run(tx, userId, parsed.data), manner)
}

/** For verbs of a team, which `team` of the input names by its address. */
export function inTeam<S extends z.ZodType<{ team: string }>, T>(
  ctx: Context,
  action: Action,
  schema: S,
  input: unknown,
  run: (seat: Seat, input: z.output<S>) => Promise<Result<T>>,
  manner: Manner = {},
): Promise<Result<T>> {
  const work = async (tx: Transaction, userId: string, parsed: z.output<S>): Promise<Result<T>> => {
    const seat = await seatInTeam(tx, userId, parsed.team, action)
    return seat.ok ? run(seat.value, parsed) : seat
  }
  return asPerson(ctx, schema, input, work, manner)
}

/**
 * For verbs that change who is in a team: one at a time. The caller's role is read once more behind the lock, since who
 * had it before may just have taken it away.
 */
export function inLockedTeam<S extends z.ZodType<{ team: string }>, T>(
  ctx: Context,
  action: Action,
  schema: S,
  input: unknown,
  run: (seat: Seat, input: z.output<S>) => Promise<Result<T>>,
): Promise<Result<T>> {
  return inTeam(ctx, action, schema, input, async (seat, parsed) => {
    await lockTeam(seat)
    const now = await seatInTeam(seat.tx, seat.userId, parsed.team, action)
    return now.ok ? run(now.value, parsed) : now
  })
}

/** For verbs of one book, which `book` of the input names; where `team` is named too, it has to be the book's. */
export function atBook<S extends z.ZodType<{ book: string; team?: string | undefined }>, T>(
  ctx: Context,
  action: Action,
  schema: S,
  input: unknown,
  run: (seat: BookSeat, input: z.output<S>) => Promise<Result<T>>,
  manner: Manner = {},
): Promise<Result<T>> {
  const work = async (tx: Transaction, userId: string, parsed: z.output<S>): Promise<Result<T>> => {
    const seat = await seatAtBook(tx, userId, parsed, action, manner)
    return seat.ok ? run(seat.value, parsed) : seat
  }
  return asPerson(ctx, schema, input, work, manner)
}
