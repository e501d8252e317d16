import { describe, expect, it } from 'vitest'
import { type Problem, type Result, solve, toResult } from './index'
import { cell, flow, run, share } from './solve.fixture'

const sumOfThree = (halfWidth?: number): Partial<Problem> => ({
  components: [{ id: 'A' }, { id: 'B' }, { id: 'C' }],
  givens: [
    flow('1', 100),
    ...['A', 'B', 'C'].map((c) => share('1', c, 0.333, halfWidth === undefined ? {} : { halfWidth })),
  ],
})

describe('checks', () => {
  it('three fractions of 0.333 that agree are one check, and no flow comes out as 0', () => {
    for (const withFlow of [true, false]) {
      const three = sumOfThree(0.0005)
      const result = run(withFlow ? three : { ...three, givens: three.givens?.slice(1) })
      expect(result.conflicts).toEqual([])
      expect(result.checks).toHaveLength(1)
      expect(result.checks[0]).toMatchObject({ code: 'sum', relations: [], agrees: true })
      expect(result.checks[0]?.givens.map(({ component }) => component)).toEqual(['A', 'B', 'C'])
      expect(result.checks[0]?.by).toBeCloseTo(-0.001, 12)
      expect(result.checks[0]?.tolerance).toBeCloseTo(0.0015, 12)
      expect(result.cells.some(({ value }) => value === 0)).toBe(false)
    }
  })

  it('meters round a unit that agree within half-widths: one check, the same in every order', () => {
    const meters = [
      flow('1', 100, { halfWidth: 0.5 }),
      flow('2', 30, { halfWidth: 0.5 }),
      flow('3', 70.6, { halfWidth: 0.5 }),
    ]
    const results = [
      [0, 1, 2],
      [2, 1, 0],
      [1, 2, 0],
    ].map((order) => run({ givens: order.map((k) => meters[k] as (typeof meters)[number]) }))
    for (const { checks, conflicts } of results) {
      expect(conflicts).toEqual([])
      expect(checks).toHaveLength(1)
      expect(checks[0]).toMatchObject({ code: 'redundant', agrees: true })
      expect(checks[0]?.givens.map(({ stream }) => stream)).toEqual(['1', '2', '3'])
      expect(checks[0]?.by).toBeCloseTo(-0.6, 9)
      expect(checks[0]?.tolerance).toBeCloseTo(1.5, 9)
    }
  })

  it('values that close need no check', () => {
    expect(run({ givens: [flow('1', 100), flow('2', 30), flow('3', 70)] }).checks).toEqual([])
  })

  it('a given and a rule kept as checks say typed less implied, and change nothing', () => {
    const result: Result = run({
      givens: [flow('1', 100), flow('2', 30), flow('3', 71, { use: 'check', halfWidth: 0.5 })],
      relations: [{ id: 'Q', use: 'check', kind: 'flowRatio', stream: '2', of: '1', value: 0.31, halfWidth: 0.02 }],
    })
    expect(cell(result, '3', 'flow')).toMatchObject({ state: 'solvable' })
    expect(cell(result, '3', 'flow').value).toBeCloseTo(70, 9)
    expect(result.checks).toHaveLength(2)
    expect(result.checks[0]).toMatchObject({ code: 'checkOnly', tolerance: 0.5, agrees: false })
    expect(result.checks[0]?.by).toBeCloseTo(1, 9)
    expect(result.checks[1]).toMatchObject({ code: 'checkOnly', relations: ['Q'], agrees: true })
    expect(result.checks[1]?.by).toBeCloseTo(0.01, 9)
  })

  it('a check that nothing can be compared with is said, not listed', () => {
    const result = run({ givens: [flow('3', 71, { use: 'check' })] })
    expect(result.checks).toEqual([])
    expect(result.diagnostics).toContainEqual(expect.objectContaining({ code: 'checkOpen', stream: '3' }))
  })
})

describe('a solver that gave up', () => {
  it('has no checks', () => {
    const problem = {
      format: 'tallybrook/1',
      name: 'x',
      basis: 'mass',
      flowUnit: 'nonsense',
      components: [],
      streams: [],
      units: [],
      links: {},
    } as Problem
    expect(toResult(problem, solve(problem)).checks).toEqual([])
  })
})
