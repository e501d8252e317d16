import { bookUnits } from '@/lib/balance/measure/units-of-measure'
import type { Change } from './change'
import { checkMeasure } from './check-measure'
import { type BookRecord, type Kind, kindNames, kindOrder, placeId, references, schemas } from './kinds'
import { isMeasureQuantity } from './measures'
import type { BookState } from './state'

/** What is wrong with a record, where, and what to do. */
export type RecordProblem = { kind: Kind; id: string; field?: string; what: string }

const tagged: readonly Kind[] = ['component', 'stream', 'unit', 'reaction', 'parameter', 'rule']

/** What a record is called in a sentence: "stream 101". */
export function calledBy(record: BookRecord): string {
  if (record.kind === 'measure') return record.name === '' ? kindNames.measure : `${kindNames.measure} ${record.name}`
  if ('tag' in record) return `${kindNames[record.kind]} ${record.tag}`
  if ('name' in record) return `${kindNames[record.kind]} ${record.name}`
  return kindNames[record.kind]
}

/**
 * Checks the records that a change touched, and their neighbours, in the state after it. Empty: the change may stand.
 * Linear in the touched records, plus one pass over the kinds that point at something removed or carry tags.
 */
export function check(after: BookState, change: Change): RecordProblem[] {
  const problems: RecordProblem[] = []
  const touched = new Map<string, BookRecord>()
  const touch = (kind: Kind, id: string) => {
    const record = after[kind].get(id)
    if (record) touched.set(`${kind}:${id}`, record)
  }
  for (const record of change.create) touch(record.kind, record.id)
  for (const update of change.update) touch(update.kind, update.id)
  for (const record of touched.values()) checkRecord(after, record, problems)
  checkRemovals(after, change, problems)
  checkTags(after, [...touched.values()], problems)
  checkBook(after, change, problems)
  return problems
}

function checkRecord(after: BookState, record: BookRecord, problems: RecordProblem[]): void {
  const { kind, id } = record
  const parsed = schemas[kind].safeParse(record)
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      const field = issue.path.join('.')
      problems.push({ kind, id, field, what: `${calledBy(record)}: ${field} ${issue.message}` })
    }
    return
  }
  const place = placeId(record)
  if (place !== undefined && place !== id)
    problems.push({ kind, id, what: `${calledBy(record)}: its id does not fit its place` })
  for (const [field, target] of Object.entries(references[kind])) {
    const value = (record as unknown as Record<string, string | null>)[field]
    if (value != null && !after[target].has(value))
      problems.push({ kind, id, field, what: `${calledBy(record)}: the ${kindNames[target]} that it names is gone` })
  }
  if (record.kind === 'book' && !bookUnits(record.basis, record.flowUnit))
    problems.push({
      kind,
      id,
      field: 'flowUnit',
      what: `“${record.flowUnit}” is no ${record.basis} flow unit known here: ${record.basis === 'mass' ? 'kg/h, t/d or lb/h' : 'kmol/h, mol/s or lbmol/h'} would fit`,
    })
  if (record.kind === 'link') {
    const other = after.link.get(`${record.streamId}/${record.direction === 'in' ? 'out' : 'in'}`)
    if (other && other.unitId === record.unitId) {
      const stream = after.stream.get(record.streamId)?.tag ?? ''
      const unit = after.unit.get(record.unitId)?.tag ?? ''
      problems.push({ kind, id, what: `Stream ${stream} would leave ${unit} and enter it again: clear one end first` })
    }
  }
  if (record.kind === 'stream' && (record.fractions === 'difference') !== (record.differenceComponentId !== null))
    problems.push({ kind, id, field: 'fractions', what: `${calledBy(record)}: say which component is by difference` })
  if (record.kind === 'measure' || record.kind === 'measurePart') checkMeasure(after, record, problems)
  if (record.kind === 'given') {
    const ofRow = isMeasureQuantity(record.quantity)
    const measure = record.measureId == null ? undefined : after.measure.get(record.measureId)
    if (ofRow ? measure?.quantity !== record.quantity : record.measureId != null)
      problems.push({ kind, id, field: 'measureId', what: 'A given of a row is of the quantity of that row' })
    const wantsComponent = !ofRow && !['flow', 'massFlow', 'moleFlow', 'volumeFlow'].includes(record.quantity)
    if (wantsComponent !== (record.componentId !== null))
      problems.push({
        kind,
        id,
        field: 'componentId',
        what: 'A given of a fraction or component flow names a component',
      })
  }
}

function checkRemovals(after: BookState, change: Change, problems: RecordProblem[]): void {
  const removed = new Map<Kind, Set<string>>()
  for (const { kind, id } of change.remove) {
    if (kind === 'book') problems.push({ kind, id, what: 'A book is not removed by an edit: archive it in the list' })
    if (after[kind].has(id)) continue
    const ids = removed.get(kind) ?? new Set()
    removed.set(kind, ids.add(id))
  }
  if (removed.size === 0) return
  for (const kind of kindOrder) {
    const fields = Object.entries(references[kind]).filter(([, target]) => removed.has(target))
    if (fields.length === 0) continue
    for (const record of after[kind].values())
      for (const [field, target] of fields) {
        const value = (record as unknown as Record<string, string | null>)[field]
        if (value != null && removed.get(target)?.has(value))
          problems.push({
            kind,
            id: record.id,
            field,
            what: `${calledBy(record)} still uses a removed ${kindNames[target]}`,
          })
      }
  }
}

function checkTags(after: BookState, touched: BookRecord[], problems: RecordProblem[]): void {
  for (const kind of tagged) {
    const mine = touched.filter((record) => record.kind === kind)
    if (mine.length === 0) continue
    const count = new Map<string, number>()
    for (const record of after[kind].values() as Iterable<BookRecord & { tag: string }>)
      count.set(record.tag.trim(), (count.get(record.tag.trim()) ?? 0) + 1)
    for (const record of mine as (BookRecord & { tag: string })[])
      if ((count.get(record.tag.trim()) ?? 0) > 1)
        problems.push({
          kind,
          id: record.id,
          field: 'tag',
          what: `There is already a ${kindNames[kind]} ${record.tag}`,
        })
  }
}

function checkBook(after: BookState, change: Change, problems: RecordProblem[]): void {
  if (change.create.some((record) => record.kind === 'book'))
    problems.push({ kind: 'book', id: '', what: 'An edit cannot make a book' })
  const update = change.update.find((u) => u.kind === 'book' && ('basis' in u.fields || 'flowUnit' in u.fields))
  if (!update) return
  const bare = (quantity: string) => quantity.endsWith('low')
  const hasNumbers = after.given.size > 0 || after.inventory.size > 0 || after.rule.size > 0
  if ('basis' in update.fields && hasNumbers)
    problems.push({
      kind: 'book',
      id: update.id,
      field: 'basis',
      what: 'The basis of a book with givens, inventory changes or rules cannot change: start a new book in the other basis',
    })
  const leansOnUnit =
    [...after.given.values()].some((given) => given.unit === null && bare(given.quantity)) ||
    [...after.inventory.values()].some((inventory) => inventory.unit === null) ||
    [...after.rule.values()].some((rule) => rule.ruleKind === 'formula' || rule.ruleKind === 'extent')
  if ('flowUnit' in update.fields && leansOnUnit)
    problems.push({
      kind: 'book',
      id: update.id,
      field: 'flowUnit',
      what: 'Some numbers lean on the flow unit of the book (givens without a unit, formulas, extents): give them a unit first',
    })
}
