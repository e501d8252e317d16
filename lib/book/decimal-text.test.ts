import fc from 'fast-check'
import { expect, it } from 'vitest'
import { plainDecimal, shiftDecimal } from './decimal-text'

it.each([
  [0.00194, 2, 0.194],
  [0.24, 2, 24],
  [9.7e-5, 2, 0.0097],
  [0.07, 2, 7],
  [1.15, 2, 115],
  [0, 2, 0],
  [-0.29, 2, -29],
  [194, -3, 0.194],
])('%d moved by %i is %d', (value, places, moved) => {
  expect(shiftDecimal(value, places)).toBe(moved)
})

it.each([
  [9.7e-5, '0.000097'],
  [1.2e-7, '0.00000012'],
  [-1.2e-7, '-0.00000012'],
  [1e21, '1e+21'],
  [1e20, '100000000000000000000'],
  [1.5e-13, '1.5e-13'],
  [50_000, '50000'],
])('%d is written %s', (value, text) => {
  expect(plainDecimal(value)).toBe(text)
})

it('writes what reads back as the same number, and moves there and back', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e200, max: 1e200 }), (value) => {
      expect(Number(plainDecimal(value))).toBe(value === 0 ? Number(String(value)) : value)
      const typed = Number(value.toPrecision(15))
      if (Math.abs(typed) > 1e-200) expect(shiftDecimal(shiftDecimal(typed, 2), -2)).toBe(typed)
    }),
  )
})
