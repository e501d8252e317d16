import { type Estimate, estimate } from '../estimate/estimate'
import { type Equations, equationsOf } from '../estimate/exact-equations'
import { type ExactSpace, exactSpace, isAlwaysZero, movedBy } from '../estimate/exact-space'
import { formAt, measureAt, type Reading } from '../estimate/readings'
import { startingPoint } from '../estimate/starting-point'
import { columnForm } from '../measure/measure'
import { namedMeasure } from '../measure/named-measure'
import { isRatio, typedValue } from '../measure/typed-value'
import { buildModel, type Model } from '../model'
import type { Given, Rule } from '../problem'
import { assemble } from '../rows/assemble'
import { givensInUse } from '../rows/givens'
import { type Member, memberOfRule } from '../rows/members'
import { openRows } from '../states/open-rows'
import { resolve } from '../states/resolve'

/** Work (values typed x places squared) above which no second opinion is sought. */
const MOST_WORK = 4e8
const MOST_ROUNDS = 30
const JUST = 1e-6
/** Half-widths times these, one after the other, on the way from a rough guess. */
const WIDE = [1e4, 1e2, 1]
/** Starts beyond that at what the rows give. */
const MORE_STARTS = 4

type Rounded = Reading & { member: Member }

/**
 * Values within their half-widths of what was typed at which all rows hold, by member, or undefined where none are
 * found. All that was typed with a half-width is adjusted at once by least squares in half-widths on the points that
 * keep everything else, flows not negative; weights are then raised where a value goes beyond its half-width (Lawson,
 * 1961) until all are within, or until the sum of the deviations proves that they cannot be (duality of the least
 * greatest and the least total deviation). Nothing hangs on which rows an elimination calls dependent.
 */
export function secondOpinion(
  model: Model,
  leaveOut: ReadonlySet<Member>,
  near: Float64Array,
): Map<Member, number> | undefined {
  const opened = openedModel(model, leaveOut)
  if (!opened || opened.rounded.length === 0) return undefined
  const { free, rounded } = opened
  const assembly = assemble(free, { leaveOut })
  const resolved = resolve(free, assembly)
  if (openRows(resolved.knowledge).length > 0) return undefined
  const equations = equationsOf(free, resolved.left)
  const { length: nFree } = resolved.knowledge.elimination.free
  if (rounded.length * (nFree + equations.ratios.length) ** 2 > MOST_WORK) return undefined
  const space = exactSpace(resolved.knowledge, equations.ratios.length)
  const telling = rounded.filter(({ measure: { denominator } }) => !denominator || !isAlwaysZero(space, denominator))
  const fitted = (readings: readonly Rounded[], start: Float64Array): Estimate =>
    estimate(free, space, readings, equations.list, start)
  let its = fitted(telling, pointNear(space, resolved.knowledge.elimination.free, equations, rounded, near))
  for (let attempt = 0; !its.converged && attempt < MORE_STARTS; attempt++) {
    // Widths far beyond the typed ones first: from a rough guess straight to sharp values no step is small enough.
    let x = startingPoint(free, space, widened(telling, WIDE[0] as number), equations, attempt)
    for (const factor of WIDE) {
      its = fitted(widened(telling, factor), x)
      x = its.x
    }
  }
  let weights = telling.map(() => 1)
  for (let round = 0; ; round++) {
    if (!its.converged) return undefined
    const beyond = telling.map(({ measure, value, sigma }) => (value - measureAt(measure, its.x)) / sigma)
    const sizes = beyond.map(Math.abs)
    if (sizes.some(Number.isNaN)) return undefined
    if (sizes.every((size) => size <= 1 + JUST))
      return new Map(telling.map(({ member, measure }) => [member, measureAt(measure, its.x)]))
    // At the optimum the weighted deviations balance, so their pull bounds the least greatest deviation from below.
    let pull = 0
    let reach = 0
    sizes.forEach((size, i) => {
      pull += (weights[i] as number) * size * size
      reach += (weights[i] as number) * size
    })
    if (pull > reach * (1 + JUST) || round >= MOST_ROUNDS) return undefined
    const raised = weights.map((weight, i) => weight * (sizes[i] as number))
    const mean = raised.reduce((sum, weight) => sum + weight, 0) / raised.length
    weights = raised.map((weight) => Math.max(weight / mean, 1e-9))
    its = fitted(
      telling.map((reading, i) => ({ ...reading, sigma: reading.sigma / Math.sqrt(weights[i] as number) })),
      its.x,
    )
  }
}

const widened = (readings: readonly Rounded[], factor: number): Rounded[] =>
  readings.map((reading) => ({ ...reading, sigma: reading.sigma * factor }))

/** The point of the space whose free unknowns are those of `near`, where a value that was set free is as typed. */
function pointNear(
  space: ExactSpace,
  freeColumns: readonly number[],
  { ratios }: Equations,
  rounded: readonly Rounded[],
  near: Float64Array,
): Float64Array {
  const whole = new Float64Array(space.point.length)
  whole.set(near.subarray(0, Math.min(near.length, space.point.length)))
  for (const { measure, value, stream } of rounded)
    if (stream < 0) whole[measure.numerator.columns[0] as number] = value
  ratios.forEach(({ of, to }, k) => {
    whole[space.point.length - ratios.length + k] = formAt(of, whole) / formAt(to, whole) || 1
  })
  const mix = new Float64Array(space.n)
  freeColumns.forEach((column, q) => {
    mix[q] = (whole[column] as number) - (space.point[column] as number)
  })
  for (let k = 0; k < ratios.length; k++)
    mix[freeColumns.length + k] = whole[space.point.length - ratios.length + k] as number
  return movedBy(space, space.point, mix)
}

/** The model with every value that was typed with a half-width set free, and these values as readings. */
function openedModel(model: Model, leaveOut: ReadonlySet<Member>): { free: Model; rounded: Rounded[] } | undefined {
  // A typed 0, or a whole, says what is in a stream and what is not: it is no rounded number.
  const isRounded = (given: Given, index: number): boolean =>
    given.halfWidth !== undefined &&
    (given.use ?? 'given') === 'given' &&
    !leaveOut.has(index) &&
    given.value !== 0 &&
    !(isRatio(given.quantity) && typedValue(model, given).value === 1)
  const freed = (rule: Rule, index: number): boolean =>
    rule.halfWidth !== undefined &&
    'value' in rule &&
    typeof rule.value === 'number' &&
    (rule.use ?? 'given') === 'given' &&
    !leaveOut.has(memberOfRule(model, index))
  const { problem } = model
  const relations = problem.relations ?? []
  const name = (index: number): string => `\u0000${index}`
  const free = buildModel({
    ...problem,
    givens: (problem.givens ?? []).map((given, index) =>
      isRounded(given, index) ? { ...given, use: 'withdrawn' as const } : given,
    ),
    relations: relations.map((rule, index) =>
      freed(rule, index) ? ({ ...rule, value: { parameter: name(index) } } as Rule) : rule,
    ),
    parameters: [
      ...(problem.parameters ?? []),
      ...relations.flatMap((rule, index) => (freed(rule, index) ? [{ id: name(index) }] : [])),
    ],
  })
  if (!free) return undefined
  const rounded: Rounded[] = givensInUse(model, { leaveOut }).givens.flatMap((entry): Rounded[] => {
    const { index, given, stream, component, base, halfWidth } = entry
    const measure = isRounded(given, index) ? namedMeasure(free, stream, given) : undefined
    return measure ? [{ index, given, stream, component, measure, value: base, sigma: halfWidth, member: index }] : []
  })
  relations.forEach((rule, index) => {
    if (!freed(rule, index) || !('value' in rule)) return
    const column = free.parameterColumn[free.parameterIndex.get(name(index)) as number] as number
    rounded.push({
      index: -1,
      given: {} as Given,
      stream: -1,
      component: -1,
      measure: { numerator: columnForm(column) },
      value: rule.value as number,
      sigma: rule.halfWidth as number,
      member: memberOfRule(model, index),
    })
  })
  return { free, rounded }
}
