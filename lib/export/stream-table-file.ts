import { solve } from '@/lib/balance'
import type { BookState } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import { engineVersion } from './engine-version'
import type { TitleBlock } from './title-block'
import { streamTableWorkbook } from './xlsx'

/** What a stream table is made from. Plain data, so that it can be sent to another thread. */
export type StreamTableRequest = {
  state: BookState
  caseId: string
  title: TitleBlock
  bookNumber: number
  /** Per cent; left out: the usual one. */
  closureLimit?: number
}

/** Solves one operating case and writes its workbook. Seconds of work for a large book: see `streamTableOffThread`. */
export async function streamTableFile(request: StreamTableRequest): Promise<Uint8Array<ArrayBuffer>> {
  const { problem, leftOut, wanted, rows } = toProblem(request.state, request.caseId)
  const solution = solve(problem, wanted)
  return streamTableWorkbook({ ...request, solved: { problem, solution, rows }, leftOut, engineVersion })
}
