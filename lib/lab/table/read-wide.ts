import { basisOf } from '../cells/basis'
import { parseSpread } from '../cells/cell'
import { plainSpaces } from '../cells/spaces'
import { readUnit } from '../cells/unit'
import { isTotalRow } from '../heads/totals'
import type { LabResult } from '../model'
import { type Column, type Layout, layoutOf } from './columns'
import { type Frame, isBlank, rawOf, textOf } from './grid'
import { type Context, type Ledger, parseAny, readResult, type SampleDraft } from './ledger'
import { buildOf, isProse } from './prose'
import { readTaken } from './taken'

/**
 * Reads a table with a sample a row into `ledger`; a table with a sample a column is read turned.
 * @param basis what a title line states for the whole table.
 */
export function readWide(frame: Frame, ledger: Ledger, turned: boolean, basis: string | undefined): void {
  const layout = layoutOf(frame, ledger, turned)
  const sums = new Map<Column, LabResult[]>()
  const builds = idBuilds(frame, layout)
  for (let row = 1; row < frame.height; row++) {
    if (layout.subHeads.has(row)) {
      for (let column = 0; column < frame.width; column++)
        if (!isBlank(frame.at(row, column))) ledger.passedOver.push(frame.place(row, column))
      continue
    }
    readRow({ frame, ledger, layout, row, basis, builds, sums })
  }
  for (const [column, results] of sums)
    if (results.length > 0) ledger.totals.push({ label: plainSpaces(column.label), results })
}

type RowTask = {
  frame: Frame
  ledger: Ledger
  layout: Layout
  row: number
  basis: string | undefined
  builds: Set<string>
  sums: Map<Column, LabResult[]>
}

function readRow(task: RowTask): void {
  const { frame, ledger, layout, row } = task
  const filled = layout.columns.filter((column) => !isBlank(frame.at(row, column.column)))
  if (filled.length === 0) return
  const label = layout.columns.find((column) => column.use === 'id') as Column
  let id = plainSpaces(textOf(frame.at(row, label.column)))
  const total = totalLabel(task, id)
  if (total !== undefined) {
    readTotalRow(task, total)
    return
  }
  const first = plainSpaces(textOf(frame.at(row, (filled[0] as Column).column)))
  const results = filled.filter((column) => column.use === 'result' || column.use === 'total')
  const measured = results.some((column) => parseAny(frame.at(row, column.column)) !== undefined)
  const isFoot = measured ? /:$/.test(id) : isProse(first) || (filled.length === 1 && !task.builds.has(buildOf(id)))
  if (isFoot) {
    for (const column of filled) ledger.passedOver.push(frame.place(row, column.column))
    return
  }
  if (id === '') {
    const instead = layout.columns.find((column) => column.use === 'stream' || column.use === 'date')
    id = instead ? plainSpaces(textOf(frame.at(row, instead.column))) : ''
  }
  if (id === '') {
    for (const column of filled) ledger.notUnderstood.push(frame.place(row, column.column))
    return
  }
  ledger.drafts.push(readSample(task, id))
}

function readSample(task: RowTask, id: string): SampleDraft {
  const { frame, ledger, layout, row } = task
  const draft: SampleDraft = { id, notes: [], methods: [], results: [] }
  const basis = rowBasis(task) ?? task.basis
  for (const column of layout.columns) {
    const cell = frame.at(row, column.column)
    const text = plainSpaces(textOf(cell))
    if (column.use === 'result') {
      const result = readResult(ledger, cell, contextOf(task, column, basis))
      if (result) draft.results.push(result)
      else ledger.notUnderstood.push(frame.place(row, column.column))
      if (column.method && !draft.methods.includes(column.method)) draft.methods.push(column.method)
    } else if (text === '') continue
    else if (column.use === 'total') readTotalCell(task, column, id, basis)
    else if (column.use === 'stream') draft.stream = text
    else if (column.use === 'note') draft.notes.push(rawOf(cell))
    else if (column.use === 'method') draft.methods.push(text)
    else if (column.use === 'about') draft.notes.push(`${plainSpaces(column.label)}: ${text}`)
    else if (column.use === 'text') ledger.notUnderstood.push(frame.place(row, column.column))
  }
  if (layout.columns.some((column) => column.use === 'id' && /^(?:stream|streams|strom)\b/i.test(column.name)))
    draft.stream ??= id
  const own = layout.columns.find((column) => column.use === 'basis')
  if (own && draft.results.length === 0 && !isBlank(frame.at(row, own.column)))
    draft.notes.push(`${plainSpaces(own.label)}: ${rawOf(frame.at(row, own.column))}`)
  readSampleTime(task, draft)
  return draft
}

function readSampleTime(task: RowTask, draft: SampleDraft): void {
  const { frame, ledger, layout, row } = task
  const isTime = (use: string) => layout.columns.find((column) => column.use === use)
  const [date, time] = [isTime('date') ?? isTime('time'), isTime('date') ? isTime('time') : undefined]
  if (!date) return
  const cell = frame.at(row, date.column)
  const clock = time ? frame.at(row, time.column) : ''
  if (isBlank(cell) && isBlank(clock)) return
  const taken = readTaken(ledger, plainSpaces(date.label), cell, clock)
  if (taken) draft.taken = taken
  else
    for (const column of [date, time])
      if (column && !isBlank(frame.at(row, column.column))) ledger.notUnderstood.push(frame.place(row, column.column))
}

function rowBasis({ frame, layout, row }: RowTask): string | undefined {
  const column = layout.columns.find((candidate) => candidate.use === 'basis')
  return column && basisOf(textOf(frame.at(row, column.column)))
}

/** What stands round a result: its head, and the columns of signs, units and uncertainties that go with it. */
function contextOf({ frame, ledger, row }: RowTask, column: Column, basis: string | undefined): Context {
  const context: Context = { analyte: column.name, as: column.as, unit: column.unit, basis: column.basis ?? basis }
  if (column.spread !== undefined) context.uncertainty = parseSpread(column.spread, undefined)
  for (const beside of column.beside) {
    const cell = frame.at(row, beside.column)
    const text = plainSpaces(textOf(cell))
    if (text === '') continue
    if (beside.use === 'qualifier') context.qualifier = text
    else if (beside.use === 'unit') {
      const read = readUnit(text)
      if (read) Object.assign(context, read)
      else ledger.notUnderstood.push(frame.place(row, beside.column))
    } else {
      context.uncertainty = parseSpread(text, beside.unit)
      if (!context.uncertainty) ledger.notUnderstood.push(frame.place(row, beside.column))
    }
  }
  return context
}

/** The label of a row of totals: its id, or without one any of its words. */
function totalLabel({ frame, layout, row }: RowTask, id: string): string | undefined {
  if (id !== '') return isTotalRow(id) ? id : undefined
  for (const column of layout.columns) {
    const text = plainSpaces(textOf(frame.at(row, column.column)))
    if (text !== '' && column.use !== 'result' && isTotalRow(text)) return text
    if (text !== '') continue
  }
  return undefined
}

function readTotalRow(task: RowTask, label: string): void {
  const { frame, ledger, layout, row } = task
  const results: LabResult[] = []
  for (const column of layout.columns) {
    const cell = frame.at(row, column.column)
    if (isBlank(cell) || plainSpaces(textOf(cell)) === label) continue
    const isResult = column.use === 'result' || column.use === 'total'
    const result = isResult
      ? readResult(ledger, cell, { ...contextOf(task, column, task.basis), total: true })
      : undefined
    if (result) results.push(result)
    else if (column.of === undefined) ledger.notUnderstood.push(frame.place(row, column.column))
  }
  ledger.totals.push({ label, results })
}

function readTotalCell(task: RowTask, column: Column, id: string, basis: string | undefined): void {
  const { frame, ledger, row, sums } = task
  const context = { ...contextOf(task, column, basis), sample: id, total: true as const }
  const result = readResult(ledger, frame.at(row, column.column), context)
  if (!result) {
    ledger.notUnderstood.push(frame.place(row, column.column))
    return
  }
  const results = sums.get(column) ?? []
  results.push(result)
  sums.set(column, results)
}

/** How the ids of rows with results are built: a row of an id alone is a sample where it is built alike. */
function idBuilds(frame: Frame, layout: Layout): Set<string> {
  const builds = new Set<string>()
  const label = layout.columns.find((column) => column.use === 'id') as Column
  for (let row = 1; row < Math.min(frame.height, 2000); row++) {
    const id = plainSpaces(textOf(frame.at(row, label.column)))
    if (id === '' || layout.subHeads.has(row) || isProse(id)) continue
    const others = layout.columns.some((column) => column !== label && !isBlank(frame.at(row, column.column)))
    if (others) builds.add(buildOf(id))
  }
  return builds
}
