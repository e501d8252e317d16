import { Tracer } from '../conflicts/circuit'
import type { Settled } from '../conflicts/find-conflicts'
import type { BookRows, RuleRow } from './book-rows'
import { Combinations, type Found, fill, found } from './derive'
import { isKnownStream, type Known, type Target } from './known'
import { type Region, rowsOf } from './region'
import type { Span } from './span'

/** Cells whose row combination is looked for before it is said that none reaches any. */
const MOST_TRIES = 400

/**
 * A step for cells that no small boundary reaches: the units that take part in the combination of rows which gives one
 * of them, each with its own balances. Of the cells found, those are kept that the fewest units give.
 */
export function reach(book: BookRows, known: Known, settled: Settled, span: Span): Found | undefined {
  const { model } = book
  const tracer = new Tracer(model, settled.assembly, settled.resolved)
  const { elimination } = settled.resolved.knowledge
  let tries = 0
  for (const target of candidates(book, known)) {
    if (++tries > MOST_TRIES) return undefined
    const circuit = tracer.ofForm(elimination, target.form)
    if (!circuit) continue
    const units = new Set<number>()
    for (const number of circuit.structure) {
      const source = settled.assembly.rows.sources[number]
      if (source?.type === 'balance') units.add(source.unit)
    }
    const step = solveApart(
      book,
      known,
      [...units].sort((a, b) => a - b),
      target,
      span,
    )
    if (step) return step
  }
  return undefined
}

/** Cells still to be found, those first whose units have the fewest streams that are not known. */
function candidates({ model, units }: BookRows, known: Known): Target[] {
  const open = units.map(({ streams }) => streams.filter((s) => !isKnownStream(model, known, s)).length)
  const rank = known.targets.map(() => Number.POSITIVE_INFINITY)
  units.forEach(({ streams }, u) => {
    for (const s of streams) rank[s] = Math.min(rank[s] as number, open[u] as number)
  })
  return known.targets
    .map((targets, s) => ({ targets, by: rank[s] as number }))
    .filter(({ targets }) => targets.length > 0)
    .sort((a, b) => a.by - b.by)
    .flatMap(({ targets }) => targets)
}

function solveApart(book: BookRows, known: Known, all: number[], target: Target, span: Span): Found | undefined {
  const { model } = book
  const units = all.filter((u) => (book.units[u]?.streams ?? []).some((s) => !isKnownStream(model, known, s)))
  const streams = new Set(units.flatMap((u) => book.units[u]?.streams ?? []))
  streams.add(target.cell.stream)
  // Rules may tie in streams that no balance of these units touches.
  for (let changed = true; changed; ) {
    changed = false
    for (const { streams: its } of [...book.rules, ...book.groups])
      if (its.some((s) => streams.has(s)) && its.some((s) => !streams.has(s) && !isKnownStream(model, known, s)))
        for (const s of its)
          if (!streams.has(s)) {
            streams.add(s)
            changed = true
          }
    if (units.length > 0) break
  }
  const list = [...streams].sort((a, b) => a - b)
  const inside = new Set(units)
  const rules = book.rules.filter(
    (row: RuleRow) =>
      row.streams.every((s) => streams.has(s) || isKnownStream(model, known, s)) &&
      row.reactions.every((r) => inside.has(model.reactions[r]?.unit as number)),
  )
  const region: Region = {
    kind: 'units',
    units,
    streams: list,
    reactions: units.flatMap((u) => (model.plant[u]?.byElements ? [] : (model.plant[u]?.reactions ?? []))),
    rules,
    groups: book.groups.filter(({ streams: its }) => its.every((s) => streams.has(s))),
    apart: true,
    dirty: false,
  }
  const rows = fill(known, region, rowsOf(book, known, region), span)
  const targets = list.flatMap((s) => known.targets[s] as Target[])
  const extents = region.reactions.filter((r) => known.extents.has(r))
  const unitIndex = new Map(units.map((u) => [model.plant[u]?.id as string, u]))
  const unitsOfRow = rows.map(({ uses }) =>
    uses.flatMap(({ equation, id }) => {
      if (equation !== 'balance' && equation !== 'total') return []
      return id === undefined ? units : [unitIndex.get(id) as number]
    }),
  )
  const combinations = new Combinations(known, span)
  const lists = [
    ...targets.map(({ form }) => combinations.of(form.columns, form.coefficients)),
    ...extents.map((r) => combinations.of([model.extentColumn[r] as number], [1])),
  ]
  // Lists are shared by many cells: their units are gathered once.
  const unitsOfList = new Map<readonly number[], Set<number>>()
  const gather = (list: readonly number[]): Set<number> => {
    const before = unitsOfList.get(list)
    if (before) return before
    const its = new Set(list.flatMap((i) => unitsOfRow[i] as number[]))
    unitsOfList.set(list, its)
    return its
  }
  const needs = lists.map((its) => its && unionOf(its.map(gather)))
  const smallest = needs.reduce((best, its) => (its && (!best || its.size < best.size) ? its : best), undefined)
  if (!smallest) return undefined
  const within = needs.map((its) => its !== undefined && [...its].every((u) => smallest.has(u)))
  const kept = new Set(lists.flatMap((its, k) => (within[k] ? (its as (readonly number[])[]) : [])))
  const used = new Set([...kept].flat())
  const boundary = [...smallest].sort((a, b) => a - b)
  return found(
    known,
    boundary.length > 0 ? 'units' : 'rule',
    boundary,
    {
      targets: targets.filter((_, k) => within[k]),
      extents: extents.filter((_, k) => within[targets.length + k]),
    },
    rows,
    used,
  )
}

function unionOf(sets: readonly Set<number>[]): Set<number> {
  const union = new Set<number>()
  for (const set of new Set(sets)) for (const u of set) union.add(u)
  return union
}
