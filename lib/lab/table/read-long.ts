import { basisOf } from '../cells/basis'
import { parseSpread } from '../cells/cell'
import { plainSpaces } from '../cells/spaces'
import { readUnit } from '../cells/unit'
import { parseHead } from '../heads/head'
import { idRank, type Role, roleOf } from '../heads/roles'
import { isTotalColumn, isTotalRow } from '../heads/totals'
import type { LabResult } from '../model'
import { type Cell, type Frame, isBlank, rawOf, textOf } from './grid'
import { headScore } from './head-row'
import { type Context, type Ledger, readResult, type SampleDraft } from './ledger'
import { isProse } from './prose'
import { readTaken } from './taken'

type LongRole = Role | 'limit' | 'unknown'
type LongColumn = { column: number; role: LongRole; label: string; unit?: string; basis?: string }

/** What title lines say of the one sample of a table without a column of samples. */
export type Titled = { id?: string; stream?: string; taken?: string }

/** Reads a table with a result a row into `ledger`. */
export function readLong(frame: Frame, ledger: Ledger, titled: Titled, basis: string | undefined): void {
  const columns = longColumns(frame)
  const find = (role: LongRole) => columns.find((column) => column.role === role)
  const totals = new Map<string, LabResult[]>()
  const id = find('id')
  let last = ''
  for (let row = 1; row < frame.height; row++) {
    const text = (column: LongColumn | undefined) => (column ? plainSpaces(textOf(frame.at(row, column.column))) : '')
    const filled = columns.filter((column) => !isBlank(frame.at(row, column.column)))
    if (filled.length === 0) continue
    const analyte = text(find('analyte'))
    const cell = frame.at(row, (find('result') as LongColumn).column)
    const pass = () => {
      for (const column of filled) ledger.passedOver.push(frame.place(row, column.column))
    }
    const list = () => {
      for (const column of filled) ledger.notUnderstood.push(frame.place(row, column.column))
    }
    if (analyte === '' || (filled.length === 1 && isProse(analyte))) {
      if (filled.length === 1 || isProse(text(filled[0]))) pass()
      else list()
      continue
    }
    if (filled.length <= 2 && isBlank(cell) && isProse(text(filled[0]))) {
      pass()
      continue
    }
    const sample =
      text(id) ||
      (id ? last : '') ||
      (id ? '' : text(find('stream'))) ||
      titled.id ||
      (id ? '' : (titled.stream ?? '1'))
    if (sample === '') {
      list()
      continue
    }
    const context = contextOf(frame, ledger, row, columns, analyte, basis)
    const isSum = isTotalColumn(parseHead(analyte).name)
    if (isSum || isTotalRow(sample)) {
      const result = readResult(ledger, cell, { ...context, ...(isSum && { sample }), total: true })
      const label = isSum ? analyte : sample
      if (result) totals.set(label, [...(totals.get(label) ?? []), result])
      else ledger.notUnderstood.push(frame.place(row, (find('result') as LongColumn).column))
      continue
    }
    last = sample
    const draft = describe(frame, ledger, row, columns, sample, titled)
    const result = readResult(ledger, cell, context)
    if (result) draft.results.push(result)
    else {
      ledger.notUnderstood.push(frame.place(row, (find('result') as LongColumn).column))
      for (const column of filled)
        if (
          column.role === 'analyte' ||
          column.role === 'unit' ||
          column.role === 'basis' ||
          column.role === 'qualifier'
        )
          ledger.passedOver.push(frame.place(row, column.column))
    }
    ledger.drafts.push(draft)
  }
  for (const [label, results] of totals) ledger.totals.push({ label, results })
}

function contextOf(
  frame: Frame,
  ledger: Ledger,
  row: number,
  columns: LongColumn[],
  analyteText: string,
  stated: string | undefined,
): Context {
  const head = parseHead(analyteText)
  const result = columns.find((column) => column.role === 'result') as LongColumn
  const context: Context = {
    analyte: head.name,
    as: head.as,
    unit: head.unit ?? result.unit,
    basis: head.basis ?? result.basis,
  }
  for (const { column, role, unit } of columns) {
    const cell = frame.at(row, column)
    const text = plainSpaces(textOf(cell))
    if (text === '') continue
    if (role === 'qualifier') context.qualifier = text
    else if (role === 'basis') context.basis = basisOf(text) ?? context.basis
    else if (role === 'unit') readUnitCell(ledger, frame, row, column, text, context)
    else if (role === 'uncertainty') {
      context.uncertainty = parseSpread(text, unit)
      if (!context.uncertainty) ledger.notUnderstood.push(frame.place(row, column))
    } else if (role === 'limit') readLimitCell(ledger, cell, context, frame, row, column)
  }
  context.basis ??= stated
  return context
}

function readUnitCell(ledger: Ledger, frame: Frame, row: number, column: number, text: string, context: Context): void {
  const read = readUnit(text)
  if (read) {
    context.unit = read.unit ?? context.unit
    context.as = read.as ?? context.as
    context.basis ??= read.basis
  } else if (text.length <= 24 && /^[^\d]+$/.test(text)) {
    // A unit that is not known is kept as the table spells it.
    context.unit = text
  } else ledger.notUnderstood.push(frame.place(row, column))
}

/** A detection limit beside each result: kept with the totals, under its own head. */
function readLimitCell(ledger: Ledger, cell: Cell, context: Context, frame: Frame, row: number, column: number): void {
  const label = plainSpaces(textOf(frame.at(0, column)))
  const result = readResult(ledger, cell, { analyte: context.analyte, as: context.as, unit: context.unit, total: true })
  if (!result) {
    ledger.notUnderstood.push(frame.place(row, column))
    return
  }
  let total = ledger.totals.find((candidate) => candidate.label === label)
  if (!total) {
    total = { label, results: [] }
    ledger.totals.push(total)
  }
  total.results.push(result)
}

function describe(
  frame: Frame,
  ledger: Ledger,
  row: number,
  columns: LongColumn[],
  id: string,
  titled: Titled,
): SampleDraft {
  const draft: SampleDraft = { id, notes: [], methods: [], results: [] }
  if (titled.stream !== undefined) draft.stream = titled.stream
  for (const { column, role, label } of columns) {
    const cell = frame.at(row, column)
    const text = plainSpaces(textOf(cell))
    if (text === '') continue
    if (role === 'stream') draft.stream = text
    else if (role === 'note') draft.notes.push(rawOf(cell))
    else if (role === 'method') draft.methods.push(text)
    else if (role === 'about') draft.notes.push(`${label}: ${text}`)
    else if (role === 'unknown') ledger.notUnderstood.push(frame.place(row, column))
  }
  const date = columns.find((column) => column.role === 'date')
  const time = columns.find((column) => column.role === 'time')
  const [dateCell, timeCell] = [date ?? time, date ? time : undefined].map(
    (column) => column && frame.at(row, column.column),
  )
  if (!isBlank(dateCell) || !isBlank(timeCell)) {
    const taken = readTaken(ledger, (date ?? time)?.label ?? '', dateCell ?? '', timeCell ?? '')
    if (taken) draft.taken = taken
    else
      for (const column of [date, time])
        if (column && !isBlank(frame.at(row, column.column))) ledger.notUnderstood.push(frame.place(row, column.column))
  } else if (titled.taken !== undefined) draft.taken = readTaken(ledger, '', titled.taken, '')
  return draft
}

/** One column a role; a second of the same only describes. */
function longColumns(frame: Frame): LongColumn[] {
  const columns = Array.from({ length: frame.width }, (_, column): LongColumn => {
    const label = plainSpaces(textOf(frame.at(0, column)))
    const head = parseHead(label)
    const role: LongRole | undefined = roleOf(head.name) ?? (isTotalColumn(head.name) ? 'limit' : undefined)
    return { column, label, role: role ?? 'unknown', unit: head.unit, basis: head.basis }
  })
  const has = (role: LongRole) => columns.some((column) => column.role === role)
  if (!has('id')) first(columns, 'weakId', 'id')
  if (!has('stream')) first(columns, 'point', 'stream')
  if (!has('analyte')) {
    const names = columns.find(
      ({ role, column }) => role === 'unknown' && headScore(frame.at(1, column)) >= 1 && !isBlank(frame.at(1, column)),
    )
    if (names) names.role = 'analyte'
  }
  if (has('id')) {
    const best = columns
      .filter((column) => column.role === 'id')
      .reduce((left, right) => (idRank(right.label) < idRank(left.label) ? right : left))
    for (const column of columns) if (column.role === 'id' && column !== best) column.role = 'about'
  }
  const seen = new Set<LongRole>()
  for (const column of columns) {
    const once = !['note', 'method', 'about', 'unknown', 'limit'].includes(column.role)
    if (once && seen.has(column.role)) column.role = 'about'
    if (column.role === 'weakId' || column.role === 'point' || column.role === 'replicate') column.role = 'about'
    seen.add(column.role)
  }
  return columns
}

function first(columns: LongColumn[], from: LongRole, to: LongRole): void {
  const column = columns.find((candidate) => candidate.role === from)
  if (column) column.role = to
}
