import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import loadHighs from 'highs'
import { useMemo } from 'react'
import { vi } from 'vitest'
import type { BookHandle } from '@/hooks/book-handle'
import { PanelBook } from '@/hooks/panel-book'
import type { PanelPort } from '@/hooks/panels-client'
import { type SolverHandle, solvedCase } from '@/hooks/solver-handle'
import { useLocalBook } from '@/hooks/use-local-book'
import { usePanelsWorker } from '@/hooks/use-panels'
import { type Problem, solve, solveLpBy } from '@/lib/balance'
import { fromProblem } from '@/lib/book/from-problem'
import type { BookRecord } from '@/lib/book/kinds'
import { starters } from '@/lib/book/starters'
import { type BookState, inOrder } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import { Workbench } from './workbench'

// A whole workbench in happy-dom: a busy machine takes seconds for what a browser does in milliseconds.
vi.setConfig({ testTimeout: 30_000 })

/** The salt plant with ids that are the same in every run. */
export function saltRecords(): BookRecord[] {
  let next = 0
  return fromProblem(starters.salt.problem, () => `salt-${++next}`)
}

/** A demo plant of the test fixtures, likewise. */
export function demoRecords(name: string): BookRecord[] {
  const file = join(import.meta.dirname, `../../tests/fixtures/demo/${name}.book.json`)
  let next = 0
  return fromProblem(JSON.parse(readFileSync(file, 'utf8')) as Problem, () => `demo-${++next}`)
}

/** The real solver, at once and in the same thread: happy-dom has no workers. */
function useSolverHere(state: BookState, caseId: string): SolverHandle {
  return useMemo(() => {
    const { problem, wanted, ...rest } = toProblem(state, caseId)
    const solved = solvedCase({ ...rest, solution: solve(problem, wanted) })
    return { solved, stale: false, trouble: null }
  }, [state, caseId])
}

const solveLp = solveLpBy(await loadHighs())

/** The second worker, likewise. */
function panelsHere(): PanelPort {
  const book = new PanelBook()
  const port: PanelPort = {
    postMessage: (message) => port.onmessage?.({ data: book.answer(message, solveLp) } as MessageEvent),
    terminate: () => {},
    onmessage: null,
    onerror: null,
  }
  return port
}

type Held = { book: BookHandle | null; refusals: string[] }

function Bench({ records, mayEdit, held }: { records: readonly BookRecord[]; mayEdit: boolean; held: Held }) {
  const local = useLocalBook(records, (sentence) => held.refusals.push(sentence))
  const book = mayEdit ? local : { ...local, mayEdit: false, edit: () => 'Your role does not edit it.' }
  held.book = book
  const caseId = inOrder(book.state.case)[0]?.id ?? ''
  const solver = useSolverHere(book.state, caseId)
  const panels = usePanelsWorker(book.state, caseId, solver, panelsHere, 0)
  return <Workbench book={book} solver={solver} panels={panels} caseId={caseId} />
}

/** A workbench over a book in memory, with ways to find its cells by what a screen reader says. */
export function openBench({ records = saltRecords(), mayEdit = true } = {}) {
  const held: Held = { book: null, refusals: [] }
  const user = userEvent.setup()
  render(<Bench records={records} mayEdit={mayEdit} held={held} />)
  const cell = (name: string): HTMLElement => {
    const found = document.querySelector<HTMLElement>(`.grid-cell[aria-label^="${name}"]`)
    if (!found) throw new Error(`There is no cell called “${name}”`)
    return found
  }
  return {
    user,
    cell,
    said: (name: string) => cell(name).getAttribute('aria-label'),
    focused: () => document.activeElement?.getAttribute('aria-label') ?? null,
    strip: () => screen.getByRole('region', { name: 'How far the table is' }).querySelector('p')?.textContent ?? '',
    state: () => {
      if (!held.book) throw new Error('The bench is not drawn')
      return held.book.state
    },
    go: async (name: string) => user.click(cell(name)),
  }
}
