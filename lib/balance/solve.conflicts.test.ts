import { describe, expect, it } from 'vitest'
import type { Given, Problem } from './index'
import { cell, flow, run, share, state } from './solve.fixture'

describe('fractions that are all typed', () => {
  const typed = (...values: number[]): Given[] => values.map((value, k) => share('1', 'ABC'[k] as string, value))
  const three: Partial<Problem> = { components: [{ id: 'A' }, { id: 'B' }, { id: 'C' }] }

  it('at odds when the sum is off, and nothing is claimed to be 0', () => {
    const result = run({ ...three, givens: [...typed(0.333, 0.333, 0.333), flow('1', 100)] })
    expect(result.status).toBe('atOdds')
    expect(result.conflicts).toHaveLength(1)
    expect(result.conflicts[0]).toMatchObject({ code: 'fractionSum', stream: '1', boundary: [] })
    expect(result.conflicts[0]?.givens[0]).toMatchObject({ typed: 0.333 })
    expect(result.conflicts[0]?.givens[0]?.by).toBeCloseTo(-0.001, 12)
    expect(state(result, '1', 'flow')).toBe('given')
    expect(cell(result, '1', 'componentFlow', 'A')).toMatchObject({ state: 'unknown', blockedBy: [0] })
  })

  it('agree within their half-widths, with no zero flows', () => {
    const givens = typed(0.333, 0.333, 0.333).map((given) => ({ ...given, halfWidth: 0.0005 }))
    const result = run({ ...three, givens: [...givens, flow('1', 100)] })
    expect(result.conflicts).toEqual([])
    expect(cell(result, '1', 'massFraction', 'A')).toMatchObject({ state: 'given', value: 0.333 })
    expect(cell(result, '1', 'componentFlow', 'A').value).toBeCloseTo(100 / 3, 9)
  })

  it('scaled, or one by difference, where the person says so', () => {
    const streams = (fractions: NonNullable<Problem['streams'][number]['fractions']>): Problem['streams'] => [
      { id: '1', fractions },
      { id: '2' },
      { id: '3' },
    ]
    const scaled = run({ ...three, streams: streams('scale'), givens: [...typed(0.5, 0.3, 0.3), flow('1', 110)] })
    expect(scaled.conflicts).toEqual([])
    expect(cell(scaled, '1', 'componentFlow', 'A').value).toBeCloseTo(50, 10)
    const difference = run({
      ...three,
      streams: streams({ difference: 'C' }),
      givens: [...typed(0.5, 0.3, 0.3), flow('1', 100)],
    })
    expect(difference.conflicts).toEqual([])
    expect(cell(difference, '1', 'massFraction', 'C').value).toBeCloseTo(0.2, 12)
  })
})

describe('what does not agree', () => {
  const loop: Partial<Problem> = { givens: [flow('1', 100), flow('2', 30), flow('3', 75)] }

  it('names the smallest set, what the others imply and by how much, and keeps the rest', () => {
    const result = run({ ...loop, givens: [...(loop.givens as Given[]), share('1', 'A', 0.5)] })
    expect(result.conflicts).toHaveLength(1)
    expect(result.conflicts[0]).toMatchObject({ boundary: ['U'], code: 'balance', relations: [] })
    expect(result.conflicts[0]?.givens.map(({ stream, by }) => [stream, by])).toEqual([
      ['1', -5],
      ['2', 5],
      ['3', 5],
    ])
    expect(result.summary.atOdds).toBe(3)
    expect(cell(result, '1', 'massFraction', 'B')).toMatchObject({ state: 'solvable', value: 0.5 })
    expect(cell(result, '1', 'componentFlow', 'A')).toMatchObject({ state: 'unknown', blockedBy: [0] })
  })

  it.each([[[10, 10.08, 10.16]], [[10.16, 10, 10.08]], [[10.08, 10.16, 10]]])(
    'three meters with half-width 0.05 that cannot agree: the same verdict in every order (%j)',
    (values) => {
      const result = run({
        givens: values.map((value, k) => flow('1', value, { halfWidth: 0.05, instrument: `FT-${k}` })),
      })
      expect(result.conflicts.map(({ givens }) => givens.map(({ typed }) => typed).sort((a, b) => a - b))).toEqual([
        [10, 10.16],
      ])
      expect(state(result, '1', 'flow')).toBe('atOdds')
    },
  )

  it('values within their half-widths agree, and other cells take the compromise', () => {
    const result = run({
      givens: [
        flow('1', 100, { halfWidth: 0.5 }),
        flow('2', 30, { halfWidth: 0.5 }),
        flow('3', 70.6, { halfWidth: 0.5 }),
      ],
    })
    expect(result.conflicts).toEqual([])
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'given', value: 100 })
  })

  it('two compositions of one stream without any flow are at odds, not a flow of 0', () => {
    const result = run({
      streams: [{ id: '1' }, { id: '2' }],
      links: { U: { 1: 'in', 2: 'out' } },
      givens: [share('1', 'A', 0.5), share('2', 'A', 0.4)],
    })
    expect(result.conflicts).toHaveLength(1)
    expect(result.conflicts[0]?.code).toBe('forcedZero')
    expect(state(result, '1', 'massFraction', 'A')).toBe('atOdds')
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'unknown' })
    expect(cell(result, '1', 'flow').value).toBeUndefined()
  })

  it('a rule can be a member', () => {
    const result = run({
      givens: [flow('1', 100), flow('2', 30)],
      relations: [{ id: 'Q', kind: 'flowRatio', stream: '2', of: '1', value: 0.4 }],
    })
    expect(result.conflicts[0]?.relations[0]).toMatchObject({ id: 'Q', typed: 0.4 })
    expect(result.conflicts[0]?.relations[0]?.implied).toBeCloseTo(0.3, 12)
  })
})
