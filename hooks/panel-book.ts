import { countBoundary, createSolver, explain, limitsOf, measureNext, type Solution, type SolveLp } from '@/lib/balance'
import { cannotOf } from '@/lib/book/cannot-measure'
import { apply } from '@/lib/book/change'
import type { BookProblem } from '@/lib/book/problem-draft'
import { type BookState, emptyState, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import type { Answer, FromPanels, PanelKind, Panels, ToPanels } from './panel-questions'

/** One operating case, solved here again rather than sent: copying an answer costs about as much, and it cannot be of another book. */
type Worked = { state: BookState; caseId: string; book: BookProblem; solution: Solution }

type Answerers = {
  [K in PanelKind]: (
    worked: Worked,
    question: Panels[K]['question'],
    solveLp: SolveLp | undefined,
  ) => Panels[K]['answer']
}

const answerers: Answerers = {
  explain: ({ book, solution }, question) => explain(book.problem, solution, question),
  boundary: ({ book, solution }, { units }) => countBoundary(book.problem, solution, units) ?? null,
  limits: ({ book, solution }, { place }, solveLp) =>
    solveLp ? limitsOf(book.problem, solution, place, solveLp) : { found: false, why: 'failed' },
  next: ({ book, state }) => measureNext(book.problem, { cannot: cannotOf(state) }),
}

/** The book as the second worker holds it, and its answers. Apart from the worker, so that tests ask it in their own thread. */
export class PanelBook {
  private state: BookState = emptyState()
  private readonly solver = createSolver()
  private worked: Worked | null = null

  /** `solveLp` is what limits need. Never throws: a bug in an answer is told, with what went wrong. */
  answer({ sequence, caseId, book, asked }: ToPanels, solveLp?: SolveLp): FromPanels {
    if (book?.type === 'load') this.state = stateOf(book.records)
    else if (book) {
      const applied = apply(this.state, { id: 'worker', label: 'worker', ...book.body })
      if (!applied.ok) return { type: 'lost', sequence }
      this.state = applied.state
    }
    try {
      const answerer = answerers[asked.kind] as (
        worked: Worked,
        question: unknown,
        solveLp: SolveLp | undefined,
      ) => Answer<PanelKind>
      return { type: 'answered', sequence, answer: answerer(this.solved(caseId), asked.question, solveLp) }
    } catch (cause) {
      return { type: 'failed', sequence, what: cause instanceof Error ? cause.message : String(cause) }
    }
  }

  private solved(caseId: string): Worked {
    if (this.worked?.state === this.state && this.worked.caseId === caseId) return this.worked
    const book = toProblem(this.state, caseId)
    this.worked = { state: this.state, caseId, book, solution: this.solver.solve(book.problem) }
    return this.worked
  }
}
