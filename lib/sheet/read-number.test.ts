import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type DecimalSign, readNumber } from './read-number'

describe('numbers that are read', () => {
  const cases: [text: string, decimal: DecimalSign, value: number, halfWidth: number, rest?: string][] = [
    ['24.00', 'point', 24, 0.005],
    ['50 000', 'point', 50_000, 0.5],
    ['50\u2009000.5', 'point', 50_000.5, 0.05],
    ['1\u202f234\u202f567', 'point', 1_234_567, 0.5],
    ["1'234'567.25", 'point', 1_234_567.25, 0.005],
    ['1,234,567', 'point', 1_234_567, 0.5],
    ['1,234.5', 'point', 1234.5, 0.05],
    ['1.2e3', 'point', 1200, 50],
    ['1.2E-3', 'point', 0.0012, 0.00005],
    ['1.2e\u22123', 'point', 0.0012, 0.00005],
    ['1.2×10^3', 'point', 1200, 50],
    ['3 x 10⁻²', 'point', 0.03, 0.005],
    ['\u22125.5', 'point', -5.5, 0.05],
    ['+7', 'point', 7, 0.5],
    ['.5', 'point', 0.5, 0.05],
    ['2.', 'point', 2, 0.5],
    ['0', 'point', 0, 0.5],
    ['0.194', 'point', 0.194, 0.0005],
    ['3,5', 'comma', 3.5, 0.05],
    ['50 000,25', 'comma', 50_000.25, 0.005],
    ['1.234,5', 'comma', 1234.5, 0.05],
    ['1.234.567', 'comma', 1_234_567, 0.5],
    ['12.5 t/d', 'point', 12.5, 0.05, 't/d'],
    ['350ppm', 'point', 350, 0.5, 'ppm'],
    ['1e3kg/h', 'point', 1000, 500, 'kg/h'],
    ['2 %', 'point', 2, 0.5, '%'],
    ['50 000 kg/h', 'point', 50_000, 0.5, 'kg/h'],
  ]
  it.each(cases)('%s with a decimal %s', (text, decimal, value, halfWidth, rest = '') => {
    expect(readNumber(text, decimal)).toEqual({ ok: true, value, halfWidth, rest })
  })
})

describe('numbers that are refused, with the reason', () => {
  const cases: [text: string, decimal: DecimalSign, reason: RegExp][] = [
    ['3,5', 'point', /decimal comma, and a decimal point is set: type 3\.5/],
    ['0,125', 'point', /type 0\.125/],
    ['50 000,5', 'point', /type 50000\.5/],
    ['1,234', 'point', /can be read as 1\u00a0234 or as 1\.234: type 1234 or 1\.234/],
    ['1.234', 'comma', /can be read as 1\u00a0234 or as 1,234: type 1234 or 1,234/],
    ['3.5', 'comma', /decimal point, and a decimal comma is set: type 3,5/],
    ['1.2.3', 'point', /more than one decimal sign/],
    ['1,23,456', 'point', /not one number/],
    ['12 5', 'point', /more than one number/],
    ['1 2345', 'point', /more than one number/],
    ['abc', 'point', /not a number/],
    ['-', 'point', /not a number/],
    ['1e999', 'point', /too large/],
    ['1e-999', 'point', /too small/],
  ]
  it.each(cases)('%s with a decimal %s', (text, decimal, reason) => {
    const read = readNumber(text, decimal)
    expect(read.ok).toBe(false)
    expect(!read.ok && read.reason).toMatch(reason)
  })
})

it('reads every number that JavaScript prints, with either decimal sign', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.boolean(), (value, comma) => {
      const text = comma ? String(value).replace('.', ',') : String(value)
      const read = readNumber(text, comma ? 'comma' : 'point')
      // Three digits behind a lone sign are never guessed to be decimals in the other notation; in its own they are.
      expect(read.ok && read.value).toBe(value === 0 ? 0 : value)
    }),
  )
})

it('never throws and never reads a number out of something else', () => {
  fc.assert(
    fc.property(fc.string(), fc.constantFrom<DecimalSign>('point', 'comma'), (text, decimal) => {
      const read = readNumber(text, decimal)
      if (read.ok) {
        expect(Number.isFinite(read.value)).toBe(true)
        expect(/^\s*[-+\u2212\u2013\uff0d]?\s*[.,]?\d/.test(text)).toBe(true)
        expect(read.halfWidth === null || read.halfWidth > 0).toBe(true)
      } else expect(read.reason).not.toBe('')
    }),
  )
})
