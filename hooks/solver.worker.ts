/// <reference lib="webworker" />
import { createSolver } from '@/lib/balance'
import { apply } from '@/lib/book/change'
import { type BookState, emptyState, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import type { FromSolver, ToSolver } from './solver-messages'

declare const self: DedicatedWorkerGlobalScope

let state: BookState = emptyState()
/** Remembers the structure between edits. */
const solver = createSolver()

self.onmessage = (event: MessageEvent<ToSolver>) => {
  const message = event.data
  if (message.type === 'load') state = stateOf(message.records)
  else {
    const applied = apply(state, { id: 'worker', label: 'worker', ...message.body })
    if (!applied.ok) return self.postMessage({ type: 'lost', sequence: message.sequence } satisfies FromSolver)
    state = applied.state
  }
  self.postMessage(...answer(message))
}

function answer({ sequence, caseId }: ToSolver): [FromSolver, Transferable[]] {
  try {
    const { problem, streams, components, leftOut, wanted, rows } = toProblem(state, caseId)
    const solution = solver.solve(problem, wanted)
    const more = solution.wanted
    return [
      { type: 'solved', sequence, solution, streams, components, rows, leftOut },
      [
        ...[solution.states, solution.values, solution.flags].map(({ buffer }) => buffer as Transferable),
        ...(more ? [more.states, more.values, more.flags].map(({ buffer }) => buffer as Transferable) : []),
      ],
    ]
  } catch (cause) {
    // A bug in the solver must not silence the table: it is told, with what went wrong.
    return [{ type: 'failed', sequence, what: cause instanceof Error ? cause.message : String(cause) }, []]
  }
}
