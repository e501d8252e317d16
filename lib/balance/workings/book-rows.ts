import type { Settled } from '../conflicts/find-conflicts'
import type { LinearForm } from '../measure/measure'
import { nameOf } from '../measure/measure-name'
import { ColumnKind, type Model } from '../model'
import { compositionOf } from '../pending/composition'
import { isBalanced } from '../rows/balances'
import type { RowStore } from '../rows/row-store'
import type { Use } from './step'

/** A linear row over global columns, and what it is called where a step uses it. */
export type Row = { columns: number[]; values: number[]; uses: Use[] }

/** A row of rules, or one that has turned linear and rests on forms known first. */
export type RuleRow = Row & { streams: number[]; reactions: number[]; restsOn?: LinearForm[]; isZero: boolean }

/** Streams that must have one composition: a splitter's outlets (and its only inlet), or what a rule names. */
export type CompositionGroup = { id: string; unit: number; streams: number[]; components: number[] }

export type UnitRows = {
  component: Map<number, Row>
  element: Map<string, Row>
  total: Row | undefined
  /** Components at the unit that have no balance of their own there. */
  open: Set<number>
  streams: number[]
}

/** The rows of a settled book sorted by what a person would call them. */
export type BookRows = {
  model: Model
  /** Stream of a column, -1 for extents and parameters; length nColumns. */
  streamOf: Int32Array
  /** Reaction of an extent's column, else -1. */
  reactionOf: Int32Array
  /** By stream: totals as sums, then typed values. */
  sums: Row[][]
  givens: Row[][]
  rules: RuleRow[]
  /** The same by the first stream of each, -1 for those without one. */
  rulesByStream: Map<number, RuleRow[]>
  groups: CompositionGroup[]
  units: UnitRows[]
  isBalanced: boolean[]
}

export function sortRows(model: Model, { assembly, resolved }: Settled): BookRows {
  const { rows } = assembly
  const streamOf = new Int32Array(model.nColumns).fill(-1)
  const reactionOf = new Int32Array(model.nColumns).fill(-1)
  for (let s = 0; s < model.nStreams; s++) {
    for (const c of model.present[s] as number[]) streamOf[model.flowColumn[s * model.nComponents + c] as number] = s
    for (const column of [model.totalColumn[s] as number, model.otherTotalColumn[s] as number])
      if (column >= 0) streamOf[column] = s
  }
  model.extentColumn.forEach((column, r) => {
    reactionOf[column] = r
  })
  const lists = (): Row[][] => Array.from({ length: model.nStreams }, () => [])
  const book: BookRows = {
    model,
    streamOf,
    reactionOf,
    sums: lists(),
    givens: lists(),
    rules: [],
    rulesByStream: new Map(),
    groups: compositionGroups(model, assembly),
    units: model.plant.map((unit) => ({
      component: new Map(),
      element: new Map(),
      total: undefined,
      open: new Set(),
      streams: [...unit.inlets, ...unit.outlets],
    })),
    isBalanced: model.plant.map((_, u) => isBalanced(model, u)),
  }
  for (let i = 0; i < rows.count; i++) {
    const columns = rows.column.slice(rows.start[i], rows.start[i + 1])
    const values = rows.value.slice(rows.start[i], rows.start[i + 1])
    const source = rows.sources[rows.source[i] as number] as RowStore['sources'][number]
    const stream = streamOf[columns[0] ?? 0] as number
    const row = (...uses: Use[]): Row => ({ columns, values, uses })
    switch (source.type) {
      case 'definition': {
        const other = columns.includes(model.otherTotalColumn[source.stream] as number)
        const quantity = other ? (model.problem.basis === 'mass' ? 'moleFlow' : 'massFlow') : undefined
        const id = model.problem.streams[source.stream]?.id as string
        book.sums[source.stream]?.push(row({ equation: 'sum', stream: id, ...(quantity && { quantity }) }))
        break
      }
      case 'given': {
        const given = model.problem.givens?.[source.index]
        if (!given || columns.length === 0) break
        const use: Use = { equation: 'given', stream: given.stream, ...nameOf(given) }
        book.givens[stream]?.push(row(use))
        break
      }
      case 'balance': {
        const unit = book.units[source.unit] as UnitRows
        if (source.component !== undefined) {
          const component = model.problem.components[source.component]?.id as string
          unit.component.set(source.component, row({ equation: 'balance', component }))
        } else if (source.element !== undefined)
          unit.element.set(source.element, row({ equation: 'balance', element: source.element }))
        else unit.total = row({ equation: 'total' })
        break
      }
      default:
        book.rules.push(ruleRow(book, source, row(), resolved.restsOn.get(i)))
    }
  }
  for (const rule of book.rules) {
    const first = rule.streams[0] ?? -1
    const list = book.rulesByStream.get(first)
    if (list) list.push(rule)
    else book.rulesByStream.set(first, [rule])
  }
  book.units.forEach((unit, u) => {
    const reacting = (model.plant[u]?.reactions ?? []).flatMap((r) => model.reactions[r]?.components ?? [])
    const there = new Set([...unit.streams.flatMap((s) => model.present[s] as number[]), ...reacting])
    for (const c of there) if (!unit.component.has(c)) unit.open.add(c)
  })
  return book
}

function ruleRow(
  { model, streamOf, reactionOf }: BookRows,
  source: RowStore['sources'][number],
  row: Row,
  restsOn: LinearForm[] | undefined,
): RuleRow {
  const streamsIn = (columns: readonly number[]): number[] =>
    columns.map((j) => streamOf[j] as number).filter((s) => s >= 0)
  const rule = source.type === 'rule' ? model.problem.relations?.[source.index] : undefined
  const named = (s: number): string => model.problem.streams[s]?.id as string
  const componentOf = (column: number): string | undefined => {
    const at = model.flowColumn.indexOf(column)
    return at < 0 ? undefined : (model.problem.components[at % model.nComponents]?.id as string)
  }
  const first = row.columns.find((j) => model.columnKind[j] === ColumnKind.componentFlow)
  const component = first === undefined ? undefined : componentOf(first)
  const touched = [...row.columns, ...(restsOn ?? []).flatMap(({ columns }) => columns)]
  const streams = [...new Set(streamsIn(touched))].sort((a, b) => a - b)
  let uses: Use[] = []
  if (source.type === 'composition' || rule?.kind === 'sameComposition') {
    const id = source.type === 'composition' ? source.unit : (rule?.id as string)
    const components = new Set(row.columns.map(componentOf).filter((c) => c !== undefined))
    uses = streams.flatMap((s) =>
      [...components].map((c): Use => ({ equation: 'composition', id, stream: named(s), component: c })),
    )
  } else if (rule)
    uses = [{ equation: 'rule', id: rule.id, ...(rule.kind === 'split' && component !== undefined && { component }) }]
  const reactions = row.columns.map((j) => reactionOf[j] as number).filter((r) => r >= 0)
  return { ...row, uses, streams, reactions, ...(restsOn && { restsOn }), isZero: source.type === 'zero' }
}

function compositionGroups(model: Model, { rows }: Settled['assembly']): CompositionGroup[] {
  const groups: CompositionGroup[] = []
  for (const source of rows.sources) {
    let id = ''
    let unit = -1
    let streams: number[] = []
    if (source.type === 'composition') {
      id = source.unit
      unit = model.unitIndex.get(id) as number
      const { inlets, outlets, reactions, byElements } = model.plant[unit] as Model['plant'][number]
      const holds = reactions.length > 0 || byElements || model.problem.units[unit]?.inventory?.length
      const here = (s: number): string => `${model.present[s]}`
      const asOne = !holds && inlets.length === 1 && outlets.every((s) => here(s) === here(inlets[0] as number))
      streams = asOne ? [...inlets, ...outlets] : outlets
    } else if (source.type === 'rule') {
      const rule = model.problem.relations?.[source.index]
      if (rule?.kind !== 'sameComposition') continue
      id = rule.id
      streams = [...new Set(rule.streams.map((s) => model.streamIndex.get(s) as number))]
    } else continue
    const filled = streams.filter((s) => (model.present[s] as number[]).length > 0)
    if (filled.length < 2) continue
    const { components } = compositionOf(model, filled)
    if (components.length > 1) groups.push({ id, unit, streams: filled, components })
  }
  return groups
}
