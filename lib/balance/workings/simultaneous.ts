import type { Pending } from '../pending/pending'
import type { BookRows } from './book-rows'
import type { Found } from './derive'
import type { Known } from './known'
import type { Use } from './step'

/**
 * The block that is not linear, as one step that says so: the cells still to be found at the units that the open
 * equations touch (or, after those, all that is left), with every equation of these units.
 */
export function openBlock(book: BookRows, known: Known, left: readonly Pending[]): Found | undefined {
  const { model } = book
  const waiting = known.targets.flatMap((targets, s) => (targets.length > 0 ? [s] : []))
  const extents = [...known.extents].sort((a, b) => a - b)
  if (waiting.length === 0 && extents.length === 0) return undefined
  const touched = new Set(left.flatMap((item) => streamsOf(book, item)))
  const unitsAt = (streams: ReadonlySet<number>): number[] =>
    book.units.flatMap(({ streams: its }, u) => (its.some((s) => streams.has(s)) ? [u] : []))
  const near = unitsAt(touched)
  const nearStreams = new Set(near.flatMap((u) => book.units[u]?.streams ?? []))
  const inBlock = waiting.filter((s) => nearStreams.has(s) || touched.has(s))
  const streams = inBlock.length > 0 ? inBlock : waiting
  const units = inBlock.length > 0 ? near : unitsAt(new Set(waiting))
  const inside = new Set(units)
  const all = new Set([...streams, ...units.flatMap((u) => book.units[u]?.streams ?? [])])
  const uses: Use[] = []
  for (const u of units) {
    const unit = book.units[u] as BookRows['units'][number]
    const id = units.length > 1 ? { id: model.plant[u]?.id as string } : {}
    for (const row of [...unit.component.values(), ...unit.element.values(), ...(unit.total ? [unit.total] : [])])
      for (const use of row.uses) uses.push({ ...use, ...id })
  }
  for (const s of all) for (const row of [...(book.sums[s] ?? []), ...(book.givens[s] ?? [])]) uses.push(...row.uses)
  for (const rule of book.rules) if (rule.streams.some((s) => all.has(s))) uses.push(...rule.uses)
  for (const { id, streams: its, components } of book.groups)
    if (its.some((s) => all.has(s)))
      for (const s of its)
        for (const c of components)
          uses.push({
            equation: 'composition',
            id,
            stream: model.problem.streams[s]?.id as string,
            component: model.problem.components[c]?.id as string,
          })
  const targets = streams.flatMap((s) => known.targets[s] as Found['targets'])
  return {
    kind: 'simultaneous',
    units,
    targets,
    extents: extents.filter((r) => inBlock.length === 0 || inside.has(model.reactions[r]?.unit as number)),
    uses,
    unknowns: new Set(targets.flatMap(({ form }) => form.columns.filter((j) => !known.column[j]))).size,
    equations: uses.filter(({ equation }) => equation !== 'given').length,
  }
}

function streamsOf({ streamOf }: BookRows, item: Pending): number[] {
  if (item.kind === 'composition') return [...item.composition.streams, ...item.composition.mixed]
  if (item.kind !== 'scaled') return []
  const { numerator, denominator } = item.measure
  return [...numerator.columns, ...(denominator?.columns ?? [])].map((j) => streamOf[j] as number).filter((s) => s >= 0)
}
