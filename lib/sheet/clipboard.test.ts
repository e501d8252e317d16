import fc from 'fast-check'
import { Window } from 'happy-dom'
import { describe, expect, it } from 'vitest'
import { type HtmlParser, parseHtmlTable, parseTsv, readClipboard, toHtmlTable, toTsv } from './clipboard'

const parser = new new Window().DOMParser() as unknown as HtmlParser

describe('text from a spreadsheet', () => {
  const cases: [text: string, rows: string[][]][] = [
    [
      'a\tb\r\nc\td\r\n',
      [
        ['a', 'b'],
        ['c', 'd'],
      ],
    ],
    [
      'a\tb\nc\td',
      [
        ['a', 'b'],
        ['c', 'd'],
      ],
    ],
    ['1\r2\r', [['1'], ['2']]],
    ['"two\nlines"\t"a ""quote"""\r\n', [['two\nlines', 'a "quote"']]],
    ['"with\ttab"\tx', [['with\ttab', 'x']]],
    ['6" pipe\t5', [['6" pipe', '5']]],
    ['"open\tx\ny', [['"open', 'x'], ['y']]],
    ['a\n\nb\n', [['a'], [''], ['b']]],
    ['a\tb\tc\nd\n', [['a', 'b', 'c'], ['d']]],
    ['\t\r\n', [['', '']]],
    ['\r\n', [['']]],
    ['', []],
  ]
  it.each(cases)('%j', (text, rows) => {
    expect(parseTsv(text)).toEqual(rows)
  })
})

describe('HTML tables', () => {
  it('reads cells, line breaks and spans, and leaves nested tables alone', () => {
    const html = `<meta charset="utf-8"><p>x</p><table><thead><tr><th>Stream</th><th colspan="2">101 &amp; 102</th></tr></thead>
      <tbody><tr><td rowspan="2">Feed<br>main</td><td>50&nbsp;000</td><td>  1
      2 </td></tr><tr><td>b</td><td><table><tr><td>in</td></tr></table></td></tr></tbody></table>`
    expect(parseHtmlTable(html, parser)).toEqual([
      ['Stream', '101 & 102', ''],
      ['Feed\nmain', '50 000', '1 2'],
      ['', 'b', 'in'],
    ])
  })

  it('has nothing to read where there is no table', () => {
    expect(parseHtmlTable('<p>12</p>', parser)).toBeUndefined()
  })

  it('does not believe absurd spans', () => {
    const rows = parseHtmlTable('<table><tr><td rowspan="999999999" colspan="-4">a</td></tr></table>', parser)
    expect(rows).toEqual([['a']])
  })

  it('writes text as text', () => {
    expect(toHtmlTable([['<script>"&', 'two\nlines']])).toBe(
      '<table data-decimal="point"><tbody><tr><td>&lt;script&gt;&quot;&amp;</td><td>two<br>lines</td></tr></tbody></table>',
    )
  })
})

it('takes the text, falls back to the table, and knows the decimal sign of its own blocks', () => {
  const rows = [['12.5', 'x']]
  const html = toHtmlTable(rows, 'point')
  expect(readClipboard({ text: toTsv(rows), html }, parser)).toEqual({ rows, decimal: 'point' })
  expect(readClipboard({ html }, parser)).toEqual({ rows, decimal: 'point' })
  expect(readClipboard({ text: '1,5\t2', html: '<table><tr><td>1.5</td></tr></table>' }, parser)).toEqual({
    rows: [['1,5', '2']],
  })
  expect(readClipboard({}, parser)).toEqual({ rows: [] })
})

const cell = fc.oneof(
  fc.string(),
  fc.stringMatching(/^[ab"'\t\n=<&,; -]{0,6}$/),
  fc.double({ noNaN: true }).map((value) => String(value)),
)
const block = fc
  .tuple(fc.integer({ min: 1, max: 5 }), fc.integer({ min: 1, max: 5 }))
  .chain(([rows, columns]) =>
    fc.array(fc.array(cell, { minLength: columns, maxLength: columns }), { minLength: rows, maxLength: rows }),
  )

it('gives any block back that it wrote as text', () => {
  fc.assert(
    fc.property(block, (rows) => {
      expect(parseTsv(toTsv(rows))).toEqual(rows.map((row) => row.map((text) => text.replaceAll('\0', ''))))
    }),
  )
})

it('gives the words of any block back that it wrote as a table', () => {
  const words = fc.array(fc.stringMatching(/^[a-z0-9<>&"'=.]{1,6}$/), { minLength: 1, maxLength: 4 })
  fc.assert(
    fc.property(fc.array(words, { minLength: 1, maxLength: 4 }), (rows) => {
      expect(parseHtmlTable(toHtmlTable(rows), parser)).toEqual(rows)
    }),
    { numRuns: 50 },
  )
})
