import { parseFractionUnit } from '@/lib/balance/measure/units-of-measure'
import { buildModel, hasOtherBasis, type Model } from '@/lib/balance/model'
import type { Problem } from '@/lib/balance/problem'
import {
  CellFlag,
  type CellFlagName,
  type CellQuantity,
  CellState,
  type Solution,
  slotOf,
  type WantedMeasures,
} from '@/lib/balance/solution'
import { measureTitle } from '@/lib/book/measures'
import { type BookState, inOrder } from '@/lib/book/state'
import { unitKindOf } from '@/lib/book/units'
import {
  type CarriedRow,
  componentLabel,
  type ExportBlock,
  type ExportCell,
  type ExportRow,
  type RowMeasure,
  type StreamHead,
  type StreamTable,
} from './table-model'

/** Common practice: three or four figures are shown, all are kept. */
export const SHOWN_FIGURES = 4

/** `rows`: the record, or 'volumeFlow', behind each measure of `solution.wanted`. */
export type Solved = { problem: Problem; solution: Solution; rows?: readonly string[] }

/**
 * The stream table of one operating case as it is handed out: every row with its unit, and a state for every cell.
 * `problem` and `solution` belong together and to the book as it stands: their streams and components are in book order.
 */
export function streamTable(state: BookState, { problem, solution, rows = [] }: Solved): StreamTable {
  const model = buildModel(problem)
  if (!model) throw new Error(`The flow unit ${problem.flowUnit} does not fit a ${problem.basis} basis`)
  const own = problem.basis === 'mass' ? model.units.mass : model.units.mole
  const other = problem.basis === 'mass' ? model.units.mole : model.units.mass
  const rowsOf = rowMaker(model, problem, solution)
  const [ownWord, otherWord] = problem.basis === 'mass' ? ['Mass', 'Mole'] : ['Mole', 'Mass']
  const percent = { Mass: 'wt %', Mole: 'mol %' } as Record<string, string>
  const each = problem.components.map((_, index) => index)
  const blocks: ExportBlock[] = [
    { title: null, rows: rowsOf('flow', [null], 'Total flow', own.symbol) },
    { title: `${ownWord} fraction`, rows: rowsOf('fraction', each, '', percent[ownWord as string] as string) },
    { title: 'Component flow', rows: rowsOf('componentFlow', each, '', own.symbol) },
    {
      title: `${otherWord} flow`,
      rows: [
        ...rowsOf('otherFlow', [null], `Total ${(otherWord as string).toLowerCase()} flow`, other.symbol),
        ...rowsOf('otherComponentFlow', each, '', other.symbol),
      ],
    },
    { title: `${otherWord} fraction`, rows: rowsOf('otherFraction', each, '', percent[otherWord as string] as string) },
  ]
  const volume = volumeRow(problem, blocks, model.units.mass.factor, model.units.volume.symbol)
  if (volume) blocks.push({ title: 'Volume flow', rows: [volume] })
  const added = measureRows(state, model, solution, rows)
  if (added.length > 0) blocks.push({ title: 'Further measures', rows: added })
  const { given, solvable, unknown, atOdds } = solution.summary
  return {
    basis: problem.basis,
    flowUnit: own.symbol,
    otherFlowUnit: other.symbol,
    streams: headsOf(state, problem),
    components: problem.components.map(tagged),
    blocks: blocks.filter(({ rows }) => rows.some((row) => ownMeasures.has(row.measure) || row.cells.some(isThere))),
    carried: carriedOf(state),
    connections: problem.units.map((unit) => ({
      tag: unit.id,
      name: unit.name ?? '',
      unitKind: unit.kind,
      ends: problem.streams.map((stream) => problem.links[unit.id]?.[stream.id] ?? null),
    })),
    counts: { given, solvable, unknown, atOdds },
  }
}

const tagged = (one: { id: string; name?: string } | undefined): { tag: string; name: string } => ({
  tag: one?.id ?? '',
  name: one?.name ?? '',
})

const isThere = (cell: ExportCell): boolean => cell.state !== 'absent' && cell.state !== 'noMolarMass'

/** Rows of the book's own basis are always there, the others only where a cell of them is. */
const ownMeasures = new Set<RowMeasure>(['flow', 'fraction', 'componentFlow'])

type RowMaker = (measure: CellQuantity, components: (number | null)[], label: string, unit: string) => ExportRow[]

function rowMaker(model: Model, problem: Problem, solution: Solution): RowMaker {
  const n = problem.components.length
  const present = model.present.map((list) => new Set(list))
  const canBe = (stream: number, component: number | null): boolean =>
    component === null ? present[stream]?.size !== 0 : present[stream]?.has(component) === true
  return (measure, components, label, unit) =>
    components.map((component) => ({
      measure,
      component,
      label: component === null ? label : componentLabel(tagged(problem.components[component])),
      unit,
      digits: SHOWN_FIGURES,
      cells: problem.streams.map((_, stream) => {
        const cell = cellAt(solution, slotOf(n, stream, measure, component ?? 0), isPercent(measure) ? 100 : 1)
        if (cell.state !== 'absent' || !canBe(stream, component)) return cell
        // The solver leaves out what it cannot show, and everything where it gave up.
        const shows = ownMeasures.has(measure) || hasOtherBasis(model, stream)
        return { ...cell, state: shows ? 'unknown' : 'noMolarMass' }
      }),
    }))
}

/** Rows that people added, each in its own unit. */
function measureRows(state: BookState, model: Model, { wanted }: Solution, ids: readonly string[]): ExportRow[] {
  if (!wanted) return []
  return ids.flatMap((id, index): ExportRow[] => {
    const measure = state.measure.get(id)
    if (!measure) return []
    const scale = 1 / (parseFractionUnit(measure.unit)?.factor ?? 1)
    const ofMass = unitKindOf(measure.quantity, model.problem.basis) === 'massFraction'
    const words: Record<string, string> = ofMass ? { 1: 'kg/kg', '%': 'wt %' } : { 1: 'mol/mol', '%': 'mol %' }
    return [
      {
        measure: 'measure',
        component: index,
        label: measureTitle(state, measure),
        unit: words[measure.unit] ?? measure.unit,
        digits: SHOWN_FIGURES,
        cells: model.problem.streams.map((_, stream) => cellAt(wanted, index * model.nStreams + stream, scale)),
      },
    ]
  })
}

const isPercent = (measure: RowMeasure): boolean => measure === 'fraction' || measure === 'otherFraction'

function cellAt({ states, values, flags }: WantedMeasures, slot: number, scale: number): ExportCell {
  const value = values[slot] ?? Number.NaN
  const marks = flagNames(flags[slot] ?? 0)
  const known = (state: 'given' | 'solvable' | 'atOdds'): ExportCell =>
    Number.isFinite(value)
      ? { state, value: value * scale, flags: marks }
      : { state: state === 'atOdds' ? 'atOdds' : 'unknown', value: null, flags: marks }
  switch (states[slot]) {
    case CellState.given:
      return known('given')
    case CellState.solvable:
      return known('solvable')
    case CellState.atOdds:
      return known('atOdds')
    case CellState.unknown:
      return { state: 'unknown', value: null, flags: marks }
    default:
      return { state: 'absent', value: null, flags: [] }
  }
}

const flagNames = (bits: number): CellFlagName[] =>
  (Object.keys(CellFlag) as CellFlagName[]).filter((name) => (bits & CellFlag[name]) !== 0)

/** Where a density is carried: the mass flow of the table over it, so known exactly where that is. */
function volumeRow(problem: Problem, blocks: ExportBlock[], kgPerMass: number, unit: string): ExportRow | null {
  if (!problem.streams.some(({ density }) => density !== undefined)) return null
  const wanted: RowMeasure = problem.basis === 'mass' ? 'flow' : 'otherFlow'
  const mass = blocks.flatMap(({ rows }) => rows).find(({ measure }) => measure === wanted)
  if (!mass) return null
  const cells = problem.streams.map(({ density }, stream): ExportCell => {
    const flow = mass.cells[stream]
    if (density === undefined || !flow) return { state: 'absent', value: null, flags: [] }
    if (flow.value === null) return flow
    return {
      state: flow.state === 'given' ? 'solvable' : flow.state,
      value: (flow.value * kgPerMass) / density,
      flags: [],
    }
  })
  return { measure: 'volumeFlow', component: null, label: 'Volume flow', unit, digits: SHOWN_FIGURES, cells }
}

function headsOf(state: BookState, problem: Problem): StreamHead[] {
  const ends = { in: new Map<string, string>(), out: new Map<string, string>() }
  for (const unit of problem.units)
    for (const [stream, direction] of Object.entries(problem.links[unit.id] ?? {})) ends[direction].set(stream, unit.id)
  const phases = inOrder(state.stream).map(({ phase }) => phase)
  return problem.streams.map(({ id, name }, index) => ({
    tag: id,
    name: name ?? '',
    from: ends.out.get(id) ?? '',
    to: ends.in.get(id) ?? '',
    phase: phases[index] ?? '',
  }))
}

function carriedOf(state: BookState): CarriedRow[] {
  const streams = inOrder(state.stream)
  const rows: CarriedRow[] = [
    { label: 'Density', unit: 'kg/m3', texts: streams.map(({ density }) => density) },
    { label: 'Temperature', unit: '', texts: streams.map(({ temperature }) => temperature) },
    { label: 'Pressure', unit: '', texts: streams.map(({ pressure }) => pressure) },
  ]
  return rows.filter(({ texts }) => texts.some((text) => text !== null && text !== ''))
}
