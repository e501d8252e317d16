import { describe, expect, it } from 'vitest'
import { chiSquareAbove, normalBothSides, sidakLimit } from './quantiles'

/** NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4 (upper tail), values from memory and recomputed. */
const chiSquare: Record<string, [freedom: number, value: number][]> = {
  '0.1': [
    [1, 2.706],
    [2, 4.605],
    [3, 6.251],
    [4, 7.779],
    [5, 9.236],
    [6, 10.645],
    [7, 12.017],
    [8, 13.362],
    [9, 14.684],
    [10, 15.987],
  ],
  '0.05': [
    [1, 3.841],
    [2, 5.991],
    [3, 7.815],
    [4, 9.488],
    [5, 11.07],
    [6, 12.592],
    [7, 14.067],
    [8, 15.507],
    [9, 16.919],
    [10, 18.307],
    [11, 19.675],
    [12, 21.026],
    [13, 22.362],
    [14, 23.685],
    [15, 24.996],
    [16, 26.296],
    [17, 27.587],
    [18, 28.869],
    [19, 30.144],
    [20, 31.41],
    [21, 32.671],
    [22, 33.924],
    [23, 35.172],
    [24, 36.415],
    [25, 37.652],
    [26, 38.885],
    [27, 40.113],
    [28, 41.337],
    [29, 42.557],
    [30, 43.773],
  ],
  '0.01': [
    [1, 6.635],
    [2, 9.21],
    [3, 11.345],
    [4, 13.277],
    [5, 15.086],
    [6, 16.812],
    [7, 18.475],
    [8, 20.09],
    [9, 21.666],
    [10, 23.209],
  ],
}

/** Standard normal table, two-sided critical values, from memory and recomputed. */
const normal: [above: number, value: number][] = [
  [0.1, 1.6449],
  [0.05, 1.96],
  [0.02, 2.3263],
  [0.01, 2.5758],
  [0.005, 2.807],
  [0.001, 3.2905],
]

describe('quantiles', () => {
  it.each(Object.entries(chiSquare))('chi-square exceeded with probability %s', (above, rows) => {
    for (const [freedom, value] of rows)
      expect(Math.abs(chiSquareAbove(Number(above), freedom) - value), `${freedom}`).toBeLessThanOrEqual(5.1e-4)
  })

  it('normal, both sides', () => {
    for (const [above, value] of normal) expect(Math.abs(normalBothSides(above) - value)).toBeLessThanOrEqual(5.1e-5)
  })

  it('is exact to rounding for two degrees of freedom, where the quantile is -2 ln p', () => {
    for (const above of [0.999, 0.5, 0.05, 1e-6, 1e-12])
      expect(chiSquareAbove(above, 2)).toBeCloseTo(-2 * Math.log(above), 9)
  })

  it('limits the largest of several tests', () => {
    expect(sidakLimit(0.95, 1)).toBeCloseTo(1.959964, 5)
    expect(sidakLimit(0.95, 6)).toBeCloseTo(2.631, 3)
  })
})
