import type { Solution } from '@/lib/balance/solution'
import type { Change } from '@/lib/book/change'
import type { BookRecord } from '@/lib/book/kinds'

/** To the solver's worker. It holds the book; each message is answered once, with its `sequence`. */
export type ToSolver =
  | { type: 'load'; sequence: number; caseId: string; records: BookRecord[] }
  | { type: 'change'; sequence: number; caseId: string; body: Omit<Change, 'id' | 'label'> }

/** From it. The arrays of the solution are transferred, not copied. */
export type FromSolver =
  | {
      type: 'solved'
      sequence: number
      solution: Solution
      streams: string[]
      components: string[]
      /** Of `solution.wanted`. */
      rows: string[]
      leftOut: { id: string; kind: string; what: string }[]
    }
  /** The change did not fit what the worker holds: load the whole book again. */
  | { type: 'lost'; sequence: number }
  | { type: 'failed'; sequence: number; what: string }
