/** Small books for the tests of the solver, and ways to look into a result. */
import { type Given, type Problem, type Result, type ResultCell, solve, toResult } from './index'

export const book = (rest: Partial<Problem>): Problem => ({
  format: 'tallybrook/1',
  name: 'test',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [{ id: 'A' }, { id: 'B' }],
  streams: [{ id: '1' }, { id: '2' }, { id: '3' }],
  units: [{ id: 'U', kind: 'separator' }],
  links: { U: { 1: 'in', 2: 'out', 3: 'out' } },
  ...rest,
})
export const run = (rest: Partial<Problem>): Result => {
  const problem = book(rest)
  return toResult(problem, solve(problem))
}
export const flow = (stream: string, value: number, more: Partial<Given> = {}): Given => ({
  stream,
  quantity: 'flow',
  value,
  ...more,
})
export const share = (stream: string, component: string, value: number, more: Partial<Given> = {}): Given => ({
  stream,
  quantity: 'massFraction',
  component,
  value,
  ...more,
})
export const cell = (result: Result, stream: string, quantity: string, component?: string): ResultCell =>
  result.cells.find(
    (its) => its.stream === stream && its.quantity === quantity && its.component === component,
  ) as ResultCell
export const state = (result: Result, stream: string, quantity: string, component?: string): string =>
  cell(result, stream, quantity, component).state
export const codes = (result: Result): string[] => result.diagnostics.map(({ code }) => code)
