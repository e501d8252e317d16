import { namedMeasure } from '../measure/named-measure'
import type { Problem } from '../problem'
import { settledOf } from '../settled-of'
import type { Place, Solution } from '../solution'
import type { LinearProgramme, Optimum, SolveLp } from './programme'
import { type Region, readAlong, regionOf, type Why } from './region'

/** One end: null where there is none. What is not reached is approached as closely as one likes, by ever larger flows. */
export type Bound = { value: number | null; isReached: boolean }

/**
 * The least and greatest value that a cell can have with every row kept and no flow negative. `atLeastAsWide`: rules that
 * multiply unknowns were left out, so that the true limits may be narrower.
 */
export type Limits = { found: true; least: Bound; greatest: Bound; atLeastAsWide: boolean } | { found: false; why: Why }

/** Below this the scale of a ratio stands for 0: flows without bound. */
const NO_SCALE = 1e-6
/** With the ratio held at its limit, a scale above this says that flows of a size reach it. */
const SOME_SCALE = 1e-5
/** A value below this part of what it is made of is 0. */
const ZERO = 1e-9

/**
 * Limits of one unknown cell by linear programming over what the rows leave free. A ratio is made linear by scaling: A.
 * Charnes and W. W. Cooper, Programming with linear fractional functionals, Naval Research Logistics Quarterly 9 (1962)
 * 181-186. Values are in the units of `Solution.values`; `solution` must be that of this very problem. Never throws.
 */
export function limitsOf(problem: Problem, solution: Solution, place: Place, solveLp: SolveLp): Limits {
  const none = (why: Why): Limits => ({ found: false, why })
  const whole = solution.status === 'gaveUp' ? undefined : settledOf(problem, solution)
  const stream = whole?.model.streamIndex.get(place.stream)
  const measure = whole && stream !== undefined ? namedMeasure(whole.model, stream, place) : undefined
  if (!whole || !measure) return none('noCell')
  const region = regionOf(whole, stream as number, measure)
  if (typeof region === 'string') return none(region)
  const { nFree, rows, atLeastAsWide } = region
  const numerator = readAlong(region, measure.numerator)
  const denominator = measure.denominator && readAlong(region, measure.denominator)
  if (nFree > 0) {
    const { status } = solveLp({ cost: new Float64Array(nFree), rows, nonNegative: [] })
    if (status !== 'optimal') return none(status === 'infeasible' ? 'negativeFlow' : 'failed')
  }
  const bound = (sign: 1 | -1): Bound | undefined =>
    denominator ? ofRatio(region, numerator, denominator, sign, solveLp) : ofForm(region, numerator, sign, solveLp)
  const least = bound(1)
  const greatest = least && bound(-1)
  return least && greatest ? { found: true, least, greatest, atLeastAsWide } : none('failed')
}

type Form = ReturnType<typeof readAlong>

const valueAt = ({ moves, constant }: Form, point: ArrayLike<number>, scale = 1): { value: number; terms: number } => {
  let value = constant * scale
  let terms = Math.abs(value)
  moves.forEach((move, q) => {
    const term = move * (point[q] as number)
    value += term
    terms += Math.abs(term)
  })
  return { value: Math.abs(value) <= ZERO * terms ? 0 : value, terms }
}

const noBound: Bound = { value: null, isReached: false }

/** The end of a linear form: least for sign 1, greatest for -1. undefined where the programme could not be solved. */
function ofForm({ nFree, rows }: Region, form: Form, sign: 1 | -1, solveLp: SolveLp): Bound | undefined {
  const most = largest(form.moves)
  if (nFree === 0 || most === 0) return { value: form.constant, isReached: true }
  const found = solveLp({ cost: form.moves.map((move) => (sign * move) / most), rows, nonNegative: [] })
  if (found.status === 'unbounded') return noBound
  return found.status === 'optimal' ? { value: valueAt(form, found.point).value, isReached: true } : undefined
}

/**
 * The same of a ratio: with everything scaled so that the denominator is 1, it is linear in the scaled directions and the
 * scale. A scale of 0 stands for flows without bound.
 */
function ofRatio(
  { nFree, rows }: Region,
  numerator: Form,
  denominator: Form,
  sign: 1 | -1,
  solveLp: SolveLp,
): Bound | undefined {
  const scaled = (form: Form, by: number): Float64Array =>
    Float64Array.from([...form.moves, form.constant], (value) => value / by)
  const bottom = largest([...denominator.moves, denominator.constant])
  const top = largest([...numerator.moves, numerator.constant])
  if (bottom === 0) return undefined
  if (top === 0) return { value: 0, isReached: true }
  const cost = scaled(numerator, sign * top)
  const programme: LinearProgramme = {
    cost,
    rows: [
      { coefficients: scaled(denominator, bottom), relation: '=', rhs: 1 },
      ...rows.map(({ coefficients, rhs }) => ({
        coefficients: Float64Array.from([...coefficients, -rhs]),
        relation: '>=' as const,
        rhs: 0,
      })),
    ],
    nonNegative: [nFree],
  }
  const found = solveLp(programme)
  if (found.status === 'unbounded') return noBound
  if (found.status !== 'optimal') return undefined
  const scale = found.point[nFree] as number
  const { value, terms } = valueAt(numerator, found.point, scale)
  const under = valueAt(denominator, found.point, scale).value
  const end = Math.abs(value) <= ZERO * Math.max(terms, top) ? 0 : value / under
  return { value: end, isReached: scale > NO_SCALE || isReachedElsewhere(programme, cost, found, nFree, solveLp) }
}

/** Whether flows of a size reach the same end: the greatest scale with the ratio held there. */
function isReachedElsewhere(
  { rows }: LinearProgramme,
  cost: Float64Array,
  { point }: Extract<Optimum, { status: 'optimal' }>,
  nFree: number,
  solveLp: SolveLp,
): boolean {
  const end = cost.reduce((sum, value, q) => sum + value * (point[q] as number), 0)
  const greatestScale = new Float64Array(nFree + 1)
  greatestScale[nFree] = -1
  const held = { coefficients: cost.map((value) => -value), relation: '>=' as const, rhs: -end }
  const found = solveLp({ cost: greatestScale, rows: [...rows, held], nonNegative: [nFree] })
  return found.status === 'unbounded' || (found.status === 'optimal' && (found.point[nFree] as number) > SOME_SCALE)
}

const largest = (values: Iterable<number>): number => {
  let most = 0
  for (const value of values) most = Math.max(most, Math.abs(value))
  return most
}
