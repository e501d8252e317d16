import { describe, expect, it } from 'vitest'
import packageJson from '@/package.json'
import { engineVersion } from './engine-version'
import { attachment, fileName } from './file-name'
import { ruleInWords } from './rule-words'
import { cellText, headerText, looksLikeFormula, pageLine } from './safe-text'

describe('cellText', () => {
  it('keeps what a workbook can hold and takes out the rest', () => {
    expect(cellText('a\u0000b\u0007c\u007fd\uffffe')).toBe('abcde')
    expect(cellText('a\r\nb\rc\n')).toBe('a\nb\nc\n')
    expect(cellText('x\ud800y')).toBe('x\ufffdy')
    expect(cellText('Kräuterö Αλάτι 盐 🧂')).toBe('Kräuterö Αλάτι 盐 🧂')
  })

  it('writes what would be read as a character code so that it is read as itself', () => {
    expect(cellText('_x0041_')).toBe('_x005F_x0041_')
  })

  it('is never longer than a cell', () => {
    expect(cellText('x'.repeat(40_000))).toHaveLength(32_766)
  })

  it.each(['=1', '+1', '-1', '@x', '\t=1', '\r=1'])('knows %j for what a program would calculate', (text) => {
    expect(looksLikeFormula(text)).toBe(true)
  })
})

describe('page lines', () => {
  it('doubles every & and stays short', () => {
    expect(headerText('R&D &P', 40)).toBe('R&&D &&P')
    expect(headerText('&'.repeat(100), 40).length).toBeLessThanOrEqual(41)
    expect(headerText('&'.repeat(100), 40)).toMatch(/^(&&)*…$/)
  })

  it('refuses a line that would damage the file', () => {
    expect(() => pageLine('x'.repeat(200), 'y'.repeat(60), '')).toThrow(/damages/)
  })
})

describe('fileName', () => {
  it('names document, title and kind', () => {
    expect(fileName(['KF-100', 'Salt section', 'stream table'], '.xlsx')).toBe(
      'KF-100 Salt section - stream table.xlsx',
    )
    expect(fileName(['', 'Salt section', 'stream table'], '.xlsx')).toBe('Salt section - stream table.xlsx')
  })

  it('holds no path, no reserved character, and is not endless', () => {
    expect(fileName(['../..', 'a/b\\c:d*e?"<f>|g\n\u202e', 'stream table'], '.xlsx')).toBe(
      'a b c d e f g - stream table.xlsx',
    )
    expect(fileName(['é'.repeat(300), 'x', 'stream table'], '.xlsx').length).toBeLessThan(130)
    expect(fileName(['...', '///', 'stream table'], '.xlsx')).toBe('stream table.xlsx')
  })
})

describe('attachment', () => {
  it('gives a plain name and the real one', () => {
    expect(attachment('Sølje “A”; 100 %.xlsx')).toBe(
      'attachment; filename="S_lje _A__ 100 _.xlsx"; filename*=UTF-8\'\'S%C3%B8lje%20%E2%80%9CA%E2%80%9D%3B%20100%20%25.xlsx',
    )
  })

  it('cannot be broken out of', () => {
    const header = attachment('a"; x="\r\nSet-Cookie: y')
    expect(header).not.toMatch(/[\r\n]/)
    expect(header.match(/"/g)).toHaveLength(2)
  })
})

describe('ruleInWords', () => {
  it('says who, what and how much', () => {
    const split = { id: 'R1', kind: 'split', unit: 'M-105', stream: '109', value: 0.55 } as const
    expect(ruleInWords(split)).toBe('Of what enters M-105, the fraction 0.55 of every component leaves in stream 109.')
    expect(ruleInWords({ ...split, value: { parameter: 'x' }, use: 'check', note: 'design' })).toBe(
      'Of what enters M-105, the fraction the parameter x of every component leaves in stream 109. Kept as a check only. Note: design',
    )
  })
})

it('prints the version of the package', () => {
  expect(engineVersion).toBe(packageJson.version)
})
