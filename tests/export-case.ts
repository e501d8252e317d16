import { readFileSync } from 'node:fs'
import { solve } from '@/lib/balance'
import type { Problem } from '@/lib/balance/problem'
import type { Solution } from '@/lib/balance/solution'
import { fromProblem } from '@/lib/book/from-problem'
import type { LeftOut } from '@/lib/book/problem-draft'
import { type BookState, stateOf } from '@/lib/book/state'
import { toProblem } from '@/lib/book/to-problem'
import type { TitleBlock } from '@/lib/export/title-block'
import { streamTableWorkbook, type WorkbookInput } from '@/lib/export/xlsx'

/** A book ready for export, as the verb would have it. */

export const title: TitleBlock = {
  owner: 'Kestrel Flats Salt Works',
  project: 'Salt study',
  title: 'Salt section',
  documentNumber: 'KF-100-ST-001',
  revision: 'preliminary draft',
  issued: null,
  made: '2026-03-01',
  creator: 'Lena Kraus',
  checked: null,
  approved: null,
  documentType: 'Stream table',
  caseName: 'Base case',
  basis: 'Mass, kg/h',
}

export const demoProblem = (name: string): Problem =>
  JSON.parse(readFileSync(new URL(`./fixtures/demo/demo-${name}.book.json`, import.meta.url), 'utf8')) as Problem

export function stateFrom(problem: Problem): { state: BookState; caseId: string } {
  let ids = 0
  const state = stateOf(
    fromProblem(problem, () => {
      ids += 1
      return `record${ids}`
    }),
  )
  return { state, caseId: [...state.case.keys()][0] ?? '' }
}

export type ExportCase = WorkbookInput & { leftOut: LeftOut[] }

/** With the solver's own answer, or with one made by hand from the problem that the book gives. */
export function exportCase(problem: Problem, byHand?: (problem: Problem) => Solution): ExportCase {
  const { state, caseId } = stateFrom(problem)
  const { problem: taken, leftOut } = toProblem(state, caseId)
  const solution = byHand ? byHand(taken) : solve(taken)
  return { state, caseId, solved: { problem: taken, solution }, leftOut, title, bookNumber: 12, engineVersion: '0.1.0' }
}

export const workbookOf = (input: WorkbookInput): Promise<Uint8Array> => streamTableWorkbook(input)

/** A mixer, a reactor and a splitter with two components: small enough to add up by hand. Mass basis, kg/h. */
export const smallProblem: Problem = {
  format: 'tallybrook/1',
  name: 'Small plant',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [
    { id: 'A', name: 'Acid', molarMass: 40 },
    { id: 'B', name: 'Base', molarMass: 20 },
  ],
  streams: [
    { id: '1', name: 'Feed', density: 1000 },
    { id: '2', name: 'Make-up', components: ['A'] },
    { id: '3', name: 'Mixed' },
    { id: '4', name: 'Product' },
  ],
  units: [
    { id: 'M', name: 'Mixer', kind: 'mixer' },
    { id: 'R', name: 'Reactor', kind: 'reactor' },
  ],
  links: { M: { '1': 'in', '2': 'in', '3': 'out' }, R: { '3': 'in', '4': 'out' } },
  reactions: [{ id: 'X', unit: 'R', stoichiometry: { A: -1, B: 2 } }],
  givens: [
    { stream: '1', quantity: 'flow', value: 100, source: 'FIT-1', kind: 'meter' },
    { stream: '1', quantity: 'massFraction', component: 'A', value: 0.25, kind: 'assumption', note: 'as last year' },
  ],
  relations: [],
}

export const smallFlows = {
  '1': { A: 25, B: 75 },
  '2': { A: 15 },
  '3': { A: 40, B: 75 },
  '4': { A: 20, B: 95 },
}
