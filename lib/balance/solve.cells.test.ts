import { describe, expect, it } from 'vitest'
import type { Problem } from './index'
import { cell, codes, flow, run, share, state } from './solve.fixture'

describe('what a cell says', () => {
  it('shows a given as typed, a fraction by the sum, a component flow from flow and fraction', () => {
    const result = run({ givens: [flow('1', 100), share('1', 'A', 0.3)] })
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'given', value: 100 })
    expect(cell(result, '1', 'massFraction', 'B')).toMatchObject({ state: 'solvable', value: 0.7 })
    expect(cell(result, '1', 'componentFlow', 'A')).toMatchObject({ state: 'solvable', value: 30 })
    expect(state(result, '2', 'flow')).toBe('unknown')
    expect(result.status).toBe('open')
    expect(result.summary).toMatchObject({ given: 2, solvable: 3, unknown: 10, atOdds: 0, degreesOfFreedom: 2 })
  })

  it('takes a given in another unit and shows it in the book’s', () => {
    const result = run({ givens: [flow('1', 2.4, { unit: 't/d' }), share('1', 'A', 12.5, { unit: '%' })] })
    expect(cell(result, '1', 'flow').value).toBeCloseTo(100, 12)
    expect(cell(result, '1', 'massFraction', 'A').value).toBeCloseTo(0.125, 12)
  })

  it('with a mole fraction typed, the mass fraction is solvable and the mole fraction given', () => {
    const result = run({
      components: [
        { id: 'A', molarMass: 18 },
        { id: 'B', molarMass: 58.5 },
      ],
      givens: [{ stream: '1', quantity: 'moleFraction', component: 'A', value: 0.5 }, flow('1', 76.5)],
    })
    expect(state(result, '1', 'moleFraction', 'A')).toBe('given')
    expect(cell(result, '1', 'massFraction', 'A')).toMatchObject({ state: 'solvable' })
    expect(cell(result, '1', 'massFraction', 'A').value).toBeCloseTo(18 / 76.5, 12)
    expect(cell(result, '1', 'moleFlow').value).toBeCloseTo(2, 12)
  })

  it('a stream of one component: its fraction is always 1, its component flow follows from its flow', () => {
    const result = run({ streams: [{ id: '1' }, { id: '2', components: ['A'] }, { id: '3' }], givens: [flow('2', 5)] })
    expect(cell(result, '2', 'massFraction', 'A')).toMatchObject({ state: 'solvable', value: 1 })
    expect(cell(result, '2', 'componentFlow', 'A')).toMatchObject({ state: 'solvable', value: 5 })
    expect(
      cell(run({ streams: [{ id: '1' }, { id: '2', components: ['A'] }, { id: '3' }] }), '2', 'massFraction', 'A'),
    ).toMatchObject({ state: 'solvable', value: 1 })
  })

  it('has no cell for an absent component, and no molar row without molar masses', () => {
    const result = run({ streams: [{ id: '1' }, { id: '2', components: ['A'] }, { id: '3' }] })
    expect(cell(result, '2', 'componentFlow', 'B')).toBeUndefined()
    expect(cell(result, '1', 'moleFlow')).toBeUndefined()
  })

  it('a negative result is shown and flagged, never clipped', () => {
    const result = run({ givens: [flow('1', 100), flow('2', 130)] })
    expect(cell(result, '3', 'flow')).toMatchObject({ state: 'solvable', value: -30, flags: ['negative'] })
    expect(result.conflicts).toEqual([])
  })

  it('a fraction above 1 is flagged', () => {
    const result = run({ givens: [share('1', 'A', -0.2)] })
    expect(cell(result, '1', 'massFraction', 'B')).toMatchObject({ state: 'solvable', flags: ['aboveOne'] })
    expect(cell(result, '1', 'massFraction', 'A').flags).toEqual(['negative'])
  })

  it('a typed zero flow fixes its components at 0 and leaves its fractions unknown', () => {
    const result = run({ givens: [flow('2', 0), flow('1', 10)] })
    expect(cell(result, '2', 'componentFlow', 'A')).toMatchObject({ state: 'solvable', value: 0, flags: ['zeroFlow'] })
    expect(cell(result, '2', 'massFraction', 'A')).toMatchObject({ state: 'unknown', flags: ['zeroFlow'] })
    expect(cell(result, '3', 'flow')).toMatchObject({ state: 'solvable', value: 10 })
  })

  it('a flow that is left as 100 - 100 is 0, and so are its components', () => {
    const result = run({ givens: [flow('1', 100), flow('2', 100)] })
    expect(cell(result, '3', 'flow')).toMatchObject({ state: 'solvable', value: 0, flags: ['zeroFlow'] })
    expect(cell(result, '3', 'componentFlow', 'B')).toMatchObject({ state: 'solvable', value: 0 })
  })

  it('fractions that leave nothing for the last component make it exactly 0', () => {
    const result = run({
      components: [{ id: 'A' }, { id: 'B' }, { id: 'C' }],
      givens: [share('1', 'A', 0.6), share('1', 'B', 0.4)],
    })
    expect(cell(result, '1', 'massFraction', 'C')).toMatchObject({ state: 'solvable', value: 0 })
  })

  it('a volume flow with density gives the mass flow', () => {
    const result = run({
      streams: [{ id: '1', density: 1200 }, { id: '2' }, { id: '3' }],
      givens: [{ stream: '1', quantity: 'volumeFlow', value: 10 }],
    })
    expect(cell(result, '1', 'flow').value).toBeCloseTo(12000, 9)
  })

  it('two meters on one flow: the main one is shown', () => {
    const result = run({ givens: [flow('1', 100, { instrument: 'FT-2' }), flow('1', 100)] })
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'given', value: 100 })
    expect(run({ givens: [flow('1', 100, { instrument: 'FT-2' }), flow('1', 90)] }).conflicts).toHaveLength(1)
  })

  it('a given that is a check or withdrawn is not used', () => {
    const result = run({ givens: [flow('1', 100, { use: 'check' }), flow('2', 10, { use: 'withdrawn' })] })
    expect(result.summary.given).toBe(0)
    expect(state(result, '1', 'flow')).toBe('unknown')
  })
})

describe('free scale', () => {
  it('with no flow typed all fractions are solvable, and the streams of the block are named', () => {
    const result = run({ givens: [share('1', 'A', 0.5), share('2', 'A', 0.9), share('3', 'A', 0.1)] })
    expect(
      result.cells.filter(({ quantity }) => quantity === 'massFraction').every((its) => its.state !== 'unknown'),
    ).toBe(true)
    expect(state(result, '1', 'flow')).toBe('unknown')
    expect(result.summary).toMatchObject({ degreesOfFreedom: 1, freeScale: [['1', '2', '3']] })
  })

  it('follows a composition through a mixer without any flow', () => {
    const result = run({
      streams: [{ id: '1' }, { id: '2' }],
      links: { U: { 1: 'in', 2: 'out' } },
      givens: [share('1', 'A', 0.25)],
    })
    expect(cell(result, '2', 'massFraction', 'A')).toMatchObject({ state: 'solvable', value: 0.25 })
  })
})

describe('diagnostics', () => {
  it.each([
    ['noUnit', { streams: [{ id: '1' }, { id: '2' }, { id: '3' }, { id: '4' }] }],
    ['noOutlet', { links: { U: { 1: 'in' } } }],
    ['noInlet', { links: { U: { 2: 'out' } } }],
    ['mixerManyOutlets', { units: [{ id: 'U', kind: 'mixer' }] }],
    ['unusedComponent', { streams: ['1', '2', '3'].map((id) => ({ id, components: ['A'] })) }],
  ] as [string, Partial<Problem>][])('%s', (code, rest) => {
    const found = run(rest).diagnostics.find((its) => its.code === code)
    expect(found?.severity).toBe('warning')
    expect(found?.text).toMatch(/\.$/)
  })

  it('a unit without outlets does not hold its inlets at 0', () => {
    const result = run({ links: { U: { 1: 'in' } }, givens: [flow('1', 100)] })
    expect(result.conflicts).toEqual([])
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'given', value: 100 })
  })

  it('a fault inside gives up and says so, and never throws', () => {
    const result = run({ flowUnit: 'furlong' })
    expect(result.status).toBe('gaveUp')
    expect(codes(result)).toEqual(['gaveUp'])
  })
})

describe('a cell that is a small difference of large flows', () => {
  it('is flagged with its amplification', () => {
    const result = run({
      components: [{ id: 'A' }],
      givens: [flow('1', 1e6), flow('2', 999_999.5)],
    })
    expect(cell(result, '3', 'flow')).toMatchObject({ state: 'solvable', flags: ['amplified'] })
    expect(cell(result, '3', 'flow').value).toBeCloseTo(0.5, 9)
    expect(cell(result, '3', 'flow').amplification).toBeCloseTo(2e6, -2)
  })
})
