import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type FormatOptions, formatNumber, type NumberStyle, plainNumber } from './format'
import { readNumber } from './read-number'

const spaced = (text: string): string => text.replaceAll(' ', '\u00a0').replaceAll('-', '\u2212')

describe('the look of a number', () => {
  const cases: [value: number, style: NumberStyle, text: string, options?: FormatOptions][] = [
    [50_000, 'flow', '50 000'],
    [10_938.7, 'flow', '10 939'],
    [1_234_567.8, 'flow', '1 234 568'],
    [999.97, 'flow', '1 000'],
    [322.9, 'flow', '322.9'],
    [300, 'flow', '300.0'],
    [21.22, 'flow', '21.2'],
    [9.999, 'flow', '10.0'],
    [5.308, 'flow', '5.31'],
    [0.9999, 'flow', '1.00'],
    [0.123456, 'flow', '0.123'],
    [0.5, 'flow', '0.5'],
    [0.0012345, 'flow', '0.00123'],
    [0.000012345, 'flow', '1.23e-5'],
    [1.5e15, 'flow', '1.50e15'],
    [-322.9, 'flow', '-322.9'],
    [0, 'flow', '0'],
    [-0, 'flow', '0'],
    [75, 'percent', '75.00'],
    [100, 'percent', '100'],
    [99.9999, 'percent', '100.00'],
    [0.194, 'percent', '0.19'],
    [0.05, 'percent', '0.05'],
    [0.0234, 'percent', '0.023'],
    [0.00045678, 'percent', '0.00046'],
    [0, 'percent', '0'],
    [0.24, 'fraction', '0.2400'],
    [0.00005, 'fraction', '5.00e-5'],
    [0.0005, 'fraction', '0.0005'],
    [0.00012345, 'fraction', '0.00012'],
    [0.194, 'percent', '0.194', { typed: true }],
    [24, 'percent', '24.000', { typed: true, halfWidth: 0.0005 }],
    [50_000.25, 'flow', '50 000.25', { typed: true }],
    [0.05, 'percent', '0.050', { halfWidth: 0.0005 }],
    [10_938.72, 'flow', '10 938.7', { extraDigits: 1 }],
    [1234.5, 'flow', '1 235', { decimal: 'comma' }],
    [12.5, 'flow', '12,5', { decimal: 'comma' }],
  ]
  it.each(cases)('%d as %s is %s', (value, style, text, options = {}) => {
    expect(formatNumber(value, style, options)).toBe(spaced(text))
  })
})

it('never shows 0 for what is not 0, and is right in its last digit', () => {
  fc.assert(
    fc.property(
      fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e14, max: 1e14 }),
      fc.constantFrom<NumberStyle>('flow', 'percent', 'fraction'),
      (value, style) => {
        const read = readNumber(formatNumber(value, style), 'point')
        if (!read.ok) throw new Error(read.reason)
        expect(read.value === 0).toBe(value === 0)
        expect(Math.abs(read.value - value)).toBeLessThanOrEqual(
          (read.halfWidth ?? 0) * (1 + 1e-9) + Math.abs(value) * 1e-15,
        )
      },
    ),
  )
})

it('gives the clipboard text that reads back as the same number', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.boolean(), (value, comma) => {
      const decimal = comma ? 'comma' : 'point'
      const read = readNumber(plainNumber(value, decimal), decimal)
      expect(read).toMatchObject({ ok: true, value: value === 0 ? 0 : value, rest: '' })
    }),
  )
})

describe('digits that a team has chosen', () => {
  it.each([
    [10938.7, 3, '10\u00a0939'],
    [322.85, 5, '322.85'],
    [9.9996, 3, '10.0'],
    [0.0123456, 4, '0.01235'],
    [0, 4, '0'],
    [-5.3079, 3, '\u22125.31'],
  ])('%d with %d is %s', (value, digits, text) => {
    expect(formatNumber(value, 'flow', { digits })).toBe(text)
  })
})
