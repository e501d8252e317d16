import type { CellFlagName } from '@/lib/balance/solution'

/** `noMolarMass`: the component can be there, but a molar mass that the other basis needs is missing. */
export type ExportState = 'given' | 'solvable' | 'unknown' | 'atOdds' | 'absent' | 'noMolarMass'

/** A value stands only where the state is given, solvable or at odds. Unknown is never a number, zero is one. */
export type ExportCell = { state: ExportState; value: number | null; flags: readonly CellFlagName[] }

export type RowMeasure =
  | 'flow'
  | 'fraction'
  | 'componentFlow'
  | 'otherFlow'
  | 'otherFraction'
  | 'otherComponentFlow'
  | 'volumeFlow'
  | 'measure'

export type ExportRow = {
  measure: RowMeasure
  /** Index into `StreamTable.components`, of a measure that people added its place among those; null for totals. */
  component: number | null
  label: string
  /** Values are in this unit: fractions in per cent. */
  unit: string
  /** Significant figures that the row shows; the values themselves are whole. */
  digits: number
  /** By stream. */
  cells: ExportCell[]
}

/** Rows under one heading. */
export type ExportBlock = { title: string | null; rows: ExportRow[] }

/** Notes carried along with a stream; no calculation uses the texts. */
export type CarriedRow = { label: string; unit: string; texts: (string | number | null)[] }

export type StreamHead = { tag: string; name: string; from: string; to: string; phase: string }

export type ConnectionRow = { tag: string; name: string; unitKind: string; ends: ('in' | 'out' | null)[] }

export type StreamTable = {
  basis: 'mass' | 'mole'
  flowUnit: string
  otherFlowUnit: string
  streams: StreamHead[]
  components: { tag: string; name: string }[]
  blocks: ExportBlock[]
  carried: CarriedRow[]
  connections: ConnectionRow[]
  /** Cells of the book's basis, as the strip of the workbench counts them. */
  counts: { given: number; solvable: number; unknown: number; atOdds: number }
}

/** How a row is found from elsewhere in the workbook. */
export const rowKey = (measure: RowMeasure, component: number | null): string => `${measure}/${component ?? ''}`

export const stateWords: { readonly [S in ExportState]: string } = {
  given: 'given',
  solvable: 'solvable now',
  unknown: 'still unknown',
  atOdds: 'at odds',
  absent: 'absent',
  noMolarMass: 'a molar mass is missing',
}

/** "Water (H2O)": the name people read, with the tag that rules and formulas use. */
export function componentLabel(component: { tag: string; name: string } | undefined): string {
  const { tag = '', name = '' } = component ?? {}
  return name !== '' && name !== tag ? `${name} (${tag})` : tag
}

export const taggedName = ({ tag, name }: { tag: string; name: string }): string =>
  name !== '' && name !== tag ? `${tag}  ${name}` : tag
