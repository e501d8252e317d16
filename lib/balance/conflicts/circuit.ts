import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'
import type { Assembly } from '../rows/assemble'
import { type Member, memberOfRule } from '../rows/members'
import type { Elimination } from '../sparse/elimination'
import type { Vector } from '../sparse/solve'
import { solveTransposed } from '../sparse/transposed'
import { evaluate } from '../states/knowledge'
import type { Resolved } from '../states/resolved'

/**
 * A combination of rows in which every unknown cancels. With the typed values put in, what is left is `gap`: 0 where the
 * values agree. `weight` says how much of each member's value goes in: changing that value by d changes the gap by
 * weight x d.
 */
export type Circuit = {
  gap: number
  /** Size of the terms that the gap is made of: a gap beside which it is rounding is none. */
  terms: number
  weight: Map<Member, number>
  /** What each member's half-width can make of the gap. */
  reach: Map<Member, number>
  /** Sources of balance rows that take part. */
  structure: Set<number>
}

/** A row that weighs less than this part of the heaviest one takes part by rounding only. */
const NOISE = 1e-12

/** A member whose weights cancel to this part of themselves takes no part. */
export const CANCELS = 1e-9

/** A row that misses by more than this part of itself does not hold, give or take rounding. */
const MISSES = 1e-2

/** A side of a row that cancels to less than this part of its terms compares nothing. */
const BLURRED = 1e-6

/** Rounding of a sum beside its terms, with room for long chains. */
export const ROUNDING = 1e-13

/** Traces rows back to what was typed. */
export class Tracer {
  constructor(
    private readonly model: Model,
    private readonly assembly: Assembly,
    private readonly resolved: Resolved,
    /** Where rows are weighed against each other: the generic solution, unless flows there are 0. */
    private readonly point: Vector = resolved.knowledge.generic,
  ) {}

  /** Sum of the sizes of what is added up to each member's weight, to tell what cancels. */
  private parts = new Map<Member, number>()

  /** The circuit of a dependent row (by its number among the compiled rows) with the pivot rows. */
  ofDependent(row: number): Circuit {
    const e = this.resolved.knowledge.elimination
    const target = new Float64Array(e.rows.nColumns)
    for (let k = e.rows.start[row] as number; k < (e.rows.start[row + 1] as number); k++)
      target[e.rows.column[k] as number] = e.rows.value[k] as number
    const { y } = solveTransposed(e, target)
    y[row]! -= 1
    return this.collect(e, y, -1)
  }

  /** How a form that is the same in every solution rests on the rows; undefined where it does not. */
  ofForm(e: Elimination, form: LinearForm): Circuit | undefined {
    const target = new Float64Array(e.rows.nColumns)
    form.columns.forEach((column, k) => {
      target[column] = form.coefficients[k] as number
    })
    const { y, misses } = solveTransposed(e, target)
    return misses ? undefined : this.collect(e, y, 1)
  }

  private collect(e: Elimination, y: Float64Array, sign: number): Circuit {
    const circuit: Circuit = { gap: 0, terms: 0, weight: new Map(), reach: new Map(), structure: new Set() }
    const parts = this.parts
    this.parts = new Map()
    const sizes = y.map((factor, i) => (factor === 0 ? 0 : Math.abs(factor) * this.sizeOf(e, i)))
    const largest = sizes.reduce((most, size) => Math.max(most, size), 0)
    for (let i = 0; i < y.length; i++)
      if ((sizes[i] as number) > NOISE * largest)
        this.addRow(circuit, e.rows.stored[i] as number, sign * (y[i] as number))
    // A row that was turned linear is rounded as much more as it is blurred by what it rests on.
    circuit.terms = sizes.reduce(
      (sum, size, i) => sum + size * (this.resolved.blur.get(e.rows.stored[i] as number) ?? 1),
      0,
    )
    for (const [member, weight] of circuit.weight)
      if (Math.abs(weight) <= CANCELS * (this.parts.get(member) as number)) {
        circuit.weight.delete(member)
        circuit.reach.delete(member)
      }
    this.parts = parts
    return circuit
  }

  /** Largest term of a row at the generic solution, so that rows are compared by what they weigh there. */
  private sizeOf(e: Elimination, row: number): number {
    const generic = this.point
    let most = Number.MIN_VALUE
    for (let k = e.rows.start[row] as number; k < (e.rows.start[row + 1] as number); k++)
      most = Math.max(
        most,
        Math.abs((e.rows.value[k] as number) * (generic.value[e.rows.column[k] as number] as number)),
      )
    return most
  }

  private addRow(circuit: Circuit, row: number, factor: number): void {
    const { rows } = this.assembly
    circuit.gap += factor * (rows.rhs[row] as number)
    const number = rows.source[row] as number
    const source = rows.sources[number]
    const restsOn = this.resolved.restsOn.get(row)
    if (restsOn) this.addRests(circuit, row, factor, restsOn)
    if (source?.type === 'balance') circuit.structure.add(number)
    if (source?.type !== 'given' && source?.type !== 'rule') return
    const member = source.type === 'given' ? source.index : memberOfRule(this.model, source.index)
    const typed = rows.typed[row]
    const generic = this.point
    const below = typed?.measure.denominator
    const scale = typed ? (below ? evaluate(below, generic).value : 1) : 0
    add(circuit.weight, member, factor * scale)
    add(this.parts, member, Math.abs(factor * scale))
    add(circuit.reach, member, factor * scale * (typed?.halfWidth ?? 0))
  }

  /** Sums of the terms of a stored row with positive and with negative coefficients, and of their sizes. */
  private partsAt(row: number, { value }: Vector): Parts {
    const { rows } = this.assembly
    const parts = { plus: 0, minus: 0, size: 0 }
    for (let k = rows.start[row] as number; k < (rows.start[row + 1] as number); k++)
      addTerm(parts, rows.value[k] as number, value[rows.column[k] as number] as number)
    return parts
  }

  /** A row that was turned linear rests on values known before; their members take part in proportion. */
  private addRests(circuit: Circuit, row: number, factor: number, forms: readonly LinearForm[]): void {
    const generic = this.point
    const round = [...this.resolved.rounds].reverse().find(({ firstRow }) => firstRow <= row)
    if (!round) return
    // Where the flows of the row are 0 now, they are weighed as they stood when the row was added.
    const point = this.partsAt(row, generic).size > 0 ? generic : round.knowledge.generic
    const own = this.partsAt(row, point)
    for (const form of forms) {
      const rest = this.ofForm(round.knowledge.elimination, form)
      if (!rest) continue
      const share = factor * proportion(own, partsOf(form, point))
      for (const [member, weight] of rest.weight) {
        add(circuit.weight, member, share * weight)
        add(this.parts, member, Math.abs(share * weight))
      }
      for (const [member, reach] of rest.reach) add(circuit.reach, member, share * reach)
      for (const source of rest.structure) circuit.structure.add(source)
    }
  }
}

type Parts = { plus: number; minus: number; size: number }

function addTerm(parts: Parts, coefficient: number, value: number): void {
  const term = coefficient * value
  if (coefficient > 0) parts.plus += term
  else parts.minus += term
  parts.size += Math.abs(term)
}

function partsOf(form: LinearForm, { value }: Vector): Parts {
  const parts = { plus: 0, minus: 0, size: 0 }
  form.columns.forEach((j, k) => {
    addTerm(parts, form.coefficients[k] as number, value[j] as number)
  })
  return parts
}

/**
 * How much a row changes for a change of the form that it rests on. Both are differences of the same kind (a flow less a
 * ratio times another), so either side compares them; the side that cancels least in itself is taken.
 */
function proportion(own: Parts, rest: Parts): number {
  if (rest.size === 0) return 0
  const sharp = (a: number, b: number): number => Math.min(Math.abs(a) / own.size, Math.abs(b) / rest.size)
  const plus = sharp(own.plus, rest.plus)
  const minus = sharp(own.minus, rest.minus)
  const closes = ({ plus, minus }: Parts): boolean =>
    Math.abs(plus + minus) <= MISSES * Math.max(Math.abs(plus), Math.abs(minus))
  // Far from where both hold, only their sizes can be compared.
  if (!closes(own) || !closes(rest) || !(Math.max(plus, minus) > BLURRED)) return own.size / rest.size
  return plus >= minus ? own.plus / rest.plus : own.minus / rest.minus
}

function add(map: Map<Member, number>, member: Member, value: number): void {
  map.set(member, (map.get(member) ?? 0) + value)
}

/** Ratio of the gap, less its rounding, to what the half-widths of the members can make of it: above 1 they cannot all hold. */
export function tension({ gap, terms, reach }: Circuit): number {
  const beyond = Math.abs(gap) - ROUNDING * terms
  if (beyond <= 0) return 0
  let sum = 0
  for (const value of reach.values()) sum += Math.abs(value)
  return sum === 0 ? Number.POSITIVE_INFINITY : beyond / sum
}

/** a x left + b x right; a member whose weights cancel to the part `cancels` of themselves drops out. */
export function combineCircuits(a: number, left: Circuit, b: number, right: Circuit, cancels = CANCELS): Circuit {
  const weight = new Map<Member, number>()
  const reach = new Map<Member, number>()
  for (const [factor, from] of [
    [a, left],
    [b, right],
  ] as const) {
    for (const [member, value] of from.weight) add(weight, member, factor * value)
    for (const [member, value] of from.reach) add(reach, member, factor * value)
  }
  for (const member of [...weight.keys()]) {
    const terms = Math.abs(a * (left.weight.get(member) ?? 0)) + Math.abs(b * (right.weight.get(member) ?? 0))
    if (Math.abs(weight.get(member) as number) > cancels * terms) continue
    weight.delete(member)
    reach.delete(member)
  }
  return {
    gap: a * left.gap + b * right.gap,
    terms: Math.abs(a) * left.terms + Math.abs(b) * right.terms,
    weight,
    reach,
    structure: new Set([...left.structure, ...right.structure]),
  }
}
