import { type Settled, settle } from '../conflicts/find-conflicts'
import { buildModel, type Model } from '../model'
import type { Problem } from '../problem'
import { findRoots } from '../roots/find-roots'
import { linearisedAt } from '../roots/tangents'
import type { Work } from '../roots/work'
import { CellState } from '../solution'
import type { Vector } from '../sparse/solve'
import { findAmplified } from '../states/amplification'
import { streamsAtOdds } from '../states/at-odds-blocks'
import { forEachCell, type KeptCell, keepCell } from '../states/cells'
import { fillCells } from '../states/fill-cells'
import type { Knowledge } from '../states/knowledge'
import { countCells } from '../states/summary'
import { randomPoint } from './random-point'

/** A book as far as it is solved, with the cells that are still unknown and may be asked about. */
export type Terrain = {
  model: Model
  /** What the linear rows say, without roots. */
  settled: Settled
  /** Unknown cells of the book's own basis outside blocks at odds. */
  open: KeptCell[]
  /** All unknown cells of the summary. */
  unknown: number
}

/** Undefined where the book cannot be worked at all. */
export function surveyOpen(problem: Problem): Terrain | undefined {
  const model = buildModel(problem)
  if (!model) return undefined
  const settled = settle(model)
  const roots = findRoots(model, settled)
  const { assembly, resolved, atOdds } = roots?.sure ?? settled
  const cells = fillCells(model, resolved.knowledge, assembly.givens, atOdds, roots)
  findAmplified(model, roots?.near ?? settled, cells)
  const isAtOdds = streamsAtOdds(model, settled)
  const open: KeptCell[] = []
  forEachCell(model, (cell) => {
    const own = cell.quantity === 'flow' || cell.quantity === 'componentFlow' || cell.quantity === 'fraction'
    if (own && cells.states[cell.slot] === CellState.unknown && !isAtOdds(cell.stream)) open.push(keepCell(cell))
  })
  return { model, settled, open, unknown: countCells(model, cells).unknown }
}

/** A stand-in for the plant: a solution, and what moves which way near it. */
export type StandIn = { point: Vector; knowledge: Knowledge; isSolution: boolean }

/**
 * A random solution with the rows that hold at it and, to first order, near it. Where none without negative flows is
 * found, the generic solution of the linear rows, with these.
 */
export function standIn({ model, settled }: Terrain, seed: number, work: Work): StandIn {
  const { resolved, assembly } = settled
  const point = randomPoint(model, settled, seed, work)
  const near =
    resolved.left.length > 0 && point
      ? linearisedAt(model, { assembly, resolved, touches: false }, point.value, work)
      : undefined
  const { knowledge } = near?.resolved ?? resolved
  return { point: point ?? knowledge.generic, knowledge, isSolution: point !== undefined }
}
