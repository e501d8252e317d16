import { describe, expect, it } from 'vitest'
import type { Given, Problem, Result } from '../index'
import { cell, codes, flow, run, share, state } from '../solve.fixture'

const part = (stream: string, component: string, value: number): Given => ({
  stream,
  quantity: 'componentFlow',
  component,
  value,
})

/** Feed 1 and recycle 6 are mixed to 2; S makes product 3 and 4; P splits 4 into purge 5 and recycle 6. Invented. */
const feed = { A: 40, B: 20, C: 40 }
const recovered = { A: 0.8, B: 0.4, C: 0.05 }
const recycle: Partial<Problem> = {
  components: [{ id: 'A' }, { id: 'B' }, { id: 'C' }],
  streams: ['1', '2', '3', '4', '5', '6'].map((id) => ({ id })),
  units: [
    { id: 'M', kind: 'mixer' },
    { id: 'S', kind: 'separator' },
    { id: 'P', kind: 'splitter' },
  ],
  links: { M: { 1: 'in', 6: 'in', 2: 'out' }, S: { 2: 'in', 3: 'out', 4: 'out' }, P: { 4: 'in', 5: 'out', 6: 'out' } },
  relations: Object.entries(recovered).map(([component, value]) => ({
    id: `Q${component}`,
    kind: 'recovery',
    unit: 'S',
    component,
    stream: '3',
    value,
  })),
}
const fed: Given[] = Object.entries(feed).map(([component, value]) => part('1', component, value))

/** Flow of a component in the product where the part r of 4 is recycled. */
const product = (component: keyof typeof feed, r: number): number =>
  (feed[component] * recovered[component]) / (1 - r * (1 - recovered[component]))
const productShare = (component: keyof typeof feed, r: number): number =>
  product(component, r) / (product('A', r) + product('B', r) + product('C', r))

/** The split between low and high at which the product has this share of B, by halving. */
function splitFor(wanted: number, low: number, high: number): number {
  const rises = productShare('B', high) > productShare('B', low)
  for (let k = 0; k < 200; k++) {
    const middle = (low + high) / 2
    if (productShare('B', middle) < wanted === rises) low = middle
    else high = middle
  }
  return (low + high) / 2
}

const valuesOf = (result: Result, stream: string, quantity: string, component?: string): number[] | undefined =>
  result.roots?.cells.find((its) => its.stream === stream && its.quantity === quantity && its.component === component)
    ?.values

describe('a recycle with one unknown split', () => {
  it('and a product specification that two splits meet: both are reported, only what they share is known', () => {
    const wanted = 0.2201
    const result = run({ ...recycle, givens: [...fed, share('3', 'B', wanted)] })
    const splits = [splitFor(wanted, 0.2, 0.7), splitFor(wanted, 0.95, 0.999)] as const
    expect(splits[0]).toBeCloseTo(0.44, 2)
    expect(splits[1]).toBeCloseTo(0.98, 2)
    for (const component of ['A', 'B', 'C'] as const) {
      const found = valuesOf(result, '3', 'componentFlow', component) as number[]
      const expected = splits.map((r) => product(component, r)).sort((a, b) => a - b)
      expect(found).toHaveLength(2)
      found.forEach((value, k) => {
        expect(value).toBeCloseTo(expected[k] as number, 9)
      })
    }
    expect(state(result, '6', 'flow')).toBe('unknown')
    expect(state(result, '3', 'massFraction', 'A')).toBe('unknown')
    expect(cell(result, '1', 'flow')).toMatchObject({ state: 'solvable', value: 100 })
    expect(result.summary.degreesOfFreedom).toBe(0)
    expect(codes(result)).toContain('severalRoots')
    expect(codes(result)).not.toContain('splitterOpen')
  })

  it('one more value chooses between the two', () => {
    const result = run({ ...recycle, givens: [...fed, share('3', 'B', 0.2201), flow('3', 60, { use: 'check' })] })
    expect(result.roots).toBeDefined()
    const r = splitFor(0.2201, 0.95, 0.999)
    const chosen = run({
      ...recycle,
      givens: [...fed, share('3', 'B', 0.2201)],
      relations: [...(recycle.relations ?? []), { id: 'X', kind: 'split', unit: 'P', stream: '6', value: r }],
    })
    expect(chosen.roots).toBeUndefined()
    expect(cell(chosen, '3', 'componentFlow', 'C').value).toBeCloseTo(product('C', r), 6)
  })

  it('and a specification that one split meets: everything is known', () => {
    const result = run({ ...recycle, givens: [...fed, share('3', 'A', productShare('A', 0.75))] })
    expect(result.status).toBe('solved')
    expect(result.roots).toBeUndefined()
    expect(codes(result)).toEqual([])
    expect(cell(result, '3', 'componentFlow', 'C').value).toBeCloseTo(product('C', 0.75), 9)
    expect(cell(result, '6', 'flow').flags ?? []).not.toContain('localOnly')
  })

  it('without any flow typed: all fractions are known, the scale is free', () => {
    const result = run({
      ...recycle,
      givens: [share('1', 'A', 0.4), share('1', 'B', 0.2), share('3', 'A', productShare('A', 0.75))],
    })
    expect(cell(result, '3', 'massFraction', 'C').value).toBeCloseTo(productShare('C', 0.75), 9)
    expect(cell(result, '5', 'massFraction', 'B')).toMatchObject({ state: 'solvable' })
    expect(state(result, '3', 'flow')).toBe('unknown')
    expect(result.summary).toMatchObject({ degreesOfFreedom: 1, freeScale: [['1', '2', '3', '4', '5', '6']] })
  })

  it('a purge held by what may build up', () => {
    // The part of C in what enters S falls with the purge.
    const r = 0.9
    const into = (c: keyof typeof feed): number => feed[c] / (1 - r * (1 - recovered[c]))
    const result = run({
      ...recycle,
      givens: [...fed, share('2', 'C', into('C') / (into('A') + into('B') + into('C')))],
    })
    expect(result.status).toBe('solved')
    expect((cell(result, '6', 'flow').value as number) / (cell(result, '4', 'flow').value as number)).toBeCloseTo(r, 10)
  })

  it('a specification that no split meets: said so, nothing claimed', () => {
    const result = run({ ...recycle, givens: [...fed, share('3', 'B', 0.4)] })
    expect(codes(result)).toContain('noRoot')
    expect(state(result, '3', 'flow')).toBe('unknown')
    expect(state(result, '6', 'massFraction', 'B')).toBe('unknown')
  })

  it('a specification that is just reached: two splits have come together, and what hangs on them is marked', () => {
    let best = 0.8
    for (let step = 0.05; step > 1e-12; step /= 2)
      for (const r of [best - step, best + step]) if (productShare('B', r) > productShare('B', best)) best = r
    const result = run({ ...recycle, givens: [...fed, share('3', 'B', productShare('B', best))] })
    const found = cell(result, '3', 'componentFlow', 'C')
    expect(found.state).toBe('solvable')
    expect(found.value).toBeCloseTo(product('C', best), 4)
    expect(found.flags).toContain('amplified')
    const below = run({ ...recycle, givens: [...fed, share('3', 'B', productShare('B', best) - 1e-6)] })
    expect(valuesOf(below, '3', 'componentFlow', 'C')).toHaveLength(2)
    const above = run({ ...recycle, givens: [...fed, share('3', 'B', productShare('B', best) + 1e-5)] })
    expect(codes(above)).toContain('noRoot')
  })
})

describe('other rules that multiply unknowns', () => {
  const two: Partial<Problem> = {
    streams: ['1', '2', '3', '4'].map((id) => ({ id })),
    units: [{ id: 'U', kind: 'mixer' }],
    links: { U: { 1: 'in', 2: 'in', 3: 'out' } },
  }

  it('a product of two unknown shares', () => {
    // 100 of share x and 50 of share y make 150 with 60 of A; x y = 0.16 is met by 0.2 with 0.8 and by 0.4 with 0.4.
    const given = (product: number): Result =>
      run({
        ...two,
        givens: [flow('1', 100), flow('2', 50), part('3', 'A', 60)],
        relations: [{ id: 'Q', kind: 'formula', text: `share("1", A) * share("2", A) = ${product}` }],
      })
    const several = given(0.16)
    for (const [stream, expected] of [
      ['1', [0.2, 0.4]],
      ['2', [0.4, 0.8]],
    ] as const)
      valuesOf(several, stream, 'massFraction', 'A')?.forEach((value, k) => {
        expect(value).toBeCloseTo(expected[k] as number, 9)
      })
    expect(valuesOf(several, '1', 'massFraction', 'A')).toHaveLength(2)
    // 100 x squared - 60 x + 2 = 0 has a second root at which y would be above 1.
    const one = given(0.04)
    expect(one.roots).toBeUndefined()
    expect(cell(one, '1', 'massFraction', 'A').value).toBeCloseTo((60 + Math.sqrt(3600 - 800)) / 200, 9)
  })

  it('a free parameter shared by two recoveries', () => {
    // Both separators keep the same part p of A: 100 A in, 100 p, then 100 (1 - p) p; the second catch is 21.
    const result = run({
      streams: ['1', '2', '3', '4', '5'].map((id) => ({ id })),
      units: [
        { id: 'U', kind: 'separator' },
        { id: 'V', kind: 'separator' },
      ],
      links: { U: { 1: 'in', 2: 'out', 3: 'out' }, V: { 3: 'in', 4: 'out', 5: 'out' } },
      givens: [part('1', 'A', 100), part('4', 'A', 21)],
      parameters: [{ id: 'p' }],
      relations: [
        { id: 'Q1', kind: 'recovery', unit: 'U', component: 'A', stream: '2', value: { parameter: 'p' } },
        { id: 'Q2', kind: 'recovery', unit: 'V', component: 'A', stream: '4', value: { parameter: 'p' } },
      ],
    })
    const first = valuesOf(result, '2', 'componentFlow', 'A') as number[]
    expect(first).toHaveLength(2)
    expect(first[0]).toBeCloseTo(30, 9)
    expect(first[1]).toBeCloseTo(70, 9)
    // 100 (1 - p) squared is left: 49 or 9.
    expect(valuesOf(result, '5', 'componentFlow', 'A')?.map((value) => Math.round(value * 1e6) / 1e6)).toEqual([9, 49])
    expect(cell(result, '4', 'componentFlow', 'A')).toMatchObject({ state: 'given', value: 21 })
  })

  it('a multiple of another unknown share', () => {
    // 100 of share x and 50 of share 2 x make 150 with 60 of A.
    const result = run({
      ...two,
      givens: [flow('1', 100), flow('2', 50), part('3', 'A', 60)],
      relations: [{ id: 'Q', kind: 'formula', text: 'share("2", A) = 2 * share("1", A)' }],
    })
    expect(result.status).not.toBe('atOdds')
    expect(cell(result, '1', 'massFraction', 'A').value).toBeCloseTo(0.3, 10)
    expect(cell(result, '2', 'massFraction', 'B').value).toBeCloseTo(0.4, 10)
  })

  it('the same composition of two streams of which neither is known', () => {
    // 40 A and 60 B are parted between 1 (which gives up half of its A first) and 2.
    const result = run({
      streams: ['1', '2', '3', '4', '5'].map((id) => ({ id })),
      units: [
        { id: 'U', kind: 'separator' },
        { id: 'V', kind: 'separator' },
      ],
      links: { U: { 1: 'in', 2: 'out', 3: 'out' }, V: { 2: 'in', 4: 'out', 5: 'out' } },
      givens: [part('1', 'A', 40), part('1', 'B', 60), part('3', 'A', 15), part('4', 'A', 10)],
      relations: [
        { id: 'Q1', kind: 'sameComposition', streams: ['3', '4'] },
        { id: 'Q2', kind: 'formula', text: 'part("3", B) * part("4", B) = 54' },
      ],
    })
    expect(cell(result, '3', 'componentFlow', 'B').value).toBeCloseTo(9, 9)
    expect(cell(result, '4', 'componentFlow', 'B').value).toBeCloseTo(6, 9)
  })

  it('powers and quotients', () => {
    const result = run({
      ...two,
      givens: [flow('3', 100)],
      relations: [{ id: 'Q', kind: 'formula', text: 'flow("1")^2 / flow("2") = 90' }],
    })
    // x^2 = 90 (100 - x)
    const x = (-90 + Math.sqrt(90 ** 2 + 4 * 9000)) / 2
    expect(cell(result, '1', 'flow').value).toBeCloseTo(x, 9)
    expect(cell(result, '2', 'flow').value).toBeCloseTo(100 - x, 9)
  })

  it('two unknown splits that only together are determined: found by a search, and marked so', () => {
    const loops: Partial<Problem> = {
      ...recycle,
      streams: ['1', '2', '3', '4', '5', '6', '7', '8'].map((id) => ({ id })),
      units: [...(recycle.units ?? []), { id: 'R', kind: 'splitter' }],
      links: {
        M: { 1: 'in', 6: 'in', 8: 'in', 2: 'out' },
        S: { 2: 'in', 3: 'out', 4: 'out' },
        P: { 4: 'in', 5: 'out', 6: 'out' },
        R: { 3: 'in', 7: 'out', 8: 'out' },
      },
    }
    // Truth: half of 4 and a quarter of 3 are sent back.
    const into = (c: keyof typeof feed): number => feed[c] / (1 - 0.5 * (1 - recovered[c]) - 0.25 * recovered[c])
    const sum = (of: (c: keyof typeof feed) => number): number => of('A') + of('B') + of('C')
    const result = run({
      ...loops,
      givens: [
        ...fed,
        flow('2', sum(into)),
        flow(
          '3',
          sum((c) => recovered[c] * into(c)),
        ),
      ],
    })
    const found = cell(result, '7', 'componentFlow', 'C')
    expect(found.value).toBeCloseTo(0.75 * recovered.C * into('C'), 6)
    expect(found.flags).toContain('localOnly')
    expect(codes(result)).toContain('localOnly')
    expect(result.summary.degreesOfFreedom).toBe(0)
  })
})

describe('degrees of freedom at a generic solution', () => {
  it('count what an open splitter and an open formula take', () => {
    // Three streams of two components, two balances, equal compositions: 6 - 2 - 1.
    const splitter = run({ units: [{ id: 'U', kind: 'splitter' }] })
    expect(splitter.summary.degreesOfFreedom).toBe(3)
    const formula = run({ relations: [{ id: 'Q', kind: 'formula', text: 'share("2", A) = 3 * share("3", A)' }] })
    expect(formula.summary.degreesOfFreedom).toBe(3)
  })
})
