import { decideDates } from './answers/decide-dates'
import { decideDecimal } from './answers/decide-decimal'
import { fileSample, newSampleFile } from './answers/file-samples'
import { openQuestions } from './answers/questions'
import { tieReplicates } from './answers/replicates'
import { readStreamsFromIds } from './answers/streams-from-ids'
import { limits } from './limits'
import type { LabAnswer, LabOptions, LabPlace, LabQuestion, LabReading } from './model'
import { findTables } from './table/find-tables'
import { frameOf, type Grid, isBlank, placeIn } from './table/grid'
import { type Ledger, newLedger } from './table/ledger'
import { readLong } from './table/read-long'
import { readWide } from './table/read-wide'
import { shapeOf } from './table/shape'
import { readTitles } from './table/titles'

/**
 * Reads every table of some grids (one of a text, one a sheet of a workbook) as lab results.
 * @param listed filled cells already set aside: hidden rows and sheets, formulas without a result.
 * @returns problems where no grid holds a table of heads and results.
 */
export function readGrids(grids: Grid[], options: LabOptions = {}, listed: LabPlace[] = []): LabAnswer {
  const file = newSampleFile()
  const reading: LabReading = {
    format: 'tallybrook-lab/1',
    shape: 'wide',
    decimal: 'point',
    samples: file.samples,
    totals: [],
    questions: [],
    notUnderstood: [],
    passedOver: [],
  }
  let tables = 0
  let decided = false
  for (const grid of grids) {
    const found = findTables(grid)
    for (const row of found.passedOver)
      for (const [column, cell] of (grid.rows[row] ?? []).entries())
        if (!isBlank(cell)) {
          const isMissing = typeof cell !== 'string' && cell.missing
          reading[isMissing ? 'notUnderstood' : 'passedOver'].push(placeIn(grid, row, column))
        }
    for (const table of found.tables) {
      const ledger = newLedger(grid.separator)
      const shape = shapeOf(table)
      const { basis, titled } = readTitles(grid, table.titles)
      const frame = frameOf(table.grid, [table.head, ...table.rows], table.columns, shape === 'transposed')
      for (let column = 0; column < frame.width; column++)
        if (!isBlank(frame.at(0, column))) ledger.passedOver.push(frame.place(0, column))
      if (shape === 'long') readLong(frame, ledger, titled, basis)
      else readWide(frame, ledger, shape === 'transposed', basis)
      if (ledger.drafts.length === 0 && ledger.totals.length === 0) {
        reading.passedOver.push(...ledger.passedOver, ...ledger.notUnderstood)
        continue
      }
      if (tables++ === 0) reading.shape = shape
      const { decimal, shown, question } = decideDecimal(ledger, options.decimal)
      if (shown && !decided) {
        reading.decimal = decimal
        decided = true
      }
      if (question) ask(reading.questions, question)
      settle(reading, ledger, options, (draft, takenAt) => fileSample(file, draft, takenAt))
    }
  }
  if (options.decimal && !decided) reading.decimal = options.decimal
  if (file.samples.length === 0)
    return {
      ok: false,
      problems: ['No table was found: heads with results of at least one sample below or beside them.'],
    }
  if (file.samples.length > limits.rows)
    return { ok: false, problems: [`The table has more than ${limits.rows.toLocaleString('en')} rows. Split it.`] }
  readStreamsFromIds(file.samples)
  tieReplicates(file.samples)
  reading.notUnderstood = [...reading.notUnderstood, ...listed]
  return { ok: true, reading }
}

function settle(
  reading: LabReading,
  ledger: Ledger,
  options: LabOptions,
  file: (draft: Ledger['drafts'][number], takenAt: string | undefined) => void,
): void {
  const { takenAt, question } = decideDates(ledger, options.dates)
  if (question) ask(reading.questions, question)
  for (const open of openQuestions(ledger)) ask(reading.questions, open)
  for (const draft of ledger.drafts) file(draft, takenAt(draft))
  for (const total of ledger.totals) reading.totals.push(total)
  for (const place of ledger.notUnderstood) reading.notUnderstood.push(place)
  for (const place of ledger.passedOver) reading.passedOver.push(place)
}

/** The same question of several tables is asked once. */
function ask(questions: LabQuestion[], question: LabQuestion): void {
  const same = questions.find(
    ({ code, options }) => code === question.code && options.join() === question.options.join(),
  )
  if (!same) questions.push(question)
  else for (const place of question.where) if (!same.where.includes(place)) same.where.push(place)
}
