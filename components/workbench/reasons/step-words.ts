import type { GridPlace } from '@/hooks/grid-model'
import type { Find, Step } from '@/lib/balance/workings/step'
import { listed } from '@/lib/book/edits/draft'
import { type BookView, rowOfPlace, titleOfRow } from '../book-view'
import { type Explained, modelOf, placeOf, shownAt, unitOf } from './explained'

const counted = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

/** Where a step looks: "Boundary round T-101 and E-102", "Stream 101", "Rule Q1". */
export function stepTitle({ kind, boundary, stream, uses }: Step): string {
  if (kind === 'stream') return `Stream ${stream} alone`
  if (kind === 'simultaneous') return 'Worked out together'
  if (kind === 'units') return boundary.length === 1 ? `Round ${boundary[0]}` : `Boundary round ${listed(boundary, 12)}`
  const use = uses.find(({ equation }) => equation === 'rule' || equation === 'composition')
  return use?.equation === 'composition' ? `One composition, ${use.id}` : `Rule ${use?.id ?? ''}`
}

/** Why it can be worked: what crosses, and unknowns against equations, in sentences. */
export function stepWhy(explained: Explained, step: Step): string {
  const { kind, unknowns, equations } = step
  const crossing = crossingOf(explained, step)
  const lead =
    kind === 'units'
      ? `Draw ${step.boundary.length === 1 ? 'a boundary' : 'one boundary'} round ${listed(step.boundary, 12)}. ${counted(crossing.length, 'stream')} ${crossing.length === 1 ? 'crosses' : 'cross'} it: ${listed(crossing, 20)}. `
      : kind === 'simultaneous'
        ? 'These equations are not linear in what is unknown, so they are solved together. '
        : ''
  if (unknowns === 0 && equations === 0) return `${lead}Nothing but typed values and earlier results is needed.`
  const balance = `${counted(unknowns, 'value')} ${unknowns === 1 ? 'is' : 'are'} unknown in the equations used, and there ${equations === 1 ? 'is' : 'are'} ${counted(equations, 'equation')}${kinds(step)}.`
  if (unknowns <= equations) return `${lead}${balance}`
  return `${lead}${balance} What stays unknown cancels or comes in one combination, so that the results below still follow.`
}

function kinds({ uses }: Step): string {
  const count = (...names: string[]): number => uses.filter(({ equation }) => names.includes(equation)).length
  const parts = [
    count('balance') && counted(count('balance'), 'component balance'),
    count('total') && (count('total') === 1 ? 'the total balance' : `${count('total')} total balances`),
    count('sum') && counted(count('sum'), 'sum'),
    count('rule') && counted(count('rule'), 'line of rules', 'lines of rules'),
    count('composition') && 'equal compositions',
  ].filter((part): part is string => typeof part === 'string')
  return parts.length === 0 ? '' : `: ${listed(parts, 6)}`
}

/** Streams that a step's boundary cuts, by tag; of a stream or a rule, those that it names. */
export function crossingOf({ problem, explanation }: Explained, step: Step): string[] {
  if (step.kind === 'stream') return step.stream === undefined ? [] : [step.stream]
  if (step.kind === 'units') {
    const key = step.boundary.join('\n')
    const found = explanation.boundaries.find(({ units }) => units.join('\n') === key)
    if (found) return found.crossing
    const model = modelOf(problem)
    const ends = new Map<number, number>()
    for (const id of step.boundary) {
      const unit = model?.plant[model.unitIndex.get(id) ?? -1]
      for (const s of [...(unit?.inlets ?? []), ...(unit?.outlets ?? [])]) ends.set(s, (ends.get(s) ?? 0) + 1)
    }
    return problem.streams.flatMap(({ id }, s) => (ends.get(s) === 1 ? [id] : []))
  }
  const named = new Set([...step.uses, ...step.finds].flatMap(({ stream }) => stream ?? []))
  return problem.streams.flatMap(({ id }) => (named.has(id) ? [id] : []))
}

/** Results of a step in one row of the table: "107", "Mass fraction", "wt %", and each value. */
export type FindGroup = {
  key: string
  where: string
  what: string
  unit: string
  values: { key: string; name: string | null; text: string; place: GridPlace | null }[]
}

/** The results of a step as the rows of the table print them, stream by stream. */
export function stepFinds(view: BookView, { problem }: Explained, { finds }: Step): FindGroup[] {
  const groups = new Map<string, FindGroup>()
  for (const find of finds) {
    const { where, what, unit, text, place } = wordsOf(view, problem.basis, find)
    const key = `${where} ${what}`
    const group = groups.get(key) ?? { key, where, what, unit, values: [] }
    groups.set(key, group)
    group.values.push({ key: `${key} ${find.component ?? ''}`, name: find.component ?? null, text, place })
  }
  // Results on the other basis only restate those before them.
  const rank = (group: FindGroup): number => (group.where !== '' && isOtherBasis(problem.basis, group.what) ? 1 : 0)
  const streams = [...new Set([...groups.values()].map(({ where }) => where))]
  return [...groups.values()].sort((a, b) => streams.indexOf(a.where) - streams.indexOf(b.where) || rank(a) - rank(b))
}

const isOtherBasis = (basis: string, what: string): boolean =>
  new RegExp(basis === 'mass' ? 'mole' : 'mass', 'i').test(what)

function wordsOf(view: BookView, basis: string, { stream, quantity, component, reaction, value }: Find) {
  const nothing = { where: '', what: 'Result', unit: '', text: String(value), place: null }
  if (reaction !== undefined)
    return {
      ...nothing,
      where: reaction,
      what: 'Extent of reaction',
      unit: view.units?.mole.symbol ?? '',
      text: shownAt(view, { quantity: 'flow', componentId: null, measureId: null }, value),
    }
  if (stream === undefined || quantity === undefined) return nothing
  const name = { stream, quantity, ...(component === undefined ? {} : { component }) }
  const row = rowOfPlace(view, name)
  if (!row) return { ...nothing, where: stream, what: basis }
  return {
    where: stream,
    what: titleOfRow(view, row),
    unit: unitOf(view, row),
    text: shownAt(view, row, value),
    place: placeOf(view, name),
  }
}
