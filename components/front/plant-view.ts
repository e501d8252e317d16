import type { Problem } from '@/lib/balance/problem'
import { CellFlag, CellState, type Conflict, type Solution, slotOf } from '@/lib/balance/solution'
import { type CellKey, cellKey, plant, plantRows, problemOf, type RowKind, type Typed } from './plant'

export type CellView = { state: CellState; value: number | null; negative: boolean }
export type PlantView = {
  cells: Record<CellKey, CellView>
  given: number
  solvable: number
  unknown: number
  atOdds: number
  /** The cells of each clash, as typed. */
  clashes: CellKey[][]
  /** Cells where one more value would leave nothing unknown; [] when none alone does. */
  closers: CellKey[]
  /** Why the solver gave no answer, as a sentence. */
  trouble: string | null
}

export type Solve = (problem: Problem) => Solution

const quantityOf = { flow: 'flow', massFraction: 'fraction', componentFlow: 'componentFlow' } as const
const scaleOf: Record<RowKind, number> = { flow: 1, massFraction: 100, componentFlow: 1 }

function readCells(solution: Solution): Record<CellKey, CellView> {
  const cells: Record<CellKey, CellView> = {}
  for (const row of plantRows)
    plant.streams.forEach((stream, index) => {
      const component = plant.components.findIndex((c) => c.id === row.component)
      const slot = slotOf(plant.components.length, index, quantityOf[row.kind], Math.max(component, 0))
      const state = (solution.states[slot] ?? CellState.absent) as CellState
      const value = (solution.values[slot] ?? Number.NaN) * scaleOf[row.kind]
      cells[cellKey(row, stream.id)] = {
        state,
        value: Number.isNaN(value) ? null : value,
        negative: ((solution.flags[slot] ?? 0) & CellFlag.negative) !== 0,
      }
    })
  return cells
}

/** Without an answer nothing is shown but what was typed. */
function withoutAnswer(solution: Solution, typed: Typed): PlantView {
  const cells: Record<CellKey, CellView> = {}
  for (const row of plantRows)
    for (const stream of plant.streams) {
      const components: readonly string[] | undefined = 'components' in stream ? stream.components : undefined
      const isAbsent = row.component !== undefined && components !== undefined && !components.includes(row.component)
      const key = cellKey(row, stream.id)
      const state = isAbsent ? CellState.absent : typed.has(key) ? CellState.given : CellState.unknown
      cells[key] = { state, value: typed.get(key)?.value ?? null, negative: false }
    }
  const trouble = solution.diagnostics[0]?.text ?? 'The solver gave no answer.'
  return { cells, given: typed.size, solvable: 0, unknown: 0, atOdds: 0, clashes: [], closers: [], trouble }
}

const count = (cells: Record<CellKey, CellView>, state: CellState): number =>
  Object.values(cells).filter((cell) => cell.state === state).length

function clashOf(conflict: Conflict, typed: Typed): CellKey[] {
  return conflict.givens.flatMap((given) => {
    const row = plantRows.find((r) => r.kind === given.quantity && r.component === given.component)
    if (!row) return []
    const key = cellKey(row, given.stream)
    return typed.has(key) ? [key] : []
  })
}

/** A value between two typed neighbours' shares or flows: which cells close the table does not hang on the number. */
const trialValue: Record<RowKind, number> = { flow: 901.7, massFraction: 27.3, componentFlow: 311.9 }

function findClosers(cells: Record<CellKey, CellView>, typed: Typed, solve: Solve): CellKey[] {
  const closers: CellKey[] = []
  for (const row of plantRows)
    for (const stream of plant.streams) {
      const key = cellKey(row, stream.id)
      if (cells[key]?.state !== CellState.unknown) continue
      const trial = { value: trialValue[row.kind], unit: row.kind === 'massFraction' ? '%' : 'kg/h' }
      const after = readCells(solve(problemOf(new Map([...typed, [key, trial]]))))
      if (count(after, CellState.unknown) === 0 && count(after, CellState.atOdds) === 0) closers.push(key)
    }
  return closers
}

/** Works the plant out and reads off what the table shows. `solve` is handed in: the page loads the solver when it is needed. */
export function viewPlant(typed: Typed, solve: Solve): PlantView {
  const solution = solve(problemOf(typed))
  if (solution.status === 'gaveUp') return withoutAnswer(solution, typed)
  const cells = readCells(solution)
  const unknown = count(cells, CellState.unknown)
  const atOdds = count(cells, CellState.atOdds)
  return {
    cells,
    given: count(cells, CellState.given),
    solvable: count(cells, CellState.solvable),
    unknown,
    atOdds,
    clashes: solution.conflicts.map((conflict) => clashOf(conflict, typed)).filter((clash) => clash.length > 0),
    closers: unknown > 0 && atOdds === 0 ? findClosers(cells, typed, solve) : [],
    trouble: null,
  }
}
