import { createSolver, type Problem } from '@/lib/balance'
import { apply } from '@/lib/book/change'
import { fromProblem } from '@/lib/book/from-problem'
import { type BookState, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'

/**
 * What the solver's worker does for an edit: takes the change, turns the book into a problem, solves it. Each call of
 * the function given back types another value for one flow.
 */
export function workerEdit(problem: Problem): () => void {
  let next = 0
  let state: BookState = stateOf(fromProblem(problem, () => `r${next++}`))
  const caseId = [...state.case.keys()][0] as string
  const solver = createSolver()
  const edited = [...state.given.values()].find(({ quantity }) => quantity === 'flow')
  if (!edited) throw new Error('the book has no flow to edit')
  let value = edited.value as number
  return () => {
    const to = (edited.value as number) * (value === edited.value ? 1.01 : 1)
    const update = [{ kind: 'given' as const, id: edited.id, fields: { value: [value, to] as [number, number] } }]
    const applied = apply(state, { id: 'edit', label: 'edit', create: [], update, remove: [] })
    if (!applied.ok) throw new Error('the edit does not fit')
    state = applied.state
    value = to
    const { problem: asked, wanted } = toProblem(state, caseId)
    solver.solve(asked, wanted)
  }
}
