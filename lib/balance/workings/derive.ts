import type { BookRows, RuleRow } from './book-rows'
import { type Known, origins, type Target } from './known'
import { type Region, type RegionRow, rowsOf } from './region'
import { givesNothing, type Scratch } from './reject'
import type { Span } from './span'
import { type Step, sameUse, type Use } from './step'

/** What follows from a region, and the equations that it follows by. */
export type Found = {
  kind: Step['kind']
  units: number[]
  targets: Target[]
  extents: number[]
  uses: Use[]
  unknowns: number
  equations: number
}

/** Spans and scratch of the book's width, made once. */
export type Tools = { quick: Span; tracked: Span; scratch: Scratch }

/** Rows that weigh less than this part of the heaviest in a combination take part by rounding only. */
const NOISE = 1e-8

/** New cells and extents that follow from a region with what is known, undefined where there are none. */
export function derive(
  book: BookRows,
  known: Known,
  region: Region,
  { quick, tracked, scratch }: Tools,
): Found | undefined {
  const rows = rowsOf(book, known, region)
  const mayTurn = region.kind === 'stream' || region.rules.some(({ restsOn }) => restsOn)
  if (!mayTurn && givesNothing(book, rows, scratch)) return undefined
  const sofar = fill(known, region, rows, quick)
  const { targets, extents } = covered(book, known, region, quick)
  if (targets.length + extents.length === 0) return undefined
  if (region.kind !== 'stream' && sofar.every(({ kind }) => kind !== 'equation')) return undefined
  const all = fill(known, region, rowsOf(book, known, region), tracked)
  const combinations = new Combinations(known, tracked)
  const used = new Set<number>()
  const take = (lists: (readonly number[])[] = []): void => {
    for (const list of new Set(lists)) for (const i of list) used.add(i)
  }
  for (const { form } of targets) take(combinations.of(form.columns, form.coefficients))
  for (const r of extents) take(combinations.of([book.model.extentColumn[r] as number], [1]))
  return found(known, region.kind, region.units, { targets, extents }, all, used)
}

/** Puts the rows into the span, then those that rest on forms which the others give; the rows in their order. */
export function fill(known: Known, region: Region, rows: RegionRow[], span: Span): RegionRow[] {
  span.clear()
  for (let i = 0; i < rows.length; i++) span.add(rows[i]!.columns, rows[i]!.values, i)
  let waiting = region.rules.filter((rule) => rule.restsOn)
  for (let changed = true; changed && waiting.length > 0; ) {
    changed = false
    waiting = waiting.filter((rule) => {
      const row = turned(known, rule, rows, span)
      if (!row) return true
      changed = true
      if (row.columns.length > 0) span.add(row.columns, row.values, rows.push(row) - 1)
      return false
    })
  }
  if (rows.some(({ columns }) => columns.some((j) => known.isZero[j]))) span.settleZeros()
  return rows
}

/** A row that has turned linear, with the equations that give what it rests on; undefined where they do not. */
function turned(known: Known, rule: RuleRow, rows: readonly RegionRow[], span: Span): RegionRow | undefined {
  const uses = [...rule.uses]
  for (const form of rule.restsOn ?? []) {
    const open = withoutKnown(known, form.columns, form.coefficients)
    const from = span.combination(open.columns, open.values)
    if (!from) return undefined
    uses.push(...origins(known, open.fixed))
    for (const i of heavy(from)) uses.push(...usesOf(known, rows[i] as RegionRow))
  }
  return { ...withoutKnown(known, rule.columns, rule.values), uses, kind: 'equation' }
}

export function withoutKnown(
  known: Known,
  columns: readonly number[],
  values: readonly number[],
): { columns: number[]; values: number[]; fixed: number[] } {
  const open = { columns: [] as number[], values: [] as number[], fixed: [] as number[] }
  for (let k = 0; k < columns.length; k++) {
    const j = columns[k] as number
    if (known.column[j]) open.fixed.push(j)
    else {
      open.columns.push(j)
      open.values.push(values[k] as number)
    }
  }
  return open
}

function heavy(from: ReadonlyMap<number, number>): number[] {
  let most = 0
  for (const factor of from.values()) most = Math.max(most, Math.abs(factor))
  return [...from].flatMap(([i, factor]) => (Math.abs(factor) > NOISE * most ? [i] : []))
}

const usesOf = (known: Known, row: RegionRow): Use[] => [...row.uses, ...origins(known, row.fixed)]

/** Cells and extents of a region that the span fixes. */
function covered(book: BookRows, known: Known, region: Region, span: Span): Pick<Found, 'targets' | 'extents'> {
  const targets: Target[] = []
  const fixes = new Map<number, boolean>()
  const isFixed = (j: number): boolean => {
    if (known.column[j]) return true
    const before = fixes.get(j)
    if (before !== undefined) return before
    const now = span.covers([j], [1])
    fixes.set(j, now)
    return now
  }
  for (const s of region.streams)
    for (const target of known.targets[s] as Target[]) {
      const { columns, coefficients } = target.form
      if (columns.every(isFixed)) targets.push(target)
      else if (columns.length > 1 && !columns.some(isFixed)) {
        if (span.covers(columns, coefficients)) targets.push(target)
      } else if (columns.length > 2) {
        const open = withoutKnown(known, columns, coefficients)
        if (span.covers(open.columns, open.values)) targets.push(target)
      }
    }
  const extents = region.reactions.filter((r) => {
    const column = book.model.extentColumn[r] as number
    return known.extents.has(r) && span.covers([column], [1])
  })
  return { targets, extents }
}

/** Rows (by number) that single columns and whole forms follow by, each looked for once. */
export class Combinations {
  private readonly byColumn = new Map<number, readonly number[] | undefined>()

  constructor(
    private readonly known: Known,
    private readonly span: Span,
  ) {}

  /**
   * The rows that a form follows by, as one list for each column where each is fixed (most cells: columns are shared by
   * the cells of a stream), else as one list for the form; undefined where it does not follow.
   */
  of(columns: readonly number[], values: readonly number[]): (readonly number[])[] | undefined {
    const open = withoutKnown(this.known, columns, values)
    const lists: (readonly number[])[] = []
    for (const j of open.columns) {
      const list = this.ofColumn(j)
      if (list) lists.push(list)
      else break
    }
    if (lists.length === open.columns.length) return lists
    if (open.columns.length < 2) return undefined
    const from = this.span.combination(open.columns, open.values)
    return from && [heavy(from)]
  }

  private ofColumn(j: number): readonly number[] | undefined {
    if (!this.byColumn.has(j)) {
      const from = this.span.combination([j], [1])
      this.byColumn.set(j, from && heavy(from))
    }
    return this.byColumn.get(j)
  }
}

/** A step's record from the rows it uses. */
export function found(
  known: Known,
  kind: Step['kind'],
  units: number[],
  { targets, extents }: Pick<Found, 'targets' | 'extents'>,
  rows: readonly RegionRow[],
  used: ReadonlySet<number>,
): Found {
  const uses = new Map<string, Use>()
  const take = (list: readonly Use[]): void => {
    for (const use of list) uses.set(sameUse(use), use)
  }
  const columns = new Set<number>()
  let facts = 0
  let equations = 0
  for (const i of [...used].sort((a, b) => a - b)) {
    const row = rows[i] as RegionRow
    take(usesOf(known, row))
    for (const j of row.columns) columns.add(j)
    if (row.kind === 'fact') facts++
    else equations++
  }
  for (const { form } of targets)
    take(
      origins(
        known,
        form.columns.filter((j) => known.column[j]),
      ),
    )
  for (const { cell } of targets)
    if (cell.component >= 0 && uses.size === 0 && kind === 'stream')
      take([{ equation: 'sum', stream: known.streamId(cell.stream) }])
  return { kind, units, targets, extents, uses: [...uses.values()], unknowns: columns.size - facts, equations }
}
