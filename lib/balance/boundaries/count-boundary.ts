import type { Settled } from '../conflicts/find-conflicts'
import { ColumnKind, type Model } from '../model'
import type { BookRows, CompositionGroup, Row } from '../workings/book-rows'
import { balancesOf } from '../workings/region'
import type { Use } from '../workings/step'
import type { Boundary } from './boundary'
import { clashesAt } from './clash'
import { genericPoint } from './generic-point'
import { type Overlap, overlapOf } from './overlap'
import { countsAsRule, type TypedCells, typedCells } from './typed-cells'
import { Unknowns } from './unknowns'

/** A boundary with the reasons why its equations are more than are independent. */
export type CountedBoundary = Boundary & { overlaps: Overlap[] }

/** Counts boundaries of one settled book; what they share is made once. */
export class BoundaryCounter {
  private readonly typed: TypedCells
  private readonly point: Float64Array

  constructor(
    private readonly model: Model,
    private readonly settled: Settled,
    private readonly book: BookRows,
  ) {
    this.typed = typedCells(model, settled)
    this.point = genericPoint(model, settled, book)
  }

  /** The boundary round these units (indexes, in any order). */
  count(list: readonly number[]): CountedBoundary {
    const { model, book } = this
    const units = [...list].sort((a, b) => a - b)
    const crossing = this.crossing(units)
    const extents = this.extentsIn(units).filter((r) => !this.typed.extent[r])
    const unknowns = new Unknowns(model, this.typed, this.point, crossing, extents)
    const balances = balancesOf(book, units).filter(({ uses }) => uses[0]?.equation === 'balance')
    const sums = crossing.filter((s) => unknowns.hasFraction(s))
    const span = unknowns.span()
    const overlaps: Overlap[] = []
    const taken: Use[] = []
    const put = (equation: Use, { columns, values }: Pick<Row, 'columns' | 'values'>): void => {
      if (span.add(columns, values, taken.push(equation) - 1)) return
      const from = span.combination(columns, values)
      overlaps.push(
        overlapOf(equation, columns.length === 0 || !from ? [] : [...from.keys()].map((i) => taken[i] as Use)),
      )
    }
    for (const s of sums) put({ equation: 'sum', stream: model.problem.streams[s]?.id as string }, unknowns.sumRow(s))
    let rules = 0
    for (const group of this.groupsAt(units, crossing)) {
      const [first, ...rest] = group.streams as [number, ...number[]]
      for (const s of rest)
        for (const c of group.components.slice(0, -1)) {
          rules++
          const component = model.problem.components[c]?.id as string
          put({ equation: 'composition', id: group.id, component }, unknowns.equality(first, s, c))
        }
    }
    for (const row of this.ruleRows(units, crossing)) {
      rules++
      put(row.uses[0] as Use, unknowns.gradient(row))
    }
    for (const row of balances) put(row.uses[0] as Use, unknowns.gradient(row))
    const equations = balances.length + sums.length + rules
    const follow = unknowns.countCovered(span)
    return {
      units: units.map((u) => model.plant[u]?.id as string),
      crossing: crossing.map((s) => model.problem.streams[s]?.id as string),
      unknowns: unknowns.count,
      balances: balances.length,
      sums: sums.length,
      rules,
      degreesOfFreedom: unknowns.count - equations,
      independent: span.rank,
      redundant: equations - span.rank,
      over: clashesAt(model, this.settled, book, units, crossing),
      status: unknowns.count === 0 ? 'done' : follow === unknowns.count ? 'ready' : follow > 0 ? 'partly' : 'short',
      overlaps,
    }
  }

  /** Streams with exactly one end inside. */
  private crossing(units: readonly number[]): number[] {
    const ends = new Map<number, number>()
    for (const u of units) for (const s of this.book.units[u]?.streams ?? []) ends.set(s, (ends.get(s) ?? 0) + 1)
    return [...ends].flatMap(([s, count]) => (count === 1 ? [s] : [])).sort((a, b) => a - b)
  }

  private extentsIn(units: readonly number[]): number[] {
    return units.flatMap((u) => (this.model.plant[u]?.byElements ? [] : (this.model.plant[u]?.reactions ?? [])))
  }

  /** Equal compositions among crossing streams: outlets of splitters inside, and what rules name. */
  private groupsAt(units: readonly number[], crossing: readonly number[]): CompositionGroup[] {
    const crosses = new Set(crossing)
    return this.book.groups.flatMap((group) => {
      const outlets = group.unit < 0 ? group.streams : (this.model.plant[group.unit]?.outlets ?? [])
      const streams = group.streams.filter((s) => outlets.includes(s) && crosses.has(s))
      const counts = group.unit < 0 ? streams.length === group.streams.length : units.includes(group.unit)
      return counts && streams.length > 1 ? [{ ...group, streams }] : []
    })
  }

  /** Scalar rows of rules, and of typed values other than flows and fractions, all of whose streams cross. */
  private ruleRows(units: readonly number[], crossing: readonly number[]): Row[] {
    const { model, book } = this
    const crosses = new Set(crossing)
    const inside = new Set(this.extentsIn(units))
    const givens = crossing.flatMap((s) =>
      (book.givens[s] as Row[]).filter(({ uses }) => countsAsRule(model, uses[0]?.quantity ?? 'flow')),
    )
    const rules = [...crossing, -1].flatMap((first) =>
      (book.rulesByStream.get(first) ?? []).filter(
        ({ streams, reactions, restsOn, uses, columns }) =>
          !restsOn &&
          uses.length > 0 &&
          streams.every((s) => crosses.has(s)) &&
          reactions.every((r) => inside.has(r)) &&
          // An extent that a rule holds is no unknown; a free parameter would be one more.
          !(columns.length === 1 && model.columnKind[columns[0] as number] === ColumnKind.extent) &&
          !columns.some((j) => model.columnKind[j] === ColumnKind.parameter),
      ),
    )
    return [...givens, ...rules]
  }
}
