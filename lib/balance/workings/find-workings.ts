import type { Settled } from '../conflicts/find-conflicts'
import type { Model } from '../model'
import { type Solution, slotsPerStream } from '../solution'
import { quantityOfCell } from '../states/cells'
import type { BookRows, RuleRow } from './book-rows'
import { connectedSets, EVERY_UP_TO, neighbours, SMALL } from './connected'
import { derive, type Found } from './derive'
import { isKnownStream, type Known, knownAtStart, markColumn } from './known'
import type { Region } from './region'
import { scratchFor } from './reject'
import { openBlock } from './simultaneous'
import { Span } from './span'
import type { Find, Step, Use } from './step'
import { reach } from './support'

export type Workings = {
  steps: Step[]
  /** Units of each step's boundary, in the order of `steps`; [] for a stream or a rule. */
  units: number[][]
  /** Step that found the cell, 0 where none did; length nStreams * slotsPerStream. */
  stepOfSlot: Int32Array
}

/**
 * An order in which everything that the exact answer knows can be worked out by hand: again and again the smallest
 * boundary from which something new follows (a stream, a rule, one unit, two connected units, …). Every cell and extent
 * that is solvable is found by exactly one step.
 */
export function findWorkings(model: Model, settled: Settled, solution: Solution, book: BookRows): Workings {
  const known = knownAtStart(model, settled, solution, book)
  const tools = {
    quick: new Span(known.size, known.isZero, false),
    tracked: new Span(known.size, known.isZero, true),
    scratch: scratchFor(model.nColumns),
  }
  const work: Workings = {
    steps: [],
    units: [],
    stepOfSlot: new Int32Array(model.nStreams * slotsPerStream(model.nComponents)),
  }
  const levels = regionsBySize(book)
  const regionsOf: Region[][] = Array.from({ length: model.nStreams }, () => [])
  const made: Region[][] = []
  const level = (k: number): Region[] | undefined => {
    if (made[k]) return made[k]
    const regions = levels(k)
    if (!regions) return undefined
    made[k] = regions
    for (const region of regions) for (const s of region.streams) regionsOf[s]?.push(region)
    return regions
  }
  // Found but not taken yet; dropped when the region changes.
  const waiting = new Map<Region, Found>()
  const take = (region: Region, found: Found): Found => {
    waiting.delete(region)
    region.dirty = true
    return found
  }
  const next = (): Found | undefined => {
    let ratio: Region | undefined
    for (let k = 0; ; k++) {
      const regions = level(k)
      if (!regions) break
      let partly: Region | undefined
      for (const region of regions) {
        if (region.dirty) {
          region.dirty = false
          waiting.delete(region)
          const found = hasTargets(known, region) ? derive(book, known, region, tools) : undefined
          if (!found) continue
          waiting.set(region, found)
        }
        const found = waiting.get(region)
        if (!found) continue
        if (k < 2 || isWhole(known, region, found)) return take(region, found)
        if (givesFlow(found)) partly ??= region
        else ratio ??= region
      }
      // Of boundaries of one size, one that leaves nothing open comes before one that does.
      if (partly) return take(partly, waiting.get(partly) as Found)
    }
    // Nobody works out a ratio round a unit while a flow can still be had elsewhere: it comes with the flow.
    return ratio && take(ratio, waiting.get(ratio) as Found)
  }
  for (;;) {
    const found = next() ?? reach(book, known, settled, tools.tracked) ?? openBlock(book, known, settled.resolved.left)
    // A step without finds would never end.
    if (!found || found.targets.length + found.extents.length === 0) return work
    record(book, known, work, found, solution)
    const touched = new Set(found.targets.map(({ cell }) => cell.stream))
    for (const r of found.extents)
      for (const s of book.units[model.reactions[r]?.unit as number]?.streams ?? []) touched.add(s)
    for (const s of touched) for (const region of regionsOf[s] as Region[]) region.dirty = true
  }
}

/** True where the step finds everything that is still open at the region, flows among it. */
const isWhole = (known: Known, { streams }: Region, found: Found): boolean =>
  givesFlow(found) && streams.every((s) => isAll(known, s, found))

function isAll(known: Known, stream: number, { targets }: Found): boolean {
  const open = known.targets[stream] as unknown[]
  return open.length === 0 || targets.filter(({ cell }) => cell.stream === stream).length === open.length
}

const givesFlow = ({ targets, extents }: Found): boolean =>
  extents.length > 0 || targets.some(({ cell }) => !cell.measure.denominator)

function hasTargets(known: Known, { streams, reactions }: Region): boolean {
  return streams.some((s) => (known.targets[s] as unknown[]).length > 0) || reactions.some((r) => known.extents.has(r))
}

function record(book: BookRows, known: Known, work: Workings, found: Found, { values, extents }: Solution): void {
  const { model } = book
  const step = work.steps.length + 1
  const finds: Find[] = []
  for (const { cell, form } of found.targets) {
    const { slot, stream, component, quantity, measure } = cell
    work.stepOfSlot[slot] = step
    finds.push({
      stream: model.problem.streams[stream]?.id as string,
      quantity: quantityOfCell(model, quantity),
      ...(component >= 0 && { component: model.problem.components[component]?.id as string }),
      value: values[slot] as number,
    })
    const { numerator, denominator } = measure
    if (!denominator && numerator.columns.length === 1) markColumn(known, numerator.columns[0] as number)
    else if (form.columns.length > 0)
      known.ratios[stream]?.push({ columns: form.columns, values: form.coefficients, uses: [] })
  }
  for (const stream of new Set(found.targets.map(({ cell }) => cell.stream))) {
    const gone = new Set(found.targets)
    known.targets[stream] = (known.targets[stream] as Known['targets'][number]).filter((target) => !gone.has(target))
    if (isKnownStream(model, known, stream)) known.ratios[stream] = []
  }
  for (const r of found.extents) {
    markColumn(known, model.extentColumn[r] as number)
    known.extents.delete(r)
    finds.push({ reaction: model.reactions[r]?.id as string, value: extents[r]?.value as number })
  }
  work.units.push(found.units)
  work.steps.push({
    step,
    kind: found.kind,
    boundary: found.units.map((u) => model.plant[u]?.id as string),
    ...(found.kind === 'stream' && { stream: model.problem.streams[found.targets[0]?.cell.stream as number]?.id }),
    unknowns: found.unknowns,
    equations: found.equations,
    uses: found.uses satisfies Use[],
    finds,
  })
}

/** Regions by size: streams, rules, then connected units; undefined past the last. Each list is made when asked for. */
function regionsBySize(book: BookRows): (k: number) => Region[] | undefined {
  const { model, units, isBalanced } = book
  const next = neighbours(units.map(({ streams }) => streams))
  const whole = units.flatMap((_, u) => (isBalanced[u] ? [u] : []))
  const largest = whole.length <= EVERY_UP_TO ? whole.length : SMALL
  return (k) => {
    if (k === 0) return model.problem.streams.map((_, s) => regionOf('stream', [s]))
    if (k === 1) return ruleRegions(book)
    const size = k - 1
    if (size <= largest) return connectedSets(next, isBalanced, size).map((set) => unitRegion(book, set))
    return size === largest + 1 && whole.length > largest ? [unitRegion(book, whole)] : undefined
  }
}

const regionOf = (kind: Region['kind'], streams: number[], rest: Partial<Region> = {}): Region => ({
  kind,
  units: [],
  streams,
  reactions: [],
  rules: [],
  groups: [],
  dirty: true,
  ...rest,
})

/** One region for each rule and each equal composition, with all its streams. */
function ruleRegions(book: BookRows): Region[] {
  const byRule = new Map<string, RuleRow[]>()
  for (const row of book.rules) {
    const id = row.isZero ? '' : `${row.uses[0]?.equation} ${row.uses[0]?.id}`
    byRule.set(id, [...(byRule.get(id) ?? []), row])
  }
  byRule.delete('')
  const union = (lists: number[][]): number[] => [...new Set(lists.flat())].sort((a, b) => a - b)
  return [
    ...book.groups.map((group) =>
      regionOf(
        'rule',
        [...group.streams].sort((a, b) => a - b),
        { groups: [group] },
      ),
    ),
    ...[...byRule.values()].map((rules) =>
      regionOf('rule', union(rules.map(({ streams }) => streams)), {
        rules,
        reactions: union(rules.map(({ reactions }) => reactions)),
      }),
    ),
  ]
}

/** Units with what crosses their boundary, and the rules and compositions all of whose streams cross it. */
function unitRegion(book: BookRows, units: number[]): Region {
  const { model } = book
  const inside = new Set(units)
  const ends = new Map<number, number>()
  for (const u of units) for (const s of book.units[u]?.streams ?? []) ends.set(s, (ends.get(s) ?? 0) + 1)
  const streams = [...ends].flatMap(([s, count]) => (count === 1 ? [s] : [])).sort((a, b) => a - b)
  const reactions = units.flatMap((u) => (model.plant[u]?.byElements ? [] : (model.plant[u]?.reactions ?? [])))
  const crosses = new Set(streams)
  const rules = [...streams, -1].flatMap((first) =>
    (book.rulesByStream.get(first) ?? []).filter(
      (row) =>
        row.streams.every((s) => crosses.has(s)) &&
        row.reactions.every((r) => inside.has(model.reactions[r]?.unit as number)),
    ),
  )
  const groups = book.groups.flatMap((group) => {
    const its = group.streams.filter((s) => crosses.has(s))
    return its.length > 1 ? [{ ...group, streams: its }] : []
  })
  return regionOf('units', streams, { units, reactions, rules, groups })
}
