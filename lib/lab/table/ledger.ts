import { type ParsedCell, parseCell, settleCell } from '../cells/cell'
import { orderOf, type WrittenDate } from '../cells/date'
import { certainNumber, evidenceOf, type WrittenNumber } from '../cells/number'
import type { DateOrder, DecimalSign, LabPlace, LabResult } from '../model'
import type { Cell, Separator } from './grid'
import { rawOf } from './grid'

/** A sample as one row (or column) of a table gives it, before it is joined with others. */
export type SampleDraft = {
  id: string
  stream?: string
  taken?: { head: string; raw: string; date?: WrittenDate; iso?: string }
  notes: string[]
  methods: string[]
  results: LabResult[]
}

/** What has been seen of one analyte in one table: for the questions of basis and unit. */
export type AnalyteFacts = { units: Set<string>; bases: Set<string>; measured: boolean; clashing?: string[] }

/** What one table has given so far; results that hang on the decimal sign wait in `pending`. */
export type Ledger = {
  separator: Separator | undefined
  drafts: SampleDraft[]
  totals: { label: string; results: LabResult[] }[]
  notUnderstood: LabPlace[]
  passedOver: LabPlace[]
  pending: { result: LabResult; cell: ParsedCell }[]
  decimalEvidence: Record<DecimalSign, Set<string>>
  dateEvidence: Set<DateOrder>
  analytes: Map<string, AnalyteFacts>
}

export function newLedger(separator: Separator | undefined): Ledger {
  return {
    separator,
    drafts: [],
    totals: [],
    notUnderstood: [],
    passedOver: [],
    pending: [],
    decimalEvidence: { point: new Set(), comma: new Set() },
    dateEvidence: new Set(),
    analytes: new Map(),
  }
}

/** What the table says of a result from outside its cell. */
export type Context = {
  analyte: string
  as?: string
  unit?: string
  basis?: string
  sample?: string
  /** A sum, mean or limit: it opens no question of unit or basis. */
  total?: true
  /** Cells of the neighbouring columns: a sign such as "<", an uncertainty. */
  qualifier?: string
  uncertainty?: { number: WrittenNumber; relative: boolean }
}

/** Reads a cell of results into `ledger`; undefined where it has no sensible reading. */
export function readResult(ledger: Ledger, cell: Cell, context: Context): LabResult | undefined {
  const qualified = withQualifier(cell, context.qualifier)
  if (!qualified) return undefined
  const { raw, flag } = qualified
  let parsed = qualified.parsed
  if (context.uncertainty && parsed.kind === 'value' && !parsed.uncertainty)
    parsed = { ...parsed, uncertainty: context.uncertainty }
  if (flag !== undefined && parsed.flag === undefined) parsed = { ...parsed, flag }
  const unit = parsed.unit ?? context.unit
  const basis = parsed.basis ?? context.basis
  const as = parsed.as ?? context.as
  const settled = settleCell(parsed, null)
  const result: LabResult = {
    analyte: context.analyte,
    ...(as !== undefined && { as }),
    ...(context.sample !== undefined && { sample: context.sample }),
    raw,
    ...settled,
    ...(unit !== undefined && { unit }),
    ...(basis !== undefined && { basis }),
  }
  if (settled.kind === 'unclear') ledger.pending.push({ result, cell: parsed })
  gatherEvidence(ledger, parsed, context.analyte)
  if (!context.total) gatherFacts(ledger, result, parsed)
  return result
}

function withQualifier(
  cell: Cell,
  qualifier: string | undefined,
): { parsed: ParsedCell; raw: string; flag?: string } | undefined {
  const raw = rawOf(cell)
  const parsed = parseAny(cell)
  if (qualifier === undefined || qualifier === '' || qualifier === '=') return parsed && { parsed, raw }
  const joined = `${qualifier}${raw}`
  if (/^(?:[<>≤≥~≈]|<=|>=|ca\.?)$/.test(qualifier)) {
    const read = raw === '' ? undefined : parseCell(joined)
    return read && { parsed: typed(cell, read), raw: joined }
  }
  const word = parseCell(qualifier)
  if (word && word.number === undefined && word.kind !== 'blank') {
    if (!parsed?.number) return { parsed: word, raw: raw === '' ? qualifier : `${qualifier} ${raw}` }
    if (word.kind === 'notAnalysed') return parsed && { parsed, raw, flag: qualifier }
    return { parsed: { ...parsed, kind: word.kind }, raw: `${qualifier} ${raw}` }
  }
  if (/^UJ?$/.test(qualifier) && parsed?.number) return { parsed: { ...parsed, kind: 'below' }, raw, flag: qualifier }
  return parsed && { parsed, raw, flag: qualifier }
}

const typed = (cell: Cell, read: ParsedCell): ParsedCell =>
  typeof cell !== 'string' && cell.number !== undefined ? { ...read, number: certainNumber(cell.number) } : read

/** Any cell, typed or text. A true date is no result. */
export function parseAny(cell: Cell): ParsedCell | undefined {
  if (typeof cell === 'string') return parseCell(cell)
  if (cell.number !== undefined)
    return { kind: 'value', number: certainNumber(cell.number), ...(cell.percent && { unit: '%' }) }
  return undefined
}

function gatherEvidence(ledger: Ledger, cell: ParsedCell, analyte: string): void {
  for (const number of [cell.number, cell.uncertainty?.number]) {
    const sign = number && evidenceOf(number)
    if (sign) ledger.decimalEvidence[sign].add(analyte)
  }
}

function gatherFacts(ledger: Ledger, result: LabResult, cell: ParsedCell): void {
  let facts = ledger.analytes.get(result.analyte)
  if (!facts) {
    facts = { units: new Set(), bases: new Set(), measured: false }
    ledger.analytes.set(result.analyte, facts)
  }
  if (!cell.number) return
  facts.measured = true
  facts.units.add(result.unit ?? '')
  facts.bases.add(result.basis ?? '')
}

export function noteDate(ledger: Ledger, date: WrittenDate): void {
  const order = orderOf(date)
  if (order) ledger.dateEvidence.add(order)
}
