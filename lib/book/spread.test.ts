import { describe, expect, it } from 'vitest'
import { bookOfProblem, smallPlant } from '@/tests/support/books'
import type { RecordOf } from './kinds'
import { convertSpread, unitRatio, unitWithout } from './spread'

const { state } = bookOfProblem(smallPlant)
const given = (unit: string | null): RecordOf<'given'> => ({
  ...([...state.given.values()][0] as RecordOf<'given'>),
  sigma: 24,
  unit,
})

describe('an uncertainty in another unit', () => {
  it.each([
    ['kg/h', 't/d', 0.576],
    [null, 't/d', 0.576],
    ['t/d', null, 1000],
    ['kg/h', 'kg/h', 24],
    ['kg/h', 'kmol/h', null],
    ['kg/h', 'nonsense', null],
  ])('from %s to %s is %s', (from, to, spread) => {
    expect(convertSpread(state, given(from), to)).toBe(spread)
  })
})

it('knows the unit that a value without one is in, and what does not fit', () => {
  expect([unitWithout(state, 'flow'), unitWithout(state, 'moleFlow'), unitWithout(state, 'massFraction')]).toEqual([
    'kg/h',
    'kmol/h',
    '1',
  ])
  expect(unitRatio('massFraction', '%', 'ppm')).toBeCloseTo(1e4, 6)
  expect(unitRatio('massFraction', 'kg/h', 't/h')).toBeUndefined()
  expect(unitRatio('flow', '%', 'ppm')).toBeUndefined()
})
