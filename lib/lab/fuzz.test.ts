import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type LabReading, type LabResult, readLabText } from '@/lib/lab'
import { readingOf, tableOf } from './reading.fixture'

/** Cells that laboratories write, and some that nobody should. */
const cell = fc.oneof(
  fc.constantFrom(
    '1.5',
    '12,5',
    '1,234',
    '1.234',
    '<0.01',
    '> 5',
    'n.d.',
    'trace',
    '-',
    '',
    'by diff.',
    '5.2 ± 0.1',
    '12 mg/L',
  ),
  fc.constantFrom(
    'see note',
    'Mean',
    'Sample',
    'mg/L',
    'wt%',
    '12.5*',
    '14.03.2026',
    '03/04/2026',
    'Unit',
    'Na (mg/L)',
    '#N/A',
    '~5',
  ),
  fc.float({ noNaN: true }).map(String),
  fc.string({ maxLength: 8 }).map((text) => text.replace(/[\t\n\r"]/g, ' ')),
)
const head = fc.constantFrom(
  'Sample',
  'Stream',
  'Date',
  'NaCl (wt%)',
  'K',
  'Analyte',
  'Result',
  'Unit',
  'Remark',
  'Sum',
  'Moisture (%)',
  '',
  'Basis',
  'Qualifier',
  'Zustand',
  'Method',
)
const table = fc
  .tuple(
    fc.array(head, { minLength: 2, maxLength: 7 }),
    fc.array(fc.array(cell, { minLength: 2, maxLength: 7 }), { minLength: 1, maxLength: 12 }),
  )
  .map(([heads, rows]) => [heads, ...rows].map((row) => row.join('\t')).join('\n'))

/** Tables whose first column is sample ids; their other cells are anything. */
const sampled = fc
  .tuple(
    fc.array(fc.constantFrom('NaCl (wt%)', 'K', 'Remark', 'Sum', 'Moisture (%)', 'Zustand', 'Na [mg/L]', 'Operator'), {
      minLength: 1,
      maxLength: 6,
    }),
    fc.array(fc.array(cell, { minLength: 6, maxLength: 6 }), { minLength: 1, maxLength: 12 }),
  )
  .map(([heads, rows]) =>
    [['Sample', ...heads], ...rows.map((row, at) => [`24-${at + 100}`, ...row.slice(0, heads.length)])]
      .map((row) => row.join('\t'))
      .join('\n'),
  )

/** Every text of the reading, joined: what a person could still find a cell's text in. */
function kept(reading: LabReading): string {
  const ofResults = (results: LabResult[]) =>
    results.flatMap(({ analyte, raw, unit, as, basis, sample, flag }) => [analyte, raw, unit, as, basis, sample, flag])
  const texts = [
    ...reading.samples.flatMap(({ id, stream, takenAt, note, method, results }) => [
      id,
      stream,
      takenAt,
      note,
      method,
      ...ofResults(results),
    ]),
    ...reading.totals.flatMap(({ label, results }) => [label, ...ofResults(results)]),
    ...reading.questions.flatMap(({ where, options }) => [...where, ...options]),
    ...[...reading.notUnderstood, ...reading.passedOver].map(({ raw }) => raw),
  ]
  return texts.join('\u0000')
}

/** Kinds of cell whose text becomes something else on purpose: dates become ISO, bases and units move to their results. */
const letters = (text: string): string => text.replace(/\s+/g, ' ').trim()

describe('any text', () => {
  it('ends quickly with a reading or a problem', () => {
    fc.assert(
      fc.property(
        fc.oneof(table, fc.string({ maxLength: 400 }), fc.string({ unit: 'binary', maxLength: 300 })),
        (text) => {
          const before = process.cpuUsage()
          const answer = readLabText(text)
          expect(process.cpuUsage(before).user / 1e6).toBeLessThan(5)
          if (!answer.ok) expect(answer.problems.length).toBeGreaterThan(0)
          else expect(answer.reading.samples.length).toBeGreaterThan(0)
        },
      ),
      { numRuns: 300 },
    )
  })

  it('loses no result: every measured cell of a table is a result, a total, a note or listed', () => {
    fc.assert(
      fc.property(sampled, (text) => {
        const answer = readLabText(text)
        if (!answer.ok) return
        const everything = kept(answer.reading)
        // A head such as "12 mg/L" is kept as name and unit: its number is looked for.
        for (const line of text.split('\n').slice(1))
          for (const raw of line.split('\t').map(letters))
            if (/^[<>~]? ?\d/.test(raw) && !/^\d+[./-]\d+[./-]\d+$/.test(raw))
              expect(everything, text).toContain(/[\d.,]+/.exec(raw)?.[0])
      }),
      { numRuns: 400 },
    )
  })
})

describe('a table’s order', () => {
  const analytes = ['Na (mg/L)', 'K (mg/L)', 'Cl (mg/L)', 'SO4 (mg/L)']
  const number = fc.constantFrom('1.5', '<0.1', 'n.d.', '1,234.5', '2,345', '5.2 ± 0.1', '', 'trace')
  it('of columns changes no reading', () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(number, { minLength: 4, maxLength: 4 }), { minLength: 1, maxLength: 6 }),
        fc.shuffledSubarray([0, 1, 2, 3, 4, 5, 6], { minLength: 7, maxLength: 7 }),
        (rows, order) => {
          const heads = ['Sample', 'Stream', 'Remark', ...analytes]
          const full = rows.map((row, at) => [`24-${at + 10}`, String(101 + at), 'ok', ...row])
          const write = (columns: number[]) =>
            [heads, ...full].map((row) => columns.map((column) => row[column]).join('\t')).join('\n')
          const [plain, mixed] = [write([0, 1, 2, 3, 4, 5, 6]), write(order)].map((text) => readLabText(text))
          if (!plain?.ok || !mixed?.ok) return expect(plain?.ok).toBe(mixed?.ok)
          expect(tableOf(mixed.reading)).toEqual(tableOf(plain.reading))
          expect(mixed.reading.samples.map(({ stream, note }) => [stream, note])).toEqual(
            plain.reading.samples.map(({ stream, note }) => [stream, note]),
          )
        },
      ),
      { numRuns: 200 },
    )
  })
})

describe('sizes', () => {
  const rows = (count: number) =>
    Array.from({ length: count }, (_, at) => `24-${at},101,${at % 97}.5,<0.1,n.d.`).join('\n')
  const heads = 'Sample,Stream,Na (mg/L),K (mg/L),Cl (mg/L)\n'
  const replicates = (count: number) => `sample,analyte,result,unit\n${'A,Na,1.5,mg/L\n'.repeat(count)}`
  /** Seconds of this process's own work: what else the machine does counts for nothing. */
  const workOf = (text: string): number => {
    const { user } = process.cpuUsage()
    readingOf(text)
    return process.cpuUsage({ user, system: 0 }).user / 1e6
  }
  it.each([
    ['rows', (count: number) => heads + rows(count)],
    ['replicates of one result', replicates],
  ])('reads four times the %s with work in proportion', (_, text) => {
    workOf(text(4_000))
    const growth = Array.from({ length: 3 }, () => workOf(text(16_000)) / workOf(text(4_000)))
    // 4 in proportion, 16 where each row looks at all others.
    expect(Math.min(...growth)).toBeLessThan(9)
  })
  it('reads 200,000 rows, no more', () => {
    expect(readingOf(replicates(200_000)).samples).toHaveLength(200_000)
    expect(readLabText(replicates(200_001))).toMatchObject({ ok: false })
  })
  it.each([
    ['200,001 rows', heads + rows(200_001)],
    ['20 MB and more', `${heads}A,101,${'1'.repeat(20 * 1024 * 1024)},2,3\n`],
    ['20 MB of separators', ','.repeat(19 * 1024 * 1024)],
    ['nothing', ' \n\n'],
    ['heads alone', heads],
    ['prose', 'This is a letter.\nIt has no table.\n'],
    ['numbers without heads', '1,2,3\n4,5,6\n'],
    ['signs that no text has', 'Sample,Na\u0000\u0001\u0002\nA,1\n'],
  ])('refuses %s in a plain sentence', (_, text) => {
    const answer = readLabText(text)
    expect(answer).toMatchObject({ ok: false, problems: [expect.stringMatching(/\.$/)] })
  })
})
