import { type Atoms, molarMassOf, parseFormula } from './chemistry/chemical-formula'
import type { Measure } from './measure/measure'
import { type BookUnits, bookUnits } from './measure/units-of-measure'
import type { Problem, Quantity, UnitKind } from './problem'
import type { RowStore } from './rows/row-store'
import type { PivotMemory } from './sparse/pivot-memory'

/** What a column of the rows stands for. Only component flows, totals and other totals can never be negative. */
export const ColumnKind = { componentFlow: 0, total: 1, otherTotal: 2, extent: 3, parameter: 4 } as const
export type ColumnKind = (typeof ColumnKind)[keyof typeof ColumnKind]

export type UnitModel = {
  id: string
  kind: UnitKind
  byElements: boolean
  inlets: number[]
  outlets: number[]
  reactions: number[]
}

export type ReactionModel = {
  id: string
  unit: number
  components: number[]
  /** Change of each component per unit of extent, in the book's basis and flow unit. */
  change: number[]
  /** Stoichiometric numbers, moles. */
  moles: number[]
}

/**
 * A problem with indexes in place of ids, and its unknowns as columns. Totals are columns of their own (one more row
 * each), so that a fraction is a row of two entries; a stream of one component uses that component's column as its total.
 */
export type Model = {
  problem: Problem
  units: BookUnits
  nStreams: number
  nComponents: number
  nColumns: number
  /** ColumnKind by column, length nColumns. */
  columnKind: Uint8Array
  /** Column of the flow of component c in stream s at s * nComponents + c; -1 where absent. */
  flowColumn: Int32Array
  /** Column of the total of a stream; -1 where no component can be in it. */
  totalColumn: Int32Array
  /** Column of the total on the other basis, where one is used; else -1. */
  otherTotalColumn: Int32Array
  extentColumn: Int32Array
  /** Column of a free parameter, else -1. */
  parameterColumn: Int32Array
  /** Components that can be in each stream, ascending. */
  present: number[][]
  /** kg/kmol, NaN where unknown; length nComponents. */
  molarMass: Float64Array
  atoms: (Atoms | undefined)[]
  plant: UnitModel[]
  reactions: ReactionModel[]
  streamIndex: Map<string, number>
  componentIndex: Map<string, number>
  unitIndex: Map<string, number>
  reactionIndex: Map<string, number>
  parameterIndex: Map<string, number>
  /** Measures by quantity and place, made when first asked for (measureOf). */
  measures: Map<Quantity, Map<number, Measure>>
  /** Definitions and balances, made when first asked for (assemble). */
  structureRows?: RowStore
  /** Orders of pivots of earlier eliminations, where a solver remembers them. */
  pivots?: PivotMemory
}

const indexById = (list: readonly { id: string }[]): Map<string, number> =>
  new Map(list.map(({ id }, index) => [id, index]))

/**
 * All of a problem that a model is made from, as one text: two problems of the same text differ only in what is typed
 * (givens, values of rules and of parameters), and one model serves both.
 */
export function structureOf(problem: Problem): string {
  return JSON.stringify([
    problem.basis,
    problem.flowUnit,
    problem.components.map(({ id, formula, molarMass }) => [id, formula, molarMass]),
    problem.streams.map(({ id, components, density }) => [id, components, density]),
    problem.units.map(({ id, kind, balance, inventory }) => [id, kind, balance, inventory]),
    problem.links,
    problem.reactions?.map(({ id, unit, stoichiometry }) => [id, unit, stoichiometry]),
    problem.parameters?.map(({ id, value }) => [id, value === undefined]),
    streamsOnOtherBasis(problem),
  ])
}

/** Streams with a given that needs the total on the other basis. */
function streamsOnOtherBasis({ basis, givens }: Problem): string[] {
  const otherBasis = basis === 'mass' ? ['moleFlow', 'moleFraction'] : ['massFlow', 'massFraction']
  const streams = new Set<string>()
  for (const { stream, quantity } of givens ?? []) if (otherBasis.includes(quantity)) streams.add(stream)
  return [...streams]
}

/** undefined only where the flow unit does not fit the basis, which a checked problem cannot have. */
export function buildModel(problem: Problem): Model | undefined {
  const units = bookUnits(problem.basis, problem.flowUnit)
  if (!units) return undefined
  const nStreams = problem.streams.length
  const nComponents = problem.components.length
  const streamIndex = indexById(problem.streams)
  const componentIndex = indexById(problem.components)
  const unitIndex = indexById(problem.units)
  const reactions = problem.reactions ?? []
  const parameters = problem.parameters ?? []

  const atoms = problem.components.map(({ formula }) => (formula === undefined ? undefined : parseFormula(formula)))
  const molarMass = Float64Array.from(
    problem.components,
    ({ molarMass: typed, formula }) =>
      typed ?? (formula === undefined ? Number.NaN : (molarMassOf(formula) ?? Number.NaN)),
  )
  const present = problem.streams.map(({ components }) =>
    components === undefined
      ? Array.from({ length: nComponents }, (_, c) => c)
      : [...new Set(components.map((id) => componentIndex.get(id) as number))].sort((a, b) => a - b),
  )

  const kinds: ColumnKind[] = []
  const column = (kind: ColumnKind): number => kinds.push(kind) - 1
  const flowColumn = new Int32Array(nStreams * nComponents).fill(-1)
  for (let s = 0; s < nStreams; s++)
    for (const c of present[s] as number[]) flowColumn[s * nComponents + c] = column(ColumnKind.componentFlow)
  const totalColumn = Int32Array.from(present, (list, s) => {
    if (list.length === 0) return -1
    return list.length === 1 ? (flowColumn[s * nComponents + (list[0] as number)] as number) : column(ColumnKind.total)
  })
  const otherTotalColumn = new Int32Array(nStreams).fill(-1)
  for (const stream of streamsOnOtherBasis(problem)) {
    const s = streamIndex.get(stream) as number
    if ((present[s] as number[]).length > 1) otherTotalColumn[s] = column(ColumnKind.otherTotal)
  }
  const extentColumn = Int32Array.from(reactions, () => column(ColumnKind.extent))
  const parameterColumn = Int32Array.from(parameters, ({ value }) =>
    value === undefined ? column(ColumnKind.parameter) : -1,
  )

  const plant = problem.units.map((unit): UnitModel => {
    const links = Object.entries(problem.links[unit.id] ?? {})
    const on = (side: string): number[] =>
      links
        .filter(([, direction]) => direction === side)
        .map(([stream]) => streamIndex.get(stream) as number)
        .sort((a, b) => a - b)
    return {
      id: unit.id,
      kind: unit.kind,
      byElements: unit.balance === 'elements',
      inlets: on('in'),
      outlets: on('out'),
      reactions: reactions.flatMap((reaction, r) => (reaction.unit === unit.id ? [r] : [])),
    }
  })
  return {
    problem,
    units,
    nStreams,
    nComponents,
    nColumns: kinds.length,
    columnKind: Uint8Array.from(kinds),
    flowColumn,
    totalColumn,
    otherTotalColumn,
    extentColumn,
    parameterColumn,
    present,
    molarMass,
    atoms,
    plant,
    reactions: reactions.map((reaction) => {
      const entries = Object.entries(reaction.stoichiometry).filter(([, nu]) => nu !== 0)
      const components = entries.map(([id]) => componentIndex.get(id) as number)
      const moles = entries.map(([, nu]) => nu)
      return {
        id: reaction.id,
        unit: unitIndex.get(reaction.unit) as number,
        components,
        moles,
        change: problem.basis === 'mole' ? moles : massChange(components, moles, molarMass, units.molesPerMass),
      }
    }),
    streamIndex,
    componentIndex,
    unitIndex,
    reactionIndex: indexById(reactions),
    parameterIndex: indexById(parameters),
    measures: new Map(),
  }
}

/**
 * Mass of each component per unit of extent. Rounded molar masses leave a small gap; the products are scaled so that
 * mass closes exactly (the gap is at most 5e-4 of the reactants in a checked problem).
 */
function massChange(components: number[], moles: number[], molarMass: Float64Array, molesPerMass: number): number[] {
  const mass = moles.map((nu, k) => (nu * (molarMass[components[k] as number] as number)) / molesPerMass)
  const made = mass.reduce((sum, value) => sum + Math.max(value, 0), 0)
  const used = mass.reduce((sum, value) => sum - Math.min(value, 0), 0)
  if (made === 0 || used === 0) return mass
  return mass.map((value) => (value > 0 ? (value * used) / made : value))
}

/** True where every component of the stream has a molar mass, so that the other basis can be shown. */
export function hasOtherBasis(model: Model, stream: number): boolean {
  const list = model.present[stream] as number[]
  return list.length > 0 && list.every((c) => Number.isFinite(model.molarMass[c]))
}

/** Flow in the other basis per flow in the book's basis: k/M on a mass basis, M/k on a mole basis. */
export function otherPerOwn(model: Model, component: number): number {
  const mass = model.molarMass[component] as number
  const { molesPerMass } = model.units
  return model.problem.basis === 'mass' ? molesPerMass / mass : mass / molesPerMass
}
