import type { Boundary } from './boundaries/boundary'
import { type Explanation, plainBoundary } from './explain'
import type { MeasureNext } from './next/places'
import type { Problem, Quantity } from './problem'
import {
  CellFlag,
  type CellFlagName,
  CellState,
  type Check,
  type Conflict,
  type Diagnostic,
  type ExtentResult,
  type Solution,
  type SolveStatus,
  type Summary,
  slotOf,
} from './solution'
import { quantityOfCell } from './states/cells'
import type { Step } from './workings/step'

/** One cell of the result, as `npm run solve` prints it. */
export type ResultCell = {
  stream: string
  quantity: Quantity
  component?: string
  state: 'given' | 'solvable' | 'unknown' | 'atOdds'
  value?: number
  step?: number
  flags?: CellFlagName[]
  amplification?: number
  blockedBy?: number[]
}

/** The result `tallybrook-result/1`. Boundaries and workings are there where explained, what to measure next where asked for. */
export type Result = {
  format: 'tallybrook-result/1'
  name: string
  summary: Summary
  cells: ResultCell[]
  extents: ExtentResult[]
  boundaries: Boundary[]
  workings: Step[]
  conflicts: Conflict[]
  conflictsTruncated?: boolean
  checks: Check[]
  measureNext: MeasureNext[]
  roots?: Solution['roots']
  diagnostics: Diagnostic[]
  status: SolveStatus
}

const stateNames = {
  [CellState.given]: 'given',
  [CellState.solvable]: 'solvable',
  [CellState.unknown]: 'unknown',
  [CellState.atOdds]: 'atOdds',
} as const

/** The solution of a problem as plain JSON: cells of every stream that exist, then the rest; workings where explained. */
export function toResult(
  problem: Problem,
  solution: Solution,
  explanation?: Explanation,
  next: MeasureNext[] = [],
): Result {
  const amplification = new Map(solution.amplification)
  const blockedBy = new Map(solution.blockedBy)
  const cells: ResultCell[] = []
  const push = (s: number, quantity: Parameters<typeof quantityOfCell>[1], c: number): void => {
    const slot = slotOf(solution.nComponents, s, quantity, Math.max(c, 0))
    const state = solution.states[slot]
    if (state === undefined || state === CellState.absent) return
    const value = solution.values[slot] as number
    const bits = solution.flags[slot] as number
    const flags = (Object.keys(CellFlag) as CellFlagName[]).filter((name) => bits & CellFlag[name])
    const factor = amplification.get(slot)
    const blocked = blockedBy.get(slot)
    const step = explanation?.stepOfSlot[slot] ?? 0
    cells.push({
      stream: problem.streams[s]?.id as string,
      quantity: quantityOfCell({ problem }, quantity),
      ...(c >= 0 && { component: problem.components[c]?.id as string }),
      state: stateNames[state as keyof typeof stateNames],
      ...(!Number.isNaN(value) && { value }),
      ...(step > 0 && { step }),
      ...(flags.length > 0 && { flags }),
      ...(factor !== undefined && { amplification: factor }),
      ...(blocked && { blockedBy: blocked }),
    })
  }
  for (let s = 0; s < solution.nStreams; s++)
    for (const [flow, part, fraction] of [
      ['flow', 'componentFlow', 'fraction'],
      ['otherFlow', 'otherComponentFlow', 'otherFraction'],
    ] as const) {
      push(s, flow, -1)
      for (let c = 0; c < solution.nComponents; c++) {
        push(s, part, c)
        push(s, fraction, c)
      }
    }
  return {
    format: 'tallybrook-result/1',
    name: problem.name,
    summary: solution.summary,
    cells,
    extents: solution.extents,
    boundaries: (explanation?.boundaries ?? []).map(plainBoundary),
    workings: explanation?.workings ?? [],
    conflicts: solution.conflicts,
    ...(solution.conflictsTruncated && { conflictsTruncated: true }),
    checks: solution.checks ?? [],
    measureNext: next,
    ...(solution.roots && { roots: solution.roots }),
    diagnostics: solution.diagnostics,
    status: solution.status,
  }
}
