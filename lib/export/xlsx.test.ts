import { beforeAll, describe, expect, it } from 'vitest'
import type { WorkBook } from 'xlsx'
import type { Problem } from '@/lib/balance/problem'
import { CellState, slotOf } from '@/lib/balance/solution'
import { exportCase, smallFlows, smallProblem, title, workbookOf } from '@/tests/export-case'
import { handSolution } from '@/tests/hand-solution'
import { cellAt, cellsOf, readWorkbook, rowStarting, rowsOf, sheetOf } from '@/tests/workbook'
import { cautions } from './caution'

const { '3': _, ...withoutMixed } = smallFlows
const open = exportCase(smallProblem, (taken) => {
  const solution = handSolution(taken, withoutMixed, { X: 0.5 })
  solution.states[slotOf(2, 3, 'flow')] = CellState.atOdds
  return solution
})

describe('the workbook', () => {
  let workbook: WorkBook
  beforeAll(async () => {
    workbook = readWorkbook(await workbookOf(open))
  })
  const table = () => sheetOf(workbook, 'Stream table')

  it('has its four sheets and no macro, link or formula but on the closure sheet', () => {
    expect(workbook.SheetNames).toEqual(['Stream table', 'Closure', 'Givens', 'Notes'])
    const files = Object.keys((workbook as unknown as { files: Record<string, unknown> }).files)
    expect(files.filter((name) => /vba|externalLink|connections|drawing|comments/i.test(name))).toEqual([])
    for (const name of ['Stream table', 'Givens', 'Notes'])
      expect(cellsOf(sheetOf(workbook, name)).filter(([, cell]) => cell.f !== undefined)).toEqual([])
    for (const [, cell] of cellsOf(sheetOf(workbook, 'Closure')))
      if (cell.f) expect(cell.f).not.toMatch(/\[|http|!\$?[A-Z]+\$?\d+!/)
  })

  it('carries the fields of the title block, and says that nothing is issued', () => {
    const texts = rowsOf(table()).slice(0, 6).flat()
    for (const text of [
      'Salt section',
      title.owner,
      title.project,
      'KF-100-ST-001',
      'preliminary draft',
      'Lena Kraus',
      'Base case',
      '1 of 4',
    ])
      expect(texts).toContain(text)
    expect(texts).toContain('Preliminary - not issued')
    expect(texts).toContain('not issued (made 2026-03-01)')
    expect(workbook.Props).toMatchObject({ Title: 'Salt section', Author: 'Tallybrook' })
  })

  it('writes numbers as numbers in full, a dot where unknown and a dash where absent', () => {
    expect(rowStarting(table(), 'Stream').values.slice(2, 6)).toEqual(['1', '2', '3', '4'])
    expect(rowStarting(table(), 'Total flow').values.slice(1, 6)).toEqual(['kg/h', 100, 15, '·', 115])
    expect(rowStarting(table(), 'Base (B)', 'wt %').values.slice(2, 6)).toEqual([75, '–', '·', (100 * 95) / 115])
    expect(rowStarting(table(), 'From').values.slice(2, 6)).toEqual([null, null, 'M', 'R'])
    expect(rowStarting(table(), 'M  Mixer', 'mixer').values.slice(2, 6)).toEqual(['in', 'in', 'out', null])
  })

  it('judges closure by the usual limit, or by the one that the team has chosen', async () => {
    expect(cellAt(sheetOf(workbook, 'Closure'), 'D2')).toMatchObject({ v: 0.1 })
    const chosen = readWorkbook(await workbookOf({ ...open, closureLimit: 0.5 }))
    expect(cellAt(sheetOf(chosen, 'Closure'), 'D2')).toMatchObject({ v: 0.5 })
  })

  it('tells states by fill', () => {
    const { number } = rowStarting(table(), 'Total flow')
    const patterns = ['C', 'D', 'E', 'F'].map((column) => {
      const style = cellAt(table(), `${column}${number}`)?.s as { patternType: string; fgColor?: { rgb: string } }
      return [style.patternType, style.fgColor?.rgb]
    })
    expect(patterns).toEqual([
      ['solid', 'F6E7BF'],
      ['solid', 'E0F1E6'],
      ['lightUp', 'A89C7E'],
      ['solid', 'FBE0E6'],
    ])
  })

  it('freezes heads and labels, and repeats them on paper', () => {
    const files = (workbook as unknown as { files: Record<string, { content?: Uint8Array }> }).files
    const text = (name: string) => new TextDecoder().decode(files[name]?.content as Uint8Array)
    const sheet = text('xl/worksheets/sheet1.xml')
    const first = rowStarting(table(), 'Stream').number
    expect(sheet).toContain(
      `<pane xSplit="2" ySplit="${first + 1}" topLeftCell="C${first + 2}" activePane="bottomRight" state="frozen"/>`,
    )
    expect(sheet).toMatch(
      /<pageSetup [^>]*paperSize="8"[^>]*orientation="landscape"[^>]*fitToWidth="1"[^>]*fitToHeight="0"/,
    )
    expect(sheet).toContain('Page &amp;P of &amp;N')
    expect(sheet).toContain('KF-100-ST-001')
    expect(sheet).toContain('Material balance only')
    expect(text('xl/workbook.xml').replaceAll('&apos;', "'")).toMatch(
      new RegExp(`Print_Titles[^<]*>'Stream table'!\\$A:\\$B,'Stream table'!\\$${first}:\\$${first + 4}<`),
    )
  })

  it('lists every given as typed, with its source', () => {
    const givens = sheetOf(workbook, 'Givens')
    const { values, number } = rowStarting(givens, 'No.')
    const [first, second] = rowsOf(givens).slice(number)
    const named = (row: typeof first) => Object.fromEntries(values.map((head, at) => [head, row?.[at] ?? null]))
    expect(named(first)).toMatchObject({
      Stream: '1',
      Measure: 'total flow',
      'As typed': '100 kg/h',
      Value: 100,
      Unit: 'kg/h',
      'Kind of source': 'meter',
      Source: 'FIT-1',
    })
    expect(named(second)).toMatchObject({
      Component: 'A',
      Value: 25,
      Unit: '%',
      Use: 'given',
      'Kind of source': 'assumption',
    })
  })

  it('carries the whole caution, the assumptions and how it was made', () => {
    const notes = rowsOf(sheetOf(workbook, 'Notes'))
      .flat()
      .filter((text) => typeof text === 'string')
    for (const caution of cautions) expect(notes).toContain(caution)
    expect(notes).toContain('Stream 1, mass fraction of A: 25 %. as last year')
    expect(notes.some((text) => /engine 0\.1\.0, change 12 of the book/.test(text))).toBe(true)
  })
})

describe('what people typed', () => {
  const nasty = ['=1+1', '+cmd', '-2', '@SUM(A1)', '\t=1', '=HYPERLINK("http://x.example","y")']
  const problem: Problem = {
    ...smallProblem,
    components: smallProblem.components.map((component, at) => ({ ...component, name: nasty[at] as string })),
    streams: smallProblem.streams.map((stream, at) => ({
      ...stream,
      name: nasty[at] as string,
      note: nasty[5] as string,
    })),
    units: smallProblem.units.map((unit) => ({ ...unit, name: nasty[5] as string })),
    givens: [{ stream: '1', quantity: 'flow', value: 5, source: '=1+1', note: '@x', kind: 'assumption' }],
  }

  it('stays text where it looks like a formula', async () => {
    const input = exportCase(problem, (taken) => handSolution(taken, smallFlows, { X: 0.5 }))
    input.title = { ...title, title: '=1+1', owner: '-2', documentNumber: '+cmd&P' }
    const workbook = readWorkbook(await workbookOf(input))
    let seen = 0
    for (const name of workbook.SheetNames)
      for (const [, cell] of cellsOf(sheetOf(workbook, name))) {
        if (typeof cell.v !== 'string' || !/^[=+\-@\t]/.test(cell.v)) continue
        seen += 1
        expect([cell.t, cell.f, cell.z]).toEqual(['s', undefined, '@'])
      }
    expect(seen).toBeGreaterThan(10)
  })

  it('may be long and in any writing', async () => {
    const long = `${'Überlauf – 过滤器 🧂 <&"\'> '.repeat(400)}`.slice(0, 9000)
    const named: Problem = {
      ...smallProblem,
      streams: smallProblem.streams.map((stream) => ({ ...stream, name: long, note: long })),
    }
    const input = exportCase(named, (taken) => handSolution(taken, smallFlows, { X: 0.5 }))
    input.title = { ...title, title: long, project: long, documentNumber: '&'.repeat(100), caseName: long }
    const bytes = await workbookOf(input)
    const workbook = readWorkbook(bytes)
    expect(rowStarting(sheetOf(workbook, 'Stream table'), 'Name').values[2]).toBe(long)
    const files = (workbook as unknown as { files: Record<string, { content?: Uint8Array }> }).files
    const xml = new TextDecoder().decode(files['xl/worksheets/sheet1.xml']?.content as Uint8Array)
    for (const [, line = ''] of xml.matchAll(/<odd(?:Header|Footer)>([^<]*)</g))
      expect(line.replace(/&(amp|lt|gt|quot|apos);/g, '&').length).toBeLessThanOrEqual(255)
  })
})

describe('a book with nothing in it', () => {
  it.each([
    ['no streams', { components: [{ id: 'A' }], streams: [] }],
    ['no components', { components: [], streams: [{ id: '1' }] }],
    ['neither', { components: [], streams: [] }],
  ])('is written all the same: %s', async (_name, part) => {
    const empty: Problem = {
      format: 'tallybrook/1',
      name: 'New',
      basis: 'mass',
      flowUnit: 'kg/h',
      units: [],
      links: {},
      ...part,
    }
    const workbook = readWorkbook(await workbookOf(exportCase(empty)))
    expect(workbook.SheetNames).toHaveLength(4)
  })
})
