import type { Direction, Given, Problem, Reaction, Stream, Unit } from '@/lib/balance/problem'
import type { BookRecord, RecordOf } from './kinds'
import { leaveOutRefused } from './leave-out'
import { measureName } from './measures'
import type { BookProblem, Draft, DraftList, LeftOut } from './problem-draft'
import { ruleOf } from './rule-to-problem'
import { type BookState, bookOf, inOrder } from './state'

const blank = (text: string | null): boolean => text === null || text.trim() === ''

/**
 * One operating case of a book as the solver's problem, in book order; ids are tags. What is unfinished or cannot be
 * used is left out and listed, never a failure: a reaction left out takes its unit's balances along, since they would be wrong.
 */
export function toProblem(state: BookState, caseId: string): BookProblem {
  const book = bookOf(state)
  const streams = inOrder(state.stream)
  const components = inOrder(state.component)
  const leftOut: LeftOut[] = []
  const tagOf = (record: { tag: string }): string => record.tag.trim()
  const draft: Draft = {
    problem: {
      format: 'tallybrook/1',
      name: nameOf(state, caseId),
      basis: book.basis,
      flowUnit: book.flowUnit,
      components: components.map((component) => ({
        id: tagOf(component),
        ...(component.name && { name: component.name }),
        ...(!blank(component.formula) && { formula: component.formula as string }),
        ...(component.molarMass !== null && { molarMass: component.molarMass }),
      })),
      streams: streamsOf(state, streams, components),
      units: [],
      links: {},
      reactions: [],
      parameters: [],
      givens: [],
      relations: [],
    },
    from: {
      components: components.map(({ id }) => id),
      streams: streams.map(({ id }) => id),
      units: [],
      reactions: [],
      parameters: [],
      givens: [],
      relations: [],
    },
  }
  const put = <L extends DraftList>(list: L, record: BookRecord, entry: (typeof draft.problem)[L][number]): void => {
    ;(draft.problem[list] as (typeof entry)[]).push(entry)
    draft.from[list].push(record.id)
  }
  for (const unit of inOrder(state.unit)) put('units', unit, unitOf(state, unit))
  draft.problem.links = linksOf(state)
  for (const reaction of inOrder(state.reaction)) put('reactions', reaction, reactionOf(state, reaction))
  for (const parameter of inOrder(state.parameter))
    put('parameters', parameter, {
      id: tagOf(parameter),
      ...(parameter.value !== null && { value: parameter.value }),
    })
  for (const given of givensInOrder(state, caseId)) {
    const entry = givenOf(state, given)
    if (typeof entry === 'string') leftOut.push({ id: given.id, kind: 'given', what: entry })
    else put('givens', given, entry)
  }
  for (const rule of inOrder(state.rule)) {
    const entry = ruleOf(state, rule)
    if (typeof entry === 'string') leftOut.push({ id: rule.id, kind: 'rule', what: entry })
    else put('relations', rule, entry)
  }
  leaveOutRefused(state, draft, leftOut)
  const { problem, from } = draft
  return { problem, streams: from.streams, components: from.components, leftOut, ...wantedOf(state, streams) }
}

/** The rows that people added and, where a density says what it is, volume flow. */
function wantedOf(state: BookState, streams: RecordOf<'stream'>[]): Pick<BookProblem, 'wanted' | 'rows'> {
  const found: Pick<BookProblem, 'wanted' | 'rows'> = { wanted: [], rows: [] }
  if (streams.some(({ density }) => density !== null)) {
    found.wanted.push({ quantity: 'volumeFlow' })
    found.rows.push('volumeFlow')
  }
  for (const measure of inOrder(state.measure)) {
    const name = measureName(state, measure)
    if (typeof name === 'string') continue
    found.wanted.push(name)
    found.rows.push(measure.id)
  }
  return found
}

function nameOf(state: BookState, caseId: string): string {
  const { name } = bookOf(state)
  const operatingCase = state.case.get(caseId)
  return state.case.size > 1 && operatingCase ? `${name}: ${operatingCase.name}` : name
}

function streamsOf(state: BookState, streams: RecordOf<'stream'>[], components: RecordOf<'component'>[]): Stream[] {
  const absent = new Map<string, Set<string>>()
  for (const { streamId, componentId } of state.absence.values()) {
    const set = absent.get(streamId)
    if (set) set.add(componentId)
    else absent.set(streamId, new Set([componentId]))
  }
  return streams.map((stream) => {
    const missing = absent.get(stream.id)
    const difference =
      stream.fractions === 'difference'
        ? state.component.get(stream.differenceComponentId ?? '')?.tag.trim()
        : undefined
    return {
      id: stream.tag.trim(),
      ...(stream.name && { name: stream.name }),
      ...(missing && { components: components.filter(({ id }) => !missing.has(id)).map(({ tag }) => tag.trim()) }),
      ...(stream.density !== null && { density: stream.density }),
      ...(stream.fractions === 'scale' && { fractions: 'scale' as const }),
      ...(difference !== undefined && { fractions: { difference } }),
      ...(stream.note !== null && { note: stream.note }),
    }
  })
}

function unitOf(state: BookState, unit: RecordOf<'unit'>): Unit {
  const inventory = [...state.inventory.values()]
    .filter(({ unitId }) => unitId === unit.id)
    .map((entry) => ({
      ...(entry.componentId !== null && { component: state.component.get(entry.componentId)?.tag.trim() ?? '' }),
      value: entry.value,
      ...(entry.unit !== null && { unit: entry.unit }),
    }))
  return {
    id: unit.tag.trim(),
    ...(unit.name && { name: unit.name }),
    kind: unit.unitKind,
    ...(unit.balance === 'elements' && { balance: 'elements' as const }),
    ...(inventory.length > 0 && { inventory }),
  }
}

function linksOf(state: BookState): Problem['links'] {
  const ofUnit = new Map<string, [string, Direction][]>()
  for (const { id } of inOrder(state.unit)) ofUnit.set(id, [])
  const position = (streamId: string): number => state.stream.get(streamId)?.position ?? 0
  const links = [...state.link.values()].sort((a, b) => position(a.streamId) - position(b.streamId))
  for (const link of links) {
    const stream = state.stream.get(link.streamId)
    if (stream) ofUnit.get(link.unitId)?.push([stream.tag.trim(), link.direction])
  }
  const entries: [string, Record<string, Direction>][] = []
  for (const [unitId, ends] of ofUnit)
    if (ends.length > 0) entries.push([state.unit.get(unitId)?.tag.trim() ?? '', Object.fromEntries(ends)])
  return Object.fromEntries(entries)
}

function reactionOf(state: BookState, reaction: RecordOf<'reaction'>): Reaction {
  const entries: [string, number, number][] = []
  for (const coefficient of state.coefficient.values()) {
    const component = state.component.get(coefficient.componentId)
    if (coefficient.reactionId === reaction.id && component && coefficient.value !== 0)
      entries.push([component.tag.trim(), coefficient.value, component.position])
  }
  entries.sort((a, b) => a[2] - b[2])
  return {
    id: reaction.tag.trim(),
    unit: state.unit.get(reaction.unitId)?.tag.trim() ?? '',
    ...(reaction.name && { name: reaction.name }),
    stoichiometry: Object.fromEntries(entries),
  }
}

/** By stream, component, quantity and instrument, so that the order of typing shows nowhere. */
function givensInOrder(state: BookState, caseId: string): RecordOf<'given'>[] {
  const streamAt = new Map(inOrder(state.stream).map(({ id }, index) => [id, index]))
  const componentAt = new Map(
    [...inOrder(state.component), ...inOrder(state.measure)].map(({ id }, index) => [id, index]),
  )
  const components = componentAt.size + 1
  const keyed: [number, RecordOf<'given'>][] = []
  for (const given of state.given.values())
    if (given.caseId === caseId)
      keyed.push([
        (streamAt.get(given.streamId) ?? 0) * components +
          (componentAt.get(given.componentId ?? given.measureId ?? '') ?? -1) +
          1,
        given,
      ])
  keyed.sort(([a, one], [b, other]) => a - b || (one.id < other.id ? -1 : 1))
  return keyed.map(([, given]) => given)
}

function givenOf(state: BookState, given: RecordOf<'given'>): Given | string {
  const stream = state.stream.get(given.streamId)
  const component = given.componentId === null ? undefined : state.component.get(given.componentId)
  if (!stream || (given.componentId !== null && !component)) return 'What this value belongs to is gone: clear it.'
  const measure = given.measureId == null ? undefined : state.measure.get(given.measureId)
  const name = measure && measureName(state, measure)
  if (typeof name === 'string') return name
  if (given.value === null) return `“${given.text}” could not be read as a number: type it again or clear the cell.`
  if (component && given.value !== 0 && state.absence.has(`${stream.id}/${component.id}`))
    return `${component.tag} cannot be in stream ${stream.tag}: clear the value, or let the component be present.`
  return {
    stream: stream.tag.trim(),
    quantity: given.quantity,
    ...(component && { component: component.tag.trim() }),
    ...name,
    value: given.value,
    ...(given.unit !== null && { unit: given.unit }),
    ...(given.halfWidth !== null && { halfWidth: given.halfWidth }),
    ...(given.sigma !== null && { sigma: given.sigma }),
    ...(given.use !== 'given' && { use: given.use }),
    ...(given.instrument !== 'main' && { instrument: given.instrument }),
    ...(given.sourceKind !== null && { kind: given.sourceKind }),
    ...(given.source !== null && { source: given.source }),
    ...(given.note !== null && { note: given.note }),
  }
}
