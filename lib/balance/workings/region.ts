import type { Model, UnitModel } from '../model'
import type { BookRows, CompositionGroup, Row, RuleRow } from './book-rows'
import { isKnownStream, type Known, origins } from './known'
import type { Use } from './step'

/** What is looked at in one go: streams, the units whose common balance is used, and the rules among the streams. */
export type Region = {
  kind: 'stream' | 'rule' | 'units'
  /** Units inside, ascending; none for a stream or a rule. */
  units: number[]
  streams: number[]
  reactions: number[]
  rules: RuleRow[]
  groups: CompositionGroup[]
  /** Balances of each unit apart, streams inside taken in: where no common balance reaches. */
  apart?: boolean
  dirty: boolean
}

/** A row of a region with known columns taken out; `fixed` are those, for naming the typed values that went in. */
export type RegionRow = Row & { fixed: number[]; kind: 'fact' | 'own' | 'equation'; streams?: readonly number[] }

/** Rows of a region in the order in which they are preferred: facts, rules, sums, then balances from the shortest. */
export function rowsOf(book: BookRows, known: Known, region: Region): RegionRow[] {
  const { model } = book
  const list: RegionRow[] = []
  const put = (row: Row, kind: RegionRow['kind'], to = list): void => {
    const open: number[] = []
    const values: number[] = []
    const fixed: number[] = []
    for (let k = 0; k < row.columns.length; k++) {
      const j = row.columns[k] as number
      if (known.column[j]) fixed.push(j)
      else {
        open.push(j)
        values.push(row.values[k] as number)
      }
    }
    if (open.length > 0) to.push({ columns: open, values, uses: row.uses, fixed, kind })
  }
  for (const s of region.streams) {
    if (isKnownStream(model, known, s)) continue
    for (const row of book.givens[s] as Row[]) put(row, 'fact')
    for (const row of known.ratios[s] as Row[]) put(row, 'fact')
  }
  for (const group of region.groups) for (const row of compositionRows(book, known, group)) put(row, 'equation')
  for (const row of region.rules) if (!row.restsOn) put(row, 'equation')
  for (const s of region.streams)
    if (!isKnownStream(model, known, s)) for (const row of book.sums[s] as Row[]) put(row, 'own')
  const balances: RegionRow[] = []
  if (region.apart)
    for (const u of region.units) {
      const own: RegionRow[] = []
      for (const row of balancesOf(book, [u])) put(named(row, region, model, u), 'equation', own)
      balances.push(...inOrder(own))
    }
  else {
    for (const row of balancesOf(book, region.units)) put(row, 'equation', balances)
    list.push(...inOrder(balances))
    return list
  }
  list.push(...balances)
  return list
}

/** A unit's own balance inside a larger boundary carries the unit's id. */
function named(row: Row, region: Region, model: Model, unit: number): Row {
  if (region.units.length === 1) return row
  return { ...row, uses: row.uses.map((use) => ({ ...use, id: (model.plant[unit] as UnitModel).id })) }
}

/** Shortest first; the total before the longest component where it is no longer than that: one of them follows. */
function inOrder(rows: RegionRow[]): RegionRow[] {
  const rank = (row: RegionRow): number => row.columns.length - (row.uses[0]?.equation === 'total' ? 0.5 : 0)
  return rows
    .map((row) => ({ row, by: rank(row) }))
    .sort((a, b) => a.by - b.by)
    .map(({ row }) => row)
}

/** Balances round several units together: rows of the units added up, what runs between them cancelled. */
export function balancesOf(book: BookRows, units: readonly number[]): Row[] {
  if (units.length === 0) return []
  const plant = units.map((u) => book.units[u] as BookRows['units'][number])
  const closed = new Set<number>()
  const open = new Set<number>()
  for (const unit of plant) {
    for (const c of unit.component.keys()) closed.add(c)
    for (const c of unit.open) open.add(c)
  }
  const rows: Row[] = []
  const add = (parts: (Row | undefined)[], use: Use, factors?: number[]): void => {
    const row = units.length === 1 && !factors ? parts[0] : sumOf(parts, factors)
    if (row && row.columns.length > 0) rows.push({ columns: row.columns, values: row.values, uses: [use] })
  }
  for (const c of [...closed].sort((a, b) => a - b))
    if (!open.has(c))
      add(
        plant.map((unit) => unit.component.get(c)),
        { equation: 'balance', component: book.model.problem.components[c]?.id as string },
      )
  if (plant.some((unit) => unit.element.size > 0)) pushElements(book, plant, rows)
  if (plant.every(({ total }) => total))
    add(
      plant.map(({ total }) => total),
      { equation: 'total' },
    )
  return rows
}

/** Element balances round units of which some are balanced by elements: component balances count with their atoms. */
function pushElements({ model }: BookRows, plant: BookRows['units'][number][], rows: Row[]): void {
  const molesOf = (c: number): number =>
    model.problem.basis === 'mole' ? 1 : model.units.molesPerMass / (model.molarMass[c] as number)
  const elements = [...new Set(plant.flatMap(({ element }) => [...element.keys()]))].sort()
  for (const element of elements) {
    const parts: Row[] = []
    const factors: number[] = []
    let whole = true
    for (const unit of plant) {
      const own = unit.element.get(element)
      if (own) {
        parts.push(own)
        factors.push(1)
        continue
      }
      if (unit.element.size > 0) continue
      for (const [c, row] of unit.component) {
        if (!model.atoms[c]) whole = false
        const atoms = (model.atoms[c]?.[element] ?? 0) * molesOf(c)
        if (atoms === 0) continue
        parts.push(row)
        factors.push(atoms)
      }
      if (unit.component.size === 0) whole = false
    }
    const row = whole ? sumOf(parts, factors) : undefined
    if (row && row.columns.length > 0) rows.push({ ...row, uses: [{ equation: 'balance', element }] })
  }
}

/** Entries that cancel to this part of their terms are gone. */
const CANCELS = 1e-12

function sumOf(parts: readonly (Row | undefined)[], factors?: readonly number[]): Row {
  const at = new Map<number, { value: number; terms: number }>()
  parts.forEach((row, p) => {
    if (!row) return
    const factor = factors?.[p] ?? 1
    for (let k = 0; k < row.columns.length; k++) {
      const part = factor * (row.values[k] as number)
      const entry = at.get(row.columns[k] as number)
      if (!entry) at.set(row.columns[k] as number, { value: part, terms: Math.abs(part) })
      else {
        entry.value += part
        entry.terms += Math.abs(part)
      }
    }
  })
  const row: Row = { columns: [], values: [], uses: [] }
  for (const [column, { value, terms }] of at) {
    if (Math.abs(value) <= CANCELS * terms) continue
    row.columns.push(column)
    row.values.push(value)
  }
  return row
}

/** Equal compositions as linear rows: where a fraction is known, and where the ratio of two flows is. */
function compositionRows(book: BookRows, known: Known, { id, streams, components }: CompositionGroup): Row[] {
  const { model } = book
  const rows: Row[] = []
  const flowOf = (s: number, c: number): number => model.flowColumn[s * model.nComponents + c] as number
  const totalOf = (s: number): number => model.totalColumn[s] as number
  const use = (s: number, c: number): Use => ({
    equation: 'composition',
    id,
    stream: model.problem.streams[s]?.id as string,
    component: model.problem.components[c]?.id as string,
  })
  for (const c of components) {
    const from = streams.flatMap((s) => {
      const fraction = knownFraction(book, known, s, flowOf(s, c), totalOf(s))
      return fraction === undefined ? [] : [{ s, ...fraction }]
    })[0]
    if (!from) continue
    for (const s of streams)
      if (s !== from.s)
        rows.push({
          columns: [flowOf(s, c), totalOf(s)],
          values: [1, -from.value],
          uses: [use(s, c), use(from.s, c), ...from.uses],
        })
  }
  const [first] = streams as [number, ...number[]]
  for (const s of streams)
    for (const other of s === first ? [] : [first]) {
      const ratio = knownRatio(book, known, s, other, components)
      if (!ratio) continue
      for (const c of components)
        if (c !== ratio.by)
          rows.push({
            columns: [flowOf(s, c), flowOf(other, c)],
            values: [1, -ratio.value],
            uses: [
              use(s, c),
              use(other, c),
              ...(ratio.by === undefined ? [] : [use(s, ratio.by), use(other, ratio.by)]),
              ...ratio.uses,
            ],
          })
    }
  return rows
}

/** A fraction that a typed value, an earlier find or two known flows give. */
function knownFraction(
  { givens }: BookRows,
  known: Known,
  stream: number,
  column: number,
  total: number,
): { value: number; uses: Use[] } | undefined {
  if (column === total) return undefined
  if (known.column[column] && known.column[total]) {
    const [n, flow] = [known.value[column] as number, known.value[total] as number]
    return flow === 0 ? undefined : { value: n / flow, uses: origins(known, [column, total]) }
  }
  if (known.column[column] && known.value[column] === 0 && !known.isZero[total])
    return { value: 0, uses: origins(known, [column]) }
  for (const rows of [givens[stream] as Row[], known.ratios[stream] as Row[]])
    for (const { columns, values, uses } of rows) {
      if (columns.length !== 2) continue
      const a = columns.indexOf(column)
      const b = columns.indexOf(total)
      if (a >= 0 && b >= 0) return { value: -(values[b] as number) / (values[a] as number), uses }
    }
  return undefined
}

/** The ratio of two streams where both totals, or both flows of one component, are known. */
function knownRatio(
  { model }: BookRows,
  known: Known,
  a: number,
  b: number,
  components: readonly number[],
): { value: number; by?: number; uses: Use[] } | undefined {
  const pairs: [number, number, number?][] = [
    [model.totalColumn[a] as number, model.totalColumn[b] as number],
    ...components.map((c): [number, number, number] => [
      model.flowColumn[a * model.nComponents + c] as number,
      model.flowColumn[b * model.nComponents + c] as number,
      c,
    ]),
  ]
  for (const [up, down, by] of pairs) {
    if (!known.column[up] || !known.column[down]) continue
    const [n, under] = [known.value[up] as number, known.value[down] as number]
    if (n === 0 || under === 0) continue
    return { value: n / under, ...(by !== undefined && { by }), uses: origins(known, [up, down]) }
  }
  return undefined
}
