import type { MeasureName } from './problem'

/** What a cell's state is, as stored in `Solution.states`. */
export const CellState = { absent: 0, given: 1, solvable: 2, unknown: 3, atOdds: 4 } as const
export type CellState = (typeof CellState)[keyof typeof CellState]

/** Bits of `Solution.flags`. */
export const CellFlag = {
  negative: 1,
  aboveOne: 2,
  amplified: 4,
  weak: 8,
  localOnly: 16,
  zeroFlow: 32,
} as const
export type CellFlagName = keyof typeof CellFlag

/**
 * Where a cell stands in the flat arrays. Each stream has `slotsPerStream = 2 + 4 nComponents` slots in the
 * order of `slotOf`: flow, componentFlow[c], fraction[c] of the book's basis, then otherFlow, otherComponentFlow[c],
 * otherFraction[c] of the other basis. A cell that does not exist (component absent, molar mass missing) is `absent`.
 */
export type CellQuantity = 'flow' | 'componentFlow' | 'fraction' | 'otherFlow' | 'otherComponentFlow' | 'otherFraction'

export const slotsPerStream = (nComponents: number): number => 2 + 4 * nComponents

/** Index into the flat arrays. `component` is ignored for the two totals. */
export function slotOf(nComponents: number, stream: number, quantity: CellQuantity, component = 0): number {
  const base = stream * slotsPerStream(nComponents)
  switch (quantity) {
    case 'flow':
      return base
    case 'componentFlow':
      return base + 1 + component
    case 'fraction':
      return base + 1 + nComponents + component
    case 'otherFlow':
      return base + 1 + 2 * nComponents
    case 'otherComponentFlow':
      return base + 2 + 2 * nComponents + component
    case 'otherFraction':
      return base + 2 + 3 * nComponents + component
  }
}

export type Place = MeasureName & { stream: string; instrument?: string }

export type Diagnostic = {
  code: string
  severity: 'error' | 'warning' | 'note'
  stream?: string
  unit?: string
  component?: string
  /** A rule, reaction or parameter. */
  id?: string
  /** One plain sentence: what is wrong, where, what to do. */
  text: string
}

export type Conflict = {
  givens: (Place & { typed: number; implied: number; by: number })[]
  relations: { id: string; typed?: number; implied?: number; by: number }[]
  /** Units round which it meets; [] when it meets inside one stream. */
  boundary: string[]
  component?: string
  stream?: string
  code: string
}

/** A value or rule that the balance does not need, held against what the rest says. `by` and `tolerance` are in book units. */
export type Check = {
  code: 'sum' | 'redundant' | 'checkOnly'
  givens: Place[]
  relations: string[]
  /** Typed less what the others imply, of the first given (else the first rule); of a sum, the sum less 1. */
  by: number
  /** What the half-widths can make of `by`. */
  tolerance: number
  agrees: boolean
}

export type Summary = {
  given: number
  solvable: number
  unknown: number
  atOdds: number
  degreesOfFreedom: number
  extentFreedom: number
  /** Streams of each connected block whose flows are known only up to a common factor. */
  freeScale: string[][]
}

export type ExtentResult = { reaction: string; state: 'solvable' | 'unknown' | 'given'; value?: number }

export type SolveStatus = 'solved' | 'open' | 'atOdds' | 'gaveUp'

/**
 * What a stream holds of each measure that was asked for besides the cells, at `row * nStreams + stream`; `absent` where
 * the stream has no such measure (none of its components there, or a molar mass, formula or density missing).
 */
export type WantedMeasures = { states: Uint8Array; values: Float64Array; flags: Uint8Array }

/**
 * The answer in flat arrays, so that it can be transferred from a worker without cloning cells.
 * Values are in the book's flow unit (molar flows of a mass book in the matching mole unit) and as fractions of 1.
 */
export type Solution = {
  status: SolveStatus
  summary: Summary
  nStreams: number
  nComponents: number
  /** CellState by slot, length nStreams * slotsPerStream. */
  states: Uint8Array
  /** By slot; NaN where the cell has no value. */
  values: Float64Array
  /** CellFlag bits by slot. */
  flags: Uint8Array
  /** slot -> amplification, only where the flag stands. */
  amplification: [slot: number, factor: number][]
  /** slot -> indexes into conflicts, only for cells held back by a clash. */
  blockedBy: [slot: number, conflicts: number[]][]
  /** In the order asked for; left out where nothing was. */
  wanted?: WantedMeasures
  extents: ExtentResult[]
  conflicts: Conflict[]
  /** More minimal sets exist than are listed. */
  conflictsTruncated?: boolean
  /** Left out where nothing is checked. */
  checks?: Check[]
  /** Where the rules can be met in several ways: unknown cells that have a value in each, with all of them, ascending. */
  roots?: { cells: (Place & { values: number[] })[] }
  diagnostics: Diagnostic[]
}
