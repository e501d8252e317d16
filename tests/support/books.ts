import type { Problem } from '@/lib/balance/problem'
import { apply, type Change } from '@/lib/book/change'
import type { Edit } from '@/lib/book/edits/draft'
import { fromProblem } from '@/lib/book/from-problem'
import { type BookState, recordsOf, stateOf } from '@/lib/book/state'

/** Ids that count up, so that tests can be read. */
export function counter(prefix = 'record'): () => string {
  let next = 0
  return () => `${prefix}${String(next++).padStart(6, '0')}`
}

/** A book from a problem, with ways to find records by tag. */
export function bookOfProblem(problem: Problem) {
  const state = stateOf(fromProblem(problem, counter()))
  return { state, caseId: [...state.case.keys()][0] as string, id: idByTag(state) }
}

/** `id('stream', '101')`; throws where there is none. */
export const idByTag =
  (state: BookState) =>
  (kind: 'stream' | 'component' | 'unit' | 'reaction' | 'rule' | 'parameter', tag: string): string => {
    for (const record of (state[kind] as ReadonlyMap<string, { id: string; tag: string }>).values())
      if (record.tag === tag) return record.id
    throw new Error(`No ${kind} ${tag}`)
  }

/** The state after an edit that must be possible. */
export function done(state: BookState, edit: Edit): BookState {
  if (!edit.ok) throw new Error(`Refused: ${edit.error}`)
  return applied(state, edit.value)
}

export function applied(state: BookState, change: Change): BookState {
  const result = apply(state, change)
  if (!result.ok) throw new Error(`Does not apply: ${JSON.stringify(result.conflicts)}`)
  return result.state
}

/** Records in an order that does not depend on how they came. */
export const sorted = (state: BookState): unknown[] =>
  recordsOf(state).toSorted((a, b) => (`${a.kind}${a.id}` < `${b.kind}${b.id}` ? -1 : 1))

/** A small plant: mixer with recycle, splitter, a reactor; three components, one absent somewhere. */
export const smallPlant: Problem = {
  format: 'tallybrook/1',
  name: 'Small plant',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [
    { id: 'W', name: 'Water', formula: 'H2O' },
    { id: 'A', name: 'Salt', formula: 'NaCl' },
    { id: 'B', name: 'Ash' },
  ],
  streams: [
    { id: '101', name: 'Feed' },
    { id: '102' },
    { id: '103', components: ['W'], density: 998 },
    { id: '104' },
    { id: '105' },
  ],
  units: [
    { id: 'T-1', kind: 'mixer' },
    { id: 'E-1', kind: 'separator', inventory: [{ component: 'A', value: 1 }] },
    { id: 'S-1', kind: 'splitter' },
    { id: 'R-1', kind: 'reactor' },
  ],
  links: {
    'T-1': { 101: 'in', 105: 'in', 102: 'out' },
    'E-1': { 102: 'in', 103: 'out', 104: 'out' },
    'S-1': { 104: 'in', 105: 'out' },
  },
  reactions: [{ id: 'R1', unit: 'R-1', stoichiometry: { W: -1, A: 1 } }],
  parameters: [{ id: 'k', value: 0.4 }],
  givens: [
    { stream: '101', quantity: 'flow', value: 1000, sigma: 5, kind: 'meter', source: 'FT-101' },
    { stream: '101', quantity: 'massFraction', component: 'A', value: 0.1 },
    { stream: '103', quantity: 'flow', value: 400 },
    { stream: '105', quantity: 'massFraction', component: 'B', value: 0.02 },
  ],
  relations: [
    { id: 'Q1', kind: 'split', unit: 'S-1', stream: '105', value: { parameter: 'k' } },
    { id: 'Q2', kind: 'formula', text: 'flow("105") = k * part("101", A)' },
    { id: 'Q3', kind: 'sameComposition', streams: ['104', '105'] },
    { id: 'Q4', kind: 'extent', reaction: 'R1', value: 2 },
  ],
}
