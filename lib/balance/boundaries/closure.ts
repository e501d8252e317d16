import { molarMassOf, parseFormula } from '../chemistry/chemical-formula'
import { bookUnits, flowFactor, parseFlowUnit } from '../measure/units-of-measure'
import type { Problem } from '../problem'
import { type Solution, slotOf } from '../solution'

/**
 * What goes in and comes out of a boundary, of everything, of one component or of one element. Component flows and totals
 * in the book's flow unit; elements in its moles. `made` is what reactions make of a component (negative where they use
 * it); `percent` is what is left over beside the larger of
 * in and out. A figure is undefined where a flow that it needs has no value.
 */
export type ClosureLine = {
  kind: 'total' | 'component' | 'element'
  component?: string
  element?: string
  in: number | undefined
  out: number | undefined
  made: number | undefined
  held: number
  /** in - out + made - held. */
  difference: number | undefined
  /** What is left over as a part of the larger of in and out, in per cent; 0 where nothing flows. */
  percent: number | undefined
}

/**
 * Closure round the units named (one, some, or all), from the values shown: pure sums over streams that cross, so that
 * it checks the solver rather than repeat it. Components and elements in the problem's order and by name.
 */
export function closureOf(problem: Problem, solution: Solution, units: readonly string[]): ClosureLine[] {
  const inside = new Set(units)
  const side = new Map<string, number>()
  for (const unit of inside)
    for (const [stream, direction] of Object.entries(problem.links[unit] ?? {}))
      side.set(stream, (side.get(stream) ?? 0) + (direction === 'in' ? 1 : -1))
  const ends = new Map<string, number>()
  for (const unit of inside)
    for (const stream of Object.keys(problem.links[unit] ?? {})) ends.set(stream, (ends.get(stream) ?? 0) + 1)
  const crossing = problem.streams.flatMap(({ id }, s) =>
    ends.get(id) === 1 ? [{ s, sign: side.get(id) as number }] : [],
  )
  const value = (s: number, c: number): number => {
    const { components } = problem.streams[s] as Problem['streams'][number]
    const id = problem.components[c]?.id as string
    if (components && !components.includes(id)) return 0
    return solution.values[slotOf(solution.nComponents, s, 'componentFlow', c)] as number
  }
  const flow = (sign: number, of: (s: number) => number): number =>
    crossing.reduce((sum, its) => (its.sign === sign ? sum + of(its.s) : sum), 0)
  const held = (component?: string): number => heldIn(problem, inside, component)

  const components = problem.components.map(({ id }, c) =>
    lineOf(
      { kind: 'component', component: id },
      flow(1, (s) => value(s, c)),
      flow(-1, (s) => value(s, c)),
      madeIn(problem, solution, inside, id),
      held(id),
    ),
  )
  const total = (s: number): number => solution.values[slotOf(solution.nComponents, s, 'flow')] as number
  const made = problem.components.reduce((sum, { id }) => sum + madeIn(problem, solution, inside, id), 0)
  return [
    lineOf({ kind: 'total' }, flow(1, total), flow(-1, total), problem.basis === 'mole' ? made : 0, held()),
    ...components.filter(({ in: into, out, made: its }) => into !== 0 || out !== 0 || its !== 0),
    ...elementLines(problem, inside, flow, value),
  ]
}

function lineOf(
  what: Pick<ClosureLine, 'kind' | 'component' | 'element'>,
  into: number,
  out: number,
  made: number,
  held: number,
): ClosureLine {
  const number = (value: number): number | undefined => (Number.isNaN(value) ? undefined : value)
  const difference = into - out + made - held
  const larger = Math.max(Math.abs(into), Math.abs(out), Math.abs(made))
  return {
    ...what,
    in: number(into),
    out: number(out),
    made: number(made),
    held,
    difference: number(difference),
    percent: number(larger === 0 ? 0 : (100 * difference) / larger),
  }
}

/** What reactions inside make of a component, in the book's flow unit; NaN where an extent is not known. */
function madeIn(problem: Problem, solution: Solution, inside: ReadonlySet<string>, component: string): number {
  let sum = 0
  problem.reactions?.forEach(({ unit, stoichiometry }, r) => {
    const nu = stoichiometry[component] ?? 0
    const byElements = problem.units.find(({ id }) => id === unit)?.balance === 'elements'
    if (nu === 0 || !inside.has(unit)) return
    const extent = byElements ? Number.NaN : (solution.extents[r]?.value ?? Number.NaN)
    sum += extent * (problem.basis === 'mole' ? nu : massMade(problem, stoichiometry, component))
  })
  // A unit that balances elements makes what its streams show: no line of its own kind tells it apart.
  const open = problem.units.some(({ id, balance }) => inside.has(id) && balance === 'elements')
  return open ? Number.NaN : sum
}

/** Mass per extent, products scaled as the mass of the reactants asks. */
function massMade(problem: Problem, stoichiometry: Record<string, number>, component: string): number {
  const mass = (id: string): number => (stoichiometry[id] ?? 0) * massPerMole(problem, id)
  const ids = Object.keys(stoichiometry)
  const used = ids.reduce((sum, id) => sum - Math.min(mass(id), 0), 0)
  const made = ids.reduce((sum, id) => sum + Math.max(mass(id), 0), 0)
  const own = mass(component)
  return own > 0 && made > 0 && used > 0 ? (own * used) / made : own
}

/** Mass in the book's mass unit per mole in its mole unit. */
function massPerMole(problem: Problem, id: string): number {
  const component = problem.components.find((its) => its.id === id)
  const mass = component?.molarMass ?? (component?.formula === undefined ? undefined : molarMassOf(component.formula))
  return (mass ?? Number.NaN) / (bookUnits(problem.basis, problem.flowUnit)?.molesPerMass ?? 1)
}

/** Typed gains of what units inside hold, in the book's flow unit; all of them where no component is named. */
function heldIn(problem: Problem, inside: ReadonlySet<string>, component?: string): number {
  let sum = 0
  for (const { id, inventory } of problem.units)
    if (inside.has(id))
      for (const gain of inventory ?? [])
        if (component === undefined || gain.component === component) sum += gain.value * gainFactor(problem, gain.unit)
  return sum
}

function gainFactor(problem: Problem, unit: string | undefined): number {
  const typed = unit === undefined ? undefined : parseFlowUnit(unit)
  const own = bookUnits(problem.basis, problem.flowUnit)
  if (!typed || !own) return 1
  return flowFactor(typed, problem.basis === 'mass' ? own.mass : own.mole) ?? Number.NaN
}

function elementLines(
  problem: Problem,
  inside: ReadonlySet<string>,
  flow: (sign: number, of: (s: number) => number) => number,
  value: (s: number, c: number) => number,
): ClosureLine[] {
  const atoms = problem.components.map(({ formula }) => (formula === undefined ? undefined : parseFormula(formula)))
  const elements = [...new Set(atoms.flatMap((its) => Object.keys(its ?? {})))].sort()
  const moles = problem.components.map(({ id }) => (problem.basis === 'mole' ? 1 : 1 / massPerMole(problem, id)))
  return elements.map((element) => {
    // A component without a formula that flows leaves the element unknown.
    const count = (s: number): number =>
      problem.components.reduce((sum, _, c) => {
        const n = value(s, c)
        if (n === 0) return sum
        return sum + n * (atoms[c] ? (atoms[c][element] ?? 0) * (moles[c] as number) : Number.NaN)
      }, 0)
    const held = problem.components.reduce((sum, { id }, c) => {
      const gain = heldIn(problem, inside, id)
      return gain === 0 ? sum : sum + gain * (atoms[c]?.[element] ?? 0) * (moles[c] as number)
    }, 0)
    return lineOf({ kind: 'element', element }, flow(1, count), flow(-1, count), 0, held)
  })
}
