import type { Given, Problem, Rule, Value } from '@/lib/balance/problem'
import { plainDecimal, shiftDecimal } from './decimal-text'
import { absenceId, coefficientId, givenId, linkId, ruleStreamId } from './ids'
import type { BookRecord, RecordOf } from './kinds'
import { rowRecords } from './measure-records'

type Ids = ReadonlyMap<string, string>

/**
 * A book with one operating case, "Base case", from a problem file that has passed its checks. Nothing is lost:
 * `toProblem` of the result gives the problem back, fractions without a unit now in %. Book record first.
 */
export function fromProblem(problem: Problem, makeId: () => string): BookRecord[] {
  const records: BookRecord[] = []
  const idsFor = (list: readonly { id: string }[]): Ids => new Map(list.map(({ id }) => [id, makeId()]))
  const ids = {
    component: idsFor(problem.components),
    stream: idsFor(problem.streams),
    unit: idsFor(problem.units),
    reaction: idsFor(problem.reactions ?? []),
    parameter: idsFor(problem.parameters ?? []),
  }
  const of = (map: Ids, tag: string): string => {
    const id = map.get(tag)
    if (id === undefined) throw new Error(`The problem names ${tag}, which it does not hold: it was not checked`)
    return id
  }
  const { basis, flowUnit } = problem
  const book: RecordOf<'book'> = {
    kind: 'book',
    id: makeId(),
    name: problem.name.trim().slice(0, 200) || 'Untitled book',
    description: '',
    documentNumber: '',
    basis,
    flowUnit,
  }
  const baseCase: RecordOf<'case'> = { kind: 'case', id: makeId(), name: 'Base case', position: 1 }
  records.push(book, baseCase)
  for (const [index, component] of problem.components.entries())
    records.push({
      kind: 'component',
      id: of(ids.component, component.id),
      tag: component.id,
      name: component.name ?? '',
      formula: component.formula ?? null,
      molarMass: component.molarMass ?? null,
      position: index + 1,
    })
  for (const [index, stream] of problem.streams.entries()) {
    const id = of(ids.stream, stream.id)
    const difference = typeof stream.fractions === 'object' ? stream.fractions.difference : undefined
    records.push({
      kind: 'stream',
      id,
      tag: stream.id,
      name: stream.name ?? '',
      phase: null,
      density: stream.density ?? null,
      temperature: null,
      pressure: null,
      fractions: typeof stream.fractions === 'object' ? 'difference' : (stream.fractions ?? 'asTyped'),
      differenceComponentId: difference === undefined ? null : of(ids.component, difference),
      cannotMeasure: null,
      note: stream.note ?? null,
      position: index + 1,
    })
    if (!stream.components) continue
    const present = new Set(stream.components)
    for (const component of problem.components) {
      if (present.has(component.id)) continue
      const componentId = of(ids.component, component.id)
      records.push({ kind: 'absence', id: absenceId(id, componentId), streamId: id, componentId })
    }
  }
  for (const [index, unit] of problem.units.entries()) {
    const id = of(ids.unit, unit.id)
    records.push({
      kind: 'unit',
      id,
      tag: unit.id,
      name: unit.name ?? '',
      unitKind: unit.kind,
      balance: unit.balance ?? 'components',
      note: null,
      position: index + 1,
    })
    for (const entry of unit.inventory ?? [])
      records.push({
        kind: 'inventory',
        id: makeId(),
        unitId: id,
        componentId: entry.component === undefined ? null : of(ids.component, entry.component),
        value: entry.value,
        unit: entry.unit ?? flowUnit,
        note: null,
      })
    const links = Object.hasOwn(problem.links, unit.id) ? problem.links[unit.id] : undefined
    for (const [tag, direction] of Object.entries(links ?? {})) {
      const streamId = of(ids.stream, tag)
      records.push({ kind: 'link', id: linkId(streamId, direction), streamId, direction, unitId: id })
    }
  }
  for (const [index, reaction] of (problem.reactions ?? []).entries()) {
    const id = of(ids.reaction, reaction.id)
    const unitId = of(ids.unit, reaction.unit)
    const position = index + 1
    records.push({ kind: 'reaction', id, tag: reaction.id, name: reaction.name ?? '', unitId, position })
    for (const [tag, value] of Object.entries(reaction.stoichiometry)) {
      const componentId = of(ids.component, tag)
      records.push({ kind: 'coefficient', id: coefficientId(id, componentId), reactionId: id, componentId, value })
    }
  }
  for (const [index, parameter] of (problem.parameters ?? []).entries())
    records.push({
      kind: 'parameter',
      id: of(ids.parameter, parameter.id),
      tag: parameter.id,
      value: parameter.value ?? null,
      note: null,
      position: index + 1,
    })
  const rows = rowRecords(problem, makeId, (tag) => of(ids.component, tag))
  records.push(...rows.records)
  for (const given of problem.givens ?? []) {
    const streamId = of(ids.stream, given.stream)
    const measureId = rows.idOf(given)
    const componentId = given.component === undefined || measureId !== null ? null : of(ids.component, given.component)
    const instrument = given.instrument ?? 'main'
    records.push({
      kind: 'given',
      id: givenId(baseCase.id, streamId, given.quantity, componentId ?? measureId, instrument),
      caseId: baseCase.id,
      streamId,
      quantity: given.quantity,
      componentId,
      measureId,
      instrument,
      ...typedAs(given, problem),
      use: given.use ?? 'given',
      sourceKind: given.kind ?? null,
      source: given.source ?? null,
      note: given.note ?? null,
    })
  }
  for (const [index, rule] of (problem.relations ?? []).entries())
    records.push(...ruleRecords(rule, index + 1, makeId(), ids, of))
  return records
}

/** How a person would have typed it, with its unit said: the book's flow unit for a flow in its basis, % for a fraction. */
function typedAs(
  given: Given,
  { basis, flowUnit }: Problem,
): Pick<RecordOf<'given'>, 'text' | 'value' | 'unit' | 'halfWidth' | 'sigma'> {
  const fraction = given.quantity.endsWith('Fraction')
  const inPercent = fraction && (given.unit === undefined || given.unit === '1')
  const scaled = (value: number): number => (inPercent ? shiftDecimal(value, 2) : value)
  const inBookBasis =
    given.quantity === 'flow' ||
    given.quantity === 'componentFlow' ||
    given.quantity === `${basis}Flow` ||
    given.quantity === (basis === 'mass' ? 'componentMassFlow' : 'componentMoleFlow')
  const unit = inPercent ? '%' : (given.unit ?? (inBookBasis ? flowUnit : null))
  const value = scaled(given.value)
  return {
    text: unit === null ? plainDecimal(value) : `${plainDecimal(value)} ${unit}`,
    value,
    unit,
    halfWidth: given.halfWidth === undefined ? null : scaled(given.halfWidth),
    sigma: given.sigma === undefined ? null : scaled(given.sigma),
  }
}

function ruleRecords(
  rule: Rule,
  position: number,
  id: string,
  ids: Record<'component' | 'stream' | 'unit' | 'reaction' | 'parameter', Ids>,
  of: (map: Ids, tag: string) => string,
): BookRecord[] {
  const value: Value | undefined = 'value' in rule ? rule.value : undefined
  const record: RecordOf<'rule'> = {
    kind: 'rule',
    id,
    tag: rule.id,
    ruleKind: rule.kind,
    use: rule.use ?? 'given',
    unitId: 'unit' in rule ? of(ids.unit, rule.unit) : null,
    streamId: 'stream' in rule ? of(ids.stream, rule.stream) : null,
    componentId: null,
    otherStreamId: null,
    otherComponentId: null,
    reactionId: 'reaction' in rule ? of(ids.reaction, rule.reaction) : null,
    value: typeof value === 'number' ? value : null,
    parameterId: typeof value === 'object' ? of(ids.parameter, value.parameter) : null,
    text: rule.kind === 'formula' ? rule.text : null,
    halfWidth: rule.halfWidth ?? null,
    note: rule.note ?? null,
    position,
  }
  if ('component' in rule) record.componentId = of(ids.component, rule.component)
  if ('product' in rule) record.componentId = of(ids.component, rule.product)
  switch (rule.kind) {
    case 'flowRatio':
      record.otherStreamId = of(ids.stream, rule.of)
      break
    case 'componentRatio':
      record.otherStreamId = of(ids.stream, rule.of.stream)
      record.otherComponentId = of(ids.component, rule.of.component)
      break
    case 'yield':
      record.otherComponentId = of(ids.component, rule.from)
      break
    case 'selectivity':
      record.otherComponentId = of(ids.component, rule.over)
      break
    case 'excess':
      record.otherComponentId = of(ids.component, rule.limiting)
      break
    case 'sameComposition':
      return [
        record,
        ...rule.streams.map((tag): BookRecord => {
          const streamId = of(ids.stream, tag)
          return { kind: 'ruleStream', id: ruleStreamId(id, streamId), ruleId: id, streamId }
        }),
      ]
  }
  return [record]
}
