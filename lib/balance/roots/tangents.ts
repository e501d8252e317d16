import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { compileRows } from '../sparse/compiled-rows'
import { eliminate } from '../sparse/elimination'
import { gatherKnowledge } from '../states/knowledge'
import { type BlockPoint, type BlockPoints, blockPoints } from './block-points'
import { type Block, blocksOf } from './blocks'
import { type Branch, copyOf, isFeasible } from './branches'
import { type FreeSpace, freeSpace } from './free-space'
import { type TangentRow, tangentRows } from './tangent-rows'
import type { Work } from './work'

/** A solution x of all rules, and the branch with rows that hold there and, to first order, along all solutions near it. */
export type Tangent = { x: Float64Array; branch: Branch }

export type Tangents = {
  /** At several solutions where the rules leave something free or can be met in several ways; may be empty. */
  tangents: Tangent[]
  /** A solution at which ranks can be told, though flows may be negative there. */
  counted?: Tangent
  /** Rules that nothing was found for, and rules that leave something free. */
  unused: Pending[]
  free: Pending[]
}

/** Seeks solutions of the rules that a branch has left, block by block. */
export function findTangents(model: Model, branch: Branch, work: Work): Tangents {
  const { knowledge, left } = branch.resolved
  if (left.length === 0) return { tangents: [], counted: { x: knowledge.generic.value, branch }, unused: [], free: [] }
  const space = freeSpace(knowledge, work)
  if (!space) return { tangents: [], unused: left, free: [] }
  const found = blocksOf(model, space, left).map((block): { block: Block; its: BlockPoints | undefined } => ({
    block,
    its: blockPoints(model, space, block, work),
  }))
  const atPoints = (choose: (its: BlockPoints) => BlockPoint | undefined): Tangent | undefined => {
    const points = found.flatMap(({ its, block }) => {
      const point = its && choose(its)
      return point ? [{ ...point, block }] : []
    })
    const rows = points.flatMap((point) => point.rows)
    const tangent = withRows(model, branch, rows, work)
    return tangent && { x: joined(space, points), branch: tangent }
  }
  const most = Math.max(0, ...found.map(({ its }) => its?.points.length ?? 0))
  const isFree = found.some(({ its }) => its && its.points.length > 0 && !its.isDetermined)
  const all = Array.from({ length: most }, (_, k) => atPoints(({ points }) => points[k % points.length]))
  const tangents = all.filter(
    (its): its is Tangent => its !== undefined && isFeasible(model, knowledge, its.branch.resolved.knowledge),
  )
  const isCounted = found.every(({ its, block }) => block.directions.length === 0 || its?.generic)
  const counted = isCounted ? atPoints(({ generic }) => generic) : undefined
  // Without all of them, what differs between them would be claimed.
  if (all.includes(undefined) || tangents.length < (isFree ? 2 : 1))
    return { tangents: [], ...(counted && { counted }), unused: left, free: [] }
  return {
    tangents,
    ...(counted && { counted }),
    unused: found.flatMap(({ block, its }) => (!its || its.points.length === 0 ? block.items : [])),
    free: found.flatMap(({ block, its }) => (its && its.points.length > 0 && !its.isDetermined ? block.items : [])),
  }
}

/** The rows of a branch made to hold near a solution x of all its rules; undefined where their rank is unsure. */
export function linearisedAt(model: Model, branch: Branch, x: Float64Array, work: Work): Branch | undefined {
  const { knowledge, left } = branch.resolved
  const space = freeSpace(knowledge, work)
  if (!space) return undefined
  const rows: TangentRow[] = []
  for (const block of blocksOf(model, space, left)) {
    const n = block.directions.length
    if (!work.take(n * n * n)) return undefined
    const directions = block.directions.map((q) => space.directions[q] as Float64Array)
    const its = tangentRows(block, directions, x)
    if (!its) return undefined
    rows.push(...its)
  }
  const near = withRows(model, branch, rows, work)
  if (!near) return undefined
  // What is typed as a ratio is weighed by the flows of this solution.
  const generic = { value: x, size: x.map(Math.abs) }
  return { ...near, resolved: { ...near.resolved, knowledge: { ...near.resolved.knowledge, generic } } }
}

function withRows(model: Model, branch: Branch, rows: readonly TangentRow[], work: Work): Branch | undefined {
  const all = copyOf(branch.assembly.rows)
  if (!work.take(20 * all.column.length)) return undefined
  for (const { source, form } of rows) all.push(source, form.columns, form.coefficients, 0 - form.constant)
  const knowledge = gatherKnowledge(eliminate(compileRows(all, model.nColumns), branch.assembly.nonNegative))
  return {
    ...branch,
    assembly: { ...branch.assembly, rows: all },
    resolved: { ...branch.resolved, knowledge },
  }
}

/** One solution made of one for each block. */
function joined({ point, directions }: FreeSpace, points: readonly { x: Float64Array; block: Block }[]): Float64Array {
  const x = Float64Array.from(point)
  for (const { x: its, block } of points)
    for (let j = 0; j < x.length; j++)
      if (block.directions.some((q) => directions[q]?.[j] !== 0)) x[j]! += (its[j] as number) - (point[j] as number)
  return x
}
