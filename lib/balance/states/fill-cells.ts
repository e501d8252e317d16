import type { Model } from '../model'
import type { Roots } from '../roots/find-roots'
import { knownWithRoots } from '../roots/root-cells'
import type { GivenInUse } from '../rows/givens'
import { CellFlag, CellState, type Solution, slotOf, slotsPerStream } from '../solution'
import { cellQuantityOf, forEachCell } from './cells'
import { fixedIn, formValues, ratioIn, readColumn, readForm } from './form-values'
import { type Knowledge, placesOf } from './knowledge'

/** The flat arrays of a solution, all cells that do not exist `absent`. */
export type CellArrays = Pick<Solution, 'states' | 'values' | 'flags'>

export function emptyCells(model: Model): CellArrays {
  const length = model.nStreams * slotsPerStream(model.nComponents)
  return {
    states: new Uint8Array(length),
    values: new Float64Array(length).fill(Number.NaN),
    flags: new Uint8Array(length),
  }
}

/** Values below this part of the stream's flow (1 for a fraction) are rounding, not negative. */
const ROUNDING = 1e-11

/**
 * States and values of every cell from what the rows say. Givens show what was typed, whatever the rows made of it;
 * `atOdds` holds the indexes of givens in a conflict.
 */
export function fillCells(
  model: Model,
  knowledge: Knowledge,
  givens: readonly GivenInUse[],
  atOdds: ReadonlySet<number>,
  roots?: Roots,
): CellArrays {
  const cells = emptyCells(model)
  const { states, values } = cells
  const local: number[] = []
  if (roots)
    forEachCell(model, ({ slot, measure, isFraction, stream }) => {
      const single = isFraction && (model.present[stream] as number[]).length === 1
      const known = single ? { value: 1, isLocal: false } : knownWithRoots(knowledge, roots, measure)
      states[slot] = known === undefined ? CellState.unknown : CellState.solvable
      if (known) values[slot] = known.value
      if (known?.isLocal) local.push(slot)
    })
  else fillFromRows(model, knowledge, cells)
  for (const entry of inDisplayOrder(givens)) {
    const quantity = cellQuantityOf(model, entry.given.quantity)
    if (!quantity) continue
    const slot = slotOf(model.nComponents, entry.stream, quantity, Math.max(entry.component, 0))
    if (states[slot] === CellState.absent) continue
    const state = atOdds.has(entry.index) ? CellState.atOdds : CellState.given
    if (states[slot] !== CellState.atOdds) states[slot] = state
    values[slot] = entry.typed
  }
  for (let stream = 0; stream < model.nStreams; stream++) flagStream(model, stream, cells)
  for (const slot of local) if (states[slot] === CellState.solvable) cells.flags[slot]! |= CellFlag.localOnly
  return cells
}

/** What follows from linear rows alone, read without an object a cell. */
function fillFromRows(model: Model, knowledge: Knowledge, { states, values }: CellArrays): void {
  const places = placesOf(knowledge)
  const own = formValues(places)
  const total = formValues(places)
  const otherTotal = formValues(places)
  forEachCell(model, (cell) => {
    const { slot, quantity } = cell
    let value: number
    if (quantity === 'flow') {
      readColumn(total, cell.column, 1, places)
      value = fixedIn(total)
    } else if (quantity === 'otherFlow') {
      readForm(otherTotal, cell.measure.numerator, places)
      value = fixedIn(otherTotal)
    } else if (cell.isFraction && (model.present[cell.stream] as number[]).length === 1) value = 1
    else {
      readColumn(own, cell.column, cell.coefficient, places)
      value = !cell.isFraction ? fixedIn(own) : ratioIn(own, quantity === 'fraction' ? total : otherTotal)
    }
    states[slot] = Number.isNaN(value) ? CellState.unknown : CellState.solvable
    values[slot] = value
  })
}

/** The reading that a cell shows comes last: 'main', else the first instrument by name. */
export function inDisplayOrder(givens: readonly GivenInUse[]): GivenInUse[] {
  const isMain = ({ given }: GivenInUse): boolean => given.instrument === undefined || given.instrument === 'main'
  const others = givens.filter((entry) => !isMain(entry))
  const name = ({ given }: GivenInUse): string => given.instrument as string
  others.sort((a, b) => (name(a) < name(b) ? 1 : name(a) > name(b) ? -1 : 0))
  return [...others, ...givens.filter(isMain)]
}

function flagStream(model: Model, stream: number, { states, values, flags }: CellArrays): void {
  const n = model.nComponents
  const base = slotOf(n, stream, 'flow')
  const flow = values[base] as number
  const other = slotOf(n, stream, 'otherFlow')
  for (let slot = base; slot < base + slotsPerStream(n); slot++) {
    if (states[slot] === CellState.absent) continue
    const value = values[slot] as number
    const isFraction = (slot > base + n && slot <= base + 2 * n) || slot > other + n
    const size = isFraction ? 1 : Math.abs((slot >= other ? values[other] : flow) as number) || 0
    if (value < -ROUNDING * size) flags[slot]! |= CellFlag.negative
    if (isFraction && value > 1 + ROUNDING) flags[slot]! |= CellFlag.aboveOne
    if (flow === 0) flags[slot]! |= CellFlag.zeroFlow
  }
}
