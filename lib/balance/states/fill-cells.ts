import type { Model } from '../model'
import type { Roots } from '../roots/find-roots'
import { knownWithRoots } from '../roots/root-cells'
import type { GivenInUse } from '../rows/givens'
import { CellFlag, CellState, type Solution, slotOf, slotsPerStream } from '../solution'
import { cellQuantityOf, forEachCell } from './cells'
import type { Knowledge } from './knowledge'

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
  forEachCell(model, ({ slot, measure, component, stream }) => {
    const single = component >= 0 && measure.denominator && (model.present[stream] as number[]).length === 1
    const known = single ? { value: 1, isLocal: false } : knownWithRoots(knowledge, roots, measure)
    states[slot] = known === undefined ? CellState.unknown : CellState.solvable
    if (known) values[slot] = known.value
    if (known?.isLocal) local.push(slot)
  })
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

/** The reading that a cell shows comes last: 'main', else the first instrument by name. */
export function inDisplayOrder(givens: readonly GivenInUse[]): GivenInUse[] {
  const rank = ({ given }: GivenInUse): string =>
    given.instrument === undefined || given.instrument === 'main' ? '' : `~${given.instrument}`
  return [...givens].sort((a, b) => (rank(a) < rank(b) ? 1 : rank(a) > rank(b) ? -1 : 0))
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
