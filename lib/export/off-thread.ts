import { fail, ok, type Result } from '@/lib/errors'
import { writeInThread } from './export-thread'
import { Queue } from './queue'
import type { StreamTableRequest } from './stream-table-file'

/** A book of 1 000 streams and 50 components takes seconds; what takes longer than this has gone wrong. */
const longestMs = 120_000
/** Threads at once, each with its own memory, and how many may wait for one. */
const queue = new Queue(2, 30)

/**
 * Solves and writes a stream table in another thread, so that the server goes on answering. Refuses when too many
 * wait or it takes too long; a fault inside the thread is thrown with its cause.
 */
export async function streamTableOffThread(request: StreamTableRequest): Promise<Result<Uint8Array<ArrayBuffer>>> {
  const turn = queue.run(() => writeInThread(request, longestMs))
  if (turn === undefined) return fail('tooMany', 'Too many tables are being written just now. Try again in a minute.')
  const bytes = await turn
  if (bytes === undefined)
    return fail(
      'unavailable',
      'Writing this table took too long and was stopped. Try again when fewer people are at work.',
    )
  return ok(bytes)
}
