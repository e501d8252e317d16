import type { LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import { seededRandom } from '../random'
import { allRoots } from './all-roots'
import { type Dense, determinant, ROUNDING, reduce, SURE } from './dense'
import { type FreeSpace, type LocalSpace, localSpace } from './free-space'
import type { Scalar, ScalarRule } from './scalars'
import type { Work } from './work'

/** Rules in which one and the same scalar is all that stands between them and linear rows. */
export type OneScalar = { scalar: Scalar; rules: ScalarRule[] }

/** A value of the scalar at which the linear rows can be met, and independent rows that then hold. */
export type ScalarRoot = { value: number; touches: boolean; rows: { source: number; form: LinearForm }[] }

/** `open`: the rules leave the scalar free. */
export type Isolated = { roots: ScalarRoot[] } | 'open' | 'unsure'

/** What is left of a row at a root, as a part of its terms; up to `DOUBT` it may be one. */
const MET = 1e-9
const DOUBT = 1e-6
const MOST_EVALUATIONS = 6000
/** Roots closer than this are one that touches. */
const CLOSE = 1e-6

type Line = { source: number; form: LinearForm }

/**
 * All values of one scalar at which its rules can be met, with the linear part eliminated at each value: such a value
 * makes the rows dependent, so it is a root of one random minor, which has no poles. Each root of the minor is then tried
 * on all rows. Values within 1e-6 of an end of the range (on a scale where infinity is 1) are left out, the ends not.
 */
export function isolate(model: Model, space: FreeSpace, { scalar, rules }: OneScalar, work: Work): Isolated {
  const linesAt = (value: number): Line[] | undefined => {
    const lines: Line[] = []
    for (const { item, lines: its } of rules) {
      const forms = its([value])
      if (!forms) return undefined
      for (const form of forms) lines.push({ source: item.source, form })
    }
    return lines
  }
  const columns = new Set<number>()
  for (const value of [0.31, 0.64])
    for (const { form } of linesAt(value) ?? []) for (const column of form.columns) columns.add(column)
  if (columns.size === 0) return 'unsure'
  for (const s of streamsOf(rules))
    if ((model.totalColumn[s] as number) >= 0) columns.add(model.totalColumn[s] as number)
  const list = [...columns].sort((a, b) => a - b)
  const flows = list.filter((column) => (model.columnKind[column] as number) <= ColumnKind.otherTotal)
  if (!work.take(space.directions.length ** 2 * list.length)) return 'unsure'
  const local = localSpace(space, list)
  if (!local) return 'unsure'

  const random = seededRandom(77)
  const rowsAt = rowsOf(rules, local)
  const generic = genericRank(rowsAt, local, flows, space, random)
  if (generic === undefined) return 'unsure'
  if (generic === 'open') return 'open'
  const minor = minorOf(rowsAt, local, generic.size, generic.withConstant, random)
  const candidates: { value: number; touches: boolean }[] = [0, 1].map((value) => ({ value, touches: false }))
  if (scalar.range !== 'part') candidates.pop()
  for (const sign of scalar.range === 'any' ? [1, -1] : [1]) {
    const scalarAt = (z: number): number => (scalar.range === 'part' ? z : (sign * z) / (1 - z))
    const cost = generic.size ** 3 + local.nFree * generic.size * generic.size + 50 * list.length
    let short = false
    const found = allRoots((z) => {
      short ||= !work.take(cost)
      return short ? { sign: 1, log: 0 } : minor(scalarAt(z), scalar.range === 'part' ? 1 : 1 - z)
    }, MOST_EVALUATIONS)
    if (!found || short) return 'unsure'
    for (const { at, touches } of found) candidates.push({ value: scalarAt(at), touches })
  }
  const roots: ScalarRoot[] = []
  for (const { value, touches } of candidates.sort((a, b) => a.value - b.value)) {
    const verdict = tryAt(linesAt(value), rowsAt(value), local)
    if (verdict === 'unsure') return 'unsure'
    if (verdict === 'no') continue
    const last = roots[roots.length - 1]
    const isEnd = value === 0 || (value === 1 && scalar.range === 'part')
    if (last && !isEnd && last.value !== 0 && value - last.value <= CLOSE * Math.abs(value)) {
      // Two crossings side by side: the root lies between them.
      if (!touches)
        roots[roots.length - 1] = {
          value: last.touches ? value : (value + last.value) / 2,
          touches: true,
          rows: verdict,
        }
      last.touches = true
    } else roots.push({ value, touches, rows: verdict })
  }
  return { roots }
}

function streamsOf(rules: readonly ScalarRule[]): number[] {
  return rules.flatMap(({ item }) => (item.kind === 'composition' ? item.composition.streams : []))
}

type Row = { entries: Float64Array; terms: number }
type RowsAt = (value: number) => Row[] | undefined

/** Rows of all rules at a value; those that change in proportion to it are worked out once. */
function rowsOf(rules: readonly ScalarRule[], local: LocalSpace): RowsAt {
  const parts = rules.map(({ lines, isProportional }): RowsAt => {
    if (!isProportional) return (value) => lines([value])?.map(local.row)
    const [at0, at1] = [lines([0])?.map(local.row) ?? [], lines([1])?.map(local.row) ?? []]
    return (value) =>
      at0.map((zero, i) => {
        const one = at1[i] as Row
        return {
          entries: zero.entries.map((entry, k) => entry + value * ((one.entries[k] as number) - entry)),
          terms: zero.terms + Math.abs(value) * one.terms,
        }
      })
  })
  return (value) => {
    const rows: Row[] = []
    for (const part of parts) {
      const its = part(value)
      if (!its) return undefined
      rows.push(...its)
    }
    return rows
  }
}

/** Rank of the rows at values taken at random: what a root makes smaller. */
function genericRank(
  rowsAt: RowsAt,
  local: LocalSpace,
  flows: readonly number[],
  space: FreeSpace,
  random: () => number,
): { size: number; withConstant: boolean } | 'open' | undefined {
  let best: { size: number; withConstant: boolean } | 'open' | undefined
  for (let attempt = 0; attempt < 2; attempt++) {
    const rows = rowsAt(0.2 + 0.6 * random())
    if (!rows) return undefined
    const reduced = reduce(scaledRows(rows), local.nFree)
    if (!reduced.sure) return undefined
    const over = Math.max(0, ...reduced.rest.map((row) => Math.abs(row[local.nFree] as number)))
    if (over > ROUNDING && over < SURE) return undefined
    const here: typeof best =
      over > SURE
        ? { size: reduced.rank + 1, withConstant: true }
        : flows.some((column) => isForcedToZero(column, reduced, local, space))
          ? { size: reduced.rank, withConstant: false }
          : 'open'
    if (best !== undefined && JSON.stringify(best) !== JSON.stringify(here)) return undefined
    best = here
  }
  return best
}

/** True where the rows leave a flow no value but 0, though the linear rows alone do not. */
function isForcedToZero(
  column: number,
  reduced: ReturnType<typeof reduce>,
  local: LocalSpace,
  space: FreeSpace,
): boolean {
  const { entries, terms } = local.row({ columns: [column], coefficients: [1], constant: 0 })
  const size = Math.max(terms, space.size[column] as number)
  if (entries.slice(0, -1).every((value) => Math.abs(value) <= ROUNDING * size)) return false
  const left = Float64Array.from(entries)
  reduced.rows.forEach((row, q) => {
    const factor = left[reduced.pivotColumns[q] as number] as number
    for (let k = 0; k < left.length; k++) left[k]! -= factor * (row[k] as number)
  })
  return left.every((value) => Math.abs(value) <= SURE * size)
}

const scaledRows = (rows: readonly Row[]): Dense =>
  rows.map(({ entries, terms }) => [...entries].map((value) => (terms === 0 ? 0 : value / terms)))

/** A random square combination of rows and columns, as a function of the scalar, and its determinant. */
function minorOf(
  rowsAt: RowsAt,
  local: LocalSpace,
  size: number,
  withConstant: boolean,
  random: () => number,
): (value: number, weight: number) => { sign: number; log: number } {
  const width = local.nFree + Number(withConstant)
  const reference = [0.23, 0.57, 0.81].map((value) => rowsAt(value)?.map(({ terms }) => terms))
  const nRows = Math.max(0, ...reference.map((its) => its?.length ?? 0))
  const scale = Array.from({ length: nRows }, (_, i) => Math.max(...reference.map((its) => its?.[i] ?? 0)) || 1)
  const mix = (n: number, m: number): number[][] | undefined =>
    n === m ? undefined : Array.from({ length: n }, () => Array.from({ length: m }, () => random() - 0.5))
  const rowMix = mix(size, nRows)
  const columnMix = mix(size, width)
  return (value, weight) => {
    const rows = rowsAt(value)?.map(({ entries }, i) => {
      const factor = weight / (scale[i] as number)
      const its = Array.from({ length: width }, (_, k) => (entries[k] as number) * factor)
      return columnMix ? columnMix.map((mixed) => mixed.reduce((sum, m, k) => sum + m * (its[k] as number), 0)) : its
    })
    if (!rows) return { sign: 0, log: Number.NEGATIVE_INFINITY }
    if (!rowMix) return determinant(rows)
    return determinant(
      rowMix.map((mixed) => {
        const sum = new Array<number>(size).fill(0)
        for (const [i, m] of mixed.entries())
          for (let k = 0; k < size; k++) sum[k]! += m * ((rows[i] as number[])[k] as number)
        return sum
      }),
    )
  }
}

/** Independent rows where all can be met at this value, else 'no'; 'unsure' where it cannot be told. */
function tryAt(lines: Line[] | undefined, rows: Row[] | undefined, local: LocalSpace): Line[] | 'no' | 'unsure' {
  if (!lines || !rows) return 'no'
  const reduced = reduce(scaledRows(rows), local.nFree)
  const over = Math.max(0, ...reduced.rest.map((row) => Math.abs(row[local.nFree] as number)))
  if (over > DOUBT) return 'no'
  if (over > MET || !reduced.sure) return 'unsure'
  return reduced.pivotRows.map((i) => lines[i] as Line)
}
