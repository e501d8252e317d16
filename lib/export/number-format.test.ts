import { describe, expect, it } from 'vitest'
import { SSF } from 'xlsx'
import { numberFormat, typedFormat } from './number-format'

/** What a spreadsheet program shows, by a second implementation of number formats. */
const shown = (value: number, digits = 4): string => SSF.format(numberFormat(value, digits), value)

describe('numberFormat', () => {
  it.each([
    [0, '0'],
    [50_000, '50 000'],
    [24_866.3123, '24 866'],
    [1_234_567.8, '1 234 568'],
    [322.8518, '322.9'],
    [5.3079, '5.308'],
    [0.194, '0.1940'],
    [0.000_012_345, '0.00001235'],
    [-1234.5, '-1 235'],
    [-12.346, '-12.35'],
    [999.96, '1 000'],
    [9.9996, '10.00'],
    [999_999.7, '1 000 000'],
  ])('shows %d as %s', (value, text) => {
    expect(shown(value)).toBe(text)
  })

  it('takes a power of ten where a plain decimal cannot be read', () => {
    expect(shown(1.2346e-9)).toBe('1.235E-09')
    expect(shown(3e15)).toBe('3.000E+15')
  })

  it('drops no typed figure, and shows no noise of a conversion', () => {
    expect(SSF.format(typedFormat(12_345.678, 4), 12_345.678)).toBe('12 345.678')
    expect(SSF.format(typedFormat(0.194 * 100, 4), 0.194 * 100)).toBe('19.40')
    expect(SSF.format(typedFormat(1 / 3, 4), 1 / 3)).toBe('0.3333')
  })
})
