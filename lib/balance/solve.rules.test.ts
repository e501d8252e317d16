import { describe, expect, it } from 'vitest'
import type { Given, Problem } from './index'
import { cell, codes, flow, run, share, state } from './solve.fixture'

describe('splitters', () => {
  const splitter: Partial<Problem> = { units: [{ id: 'U', kind: 'splitter' }] }

  it('knows the outlets’ composition from the inlet', () => {
    const result = run({ ...splitter, givens: [flow('1', 100), share('1', 'A', 0.3), flow('2', 20)] })
    expect(cell(result, '3', 'componentFlow', 'A').value).toBeCloseTo(24, 10)
    expect(result.status).toBe('solved')
  })

  it('knows the composition of one outlet from another, with no flow at all', () => {
    const result = run({ ...splitter, givens: [share('2', 'A', 0.3)] })
    expect(cell(result, '3', 'massFraction', 'A').value).toBeCloseTo(0.3, 12)
    expect(cell(result, '1', 'massFraction', 'B').value).toBeCloseTo(0.7, 12)
  })

  it('uses a typed split for every component', () => {
    const result = run({
      ...splitter,
      givens: [flow('1', 100)],
      relations: [{ id: 'Q', kind: 'split', unit: 'U', stream: '2', value: 0.25 }],
    })
    expect(cell(result, '2', 'flow').value).toBeCloseTo(25, 12)
    expect(cell(result, '3', 'flow').value).toBeCloseTo(75, 12)
    expect(state(result, '2', 'massFraction', 'A')).toBe('unknown')
  })

  it('knows the split from two flows, and then each component', () => {
    const result = run({
      ...splitter,
      givens: [flow('2', 30), flow('3', 70), { stream: '2', quantity: 'componentFlow', component: 'A', value: 6 }],
    })
    expect(cell(result, '3', 'componentFlow', 'A').value).toBeCloseTo(14, 10)
    expect(result.status).toBe('solved')
  })

  it('says that it could not use a splitter of which neither is known, and claims nothing that hangs on it', () => {
    const result = run({
      ...splitter,
      givens: [flow('1', 100), flow('2', 40), { stream: '1', quantity: 'componentFlow', component: 'A', value: 30 }],
    })
    expect(result.status).toBe('solved')
    const open = run({
      ...splitter,
      givens: [flow('1', 100), { stream: '2', quantity: 'componentFlow', component: 'A', value: 10 }],
    })
    expect(codes(open)).toContain('splitterOpen')
    expect(state(open, '3', 'componentFlow', 'A')).toBe('unknown')
  })

  it('a component absent from one outlet is 0 in the others', () => {
    const result = run({
      ...splitter,
      streams: [{ id: '1' }, { id: '2', components: ['A'] }, { id: '3' }],
      givens: [flow('1', 10)],
    })
    expect(cell(result, '3', 'componentFlow', 'B')).toMatchObject({ state: 'solvable', value: 0 })
  })

  it('two compositions typed for its outlets are at odds', () => {
    const result = run({ ...splitter, givens: [flow('1', 100), share('2', 'A', 0.3), share('3', 'A', 0.4)] })
    expect(result.status).toBe('atOdds')
    expect(state(result, '2', 'massFraction', 'A')).toBe('atOdds')
    expect(state(result, '3', 'massFraction', 'A')).toBe('atOdds')
    expect(state(result, '2', 'flow')).toBe('unknown')
  })
})

describe('rules', () => {
  it('recovery, flow ratio and component ratio', () => {
    const result = run({
      givens: [flow('1', 100), share('1', 'A', 0.4)],
      relations: [
        { id: 'Q1', kind: 'recovery', unit: 'U', component: 'A', stream: '2', value: 0.9 },
        {
          id: 'Q2',
          kind: 'componentRatio',
          stream: '2',
          component: 'B',
          of: { stream: '2', component: 'A' },
          value: 0.5,
        },
      ],
    })
    expect(cell(result, '2', 'componentFlow', 'A').value).toBeCloseTo(36, 12)
    expect(cell(result, '2', 'componentFlow', 'B').value).toBeCloseTo(18, 12)
    expect(cell(result, '3', 'flow').value).toBeCloseTo(46, 12)
    const ratio = run({
      givens: [flow('1', 100)],
      relations: [{ id: 'Q', kind: 'flowRatio', stream: '2', of: '3', value: 4 }],
    })
    expect(cell(ratio, '2', 'flow').value).toBeCloseTo(80, 12)
  })

  it('a recovery from a feed of 0 is accepted and says nothing', () => {
    const result = run({
      givens: [flow('1', 0)],
      relations: [{ id: 'Q', kind: 'recovery', unit: 'U', component: 'A', stream: '2', value: 0.9 }],
    })
    expect(result.conflicts).toEqual([])
    expect(codes(result)).toContain('zeroInlet')
  })

  it('same composition of streams, once one is known', () => {
    const result = run({
      givens: [share('2', 'A', 0.2)],
      relations: [{ id: 'Q', kind: 'sameComposition', streams: ['2', '1'] }],
    })
    expect(cell(result, '1', 'massFraction', 'A').value).toBeCloseTo(0.2, 12)
  })

  it.each([
    ['flow("2") = 0.25 * flow("1")', 25],
    ['flow("2") / flow("1") = 1/4', 25],
    ['share("2", A) * flow("2") = 20 * 0.5', undefined],
    ['flow("2") + 10 = flow("3")', 45],
    ['flow("2")^1 = -(part("1", A) + part("1", B)) / -4', 25],
    ['flow("2") = k * flow("1")', 20],
  ])('formula %s', (text, expected) => {
    const result = run({
      givens: [flow('1', 100)],
      parameters: [{ id: 'k', value: 0.2 }],
      relations: [{ id: 'Q', kind: 'formula', text }],
    })
    expect(codes(result)).toEqual([])
    if (expected === undefined) expect(cell(result, '2', 'componentFlow', 'A').value).toBeCloseTo(10, 12)
    else expect(cell(result, '2', 'flow').value).toBeCloseTo(expected, 12)
  })

  it('a share equal to a multiple of another share of the same stream is linear; of another stream once it is known', () => {
    const same = run({ relations: [{ id: 'Q', kind: 'formula', text: 'share("2", A) = 3 * share("2", B)' }] })
    expect(cell(same, '2', 'massFraction', 'A').value).toBeCloseTo(0.75, 12)
    const text = 'share("2", A) = 3 * share("1", A)'
    expect(codes(run({ relations: [{ id: 'Q', kind: 'formula', text }] }))).toContain('ruleNotUsed')
    const known = run({ givens: [share('1', 'A', 0.2)], relations: [{ id: 'Q', kind: 'formula', text }] })
    expect(cell(known, '2', 'massFraction', 'A').value).toBeCloseTo(0.6, 12)
  })

  it('a free parameter is found where it follows, and passes a ratio on', () => {
    const result = run({
      streams: [{ id: '1' }, { id: '2' }, { id: '3' }, { id: '4' }, { id: '5' }],
      givens: [flow('1', 100), flow('2', 30), flow('4', 50)],
      parameters: [{ id: 'k' }],
      relations: [
        { id: 'Q1', kind: 'flowRatio', stream: '2', of: '1', value: { parameter: 'k' } },
        { id: 'Q2', kind: 'flowRatio', stream: '5', of: '4', value: { parameter: 'k' } },
      ],
    })
    expect(cell(result, '5', 'flow').value).toBeCloseTo(15, 12)
  })
})

describe('reactions', () => {
  const reactor: Partial<Problem> = {
    basis: 'mole',
    flowUnit: 'kmol/h',
    components: ['CH4', 'O2', 'CO2', 'H2O'].map((id) => ({ id, formula: id })),
    streams: [{ id: '1', components: ['CH4', 'O2'] }, { id: '2' }],
    units: [{ id: 'U', kind: 'reactor' }],
    links: { U: { 1: 'in', 2: 'out' } },
    reactions: [{ id: 'r', unit: 'U', stoichiometry: { CH4: -1, O2: -2, CO2: 1, H2O: 2 } }],
  }
  const fed: Given[] = [
    { stream: '1', quantity: 'componentFlow', component: 'CH4', value: 10 },
    { stream: '1', quantity: 'componentFlow', component: 'O2', value: 30 },
  ]

  it('by conversion, extent, yield, selectivity and excess', () => {
    const conversion = run({
      ...reactor,
      givens: fed,
      relations: [{ id: 'Q', kind: 'conversion', unit: 'U', component: 'CH4', value: 0.8 }],
    })
    expect(conversion.extents).toEqual([{ reaction: 'r', state: 'solvable', value: 8 }])
    expect(cell(conversion, '2', 'componentFlow', 'O2').value).toBeCloseTo(14, 12)
    const extent = run({ ...reactor, givens: fed, relations: [{ id: 'Q', kind: 'extent', reaction: 'r', value: 5 }] })
    expect(extent.extents).toEqual([{ reaction: 'r', state: 'given', value: 5 }])
    const yielded = run({
      ...reactor,
      givens: fed,
      relations: [{ id: 'Q', kind: 'yield', unit: 'U', product: 'CO2', from: 'CH4', value: 0.7 }],
    })
    expect(cell(yielded, '2', 'componentFlow', 'CO2').value).toBeCloseTo(7, 12)
    const excess = run({
      ...reactor,
      givens: fed.slice(0, 1),
      relations: [{ id: 'Q', kind: 'excess', unit: 'U', component: 'O2', reaction: 'r', limiting: 'CH4', value: 0.2 }],
    })
    expect(cell(excess, '1', 'componentFlow', 'O2').value).toBeCloseTo(24, 12)
  })

  it('elements give the same as extents', () => {
    const elements = run({
      ...reactor,
      reactions: [],
      units: [{ id: 'U', kind: 'reactor', balance: 'elements' }],
      givens: [...fed, { stream: '2', quantity: 'componentFlow', component: 'CH4', value: 2 }],
    })
    expect(cell(elements, '2', 'componentFlow', 'O2').value).toBeCloseTo(14, 12)
    expect(cell(elements, '2', 'componentFlow', 'H2O').value).toBeCloseTo(16, 12)
  })

  it('a product in no outlet holds the extent at 0', () => {
    const result = run({
      ...reactor,
      streams: [
        { id: '1', components: ['CH4', 'O2'] },
        { id: '2', components: ['CH4', 'O2', 'CO2'] },
      ],
      givens: fed,
    })
    expect(result.extents).toEqual([{ reaction: 'r', state: 'solvable', value: 0 }])
    expect(cell(result, '2', 'componentFlow', 'CO2')).toMatchObject({ state: 'solvable', value: 0 })
    expect(cell(result, '2', 'componentFlow', 'CH4').value).toBeCloseTo(10, 12)
  })

  it('on a mass basis, extents in kmol/h and mass closed exactly', () => {
    const result = run({
      ...reactor,
      basis: 'mass',
      flowUnit: 't/d',
      components: [
        { id: 'CH4', molarMass: 16.04 },
        { id: 'O2', molarMass: 32 },
        { id: 'CO2', molarMass: 44.01 },
        { id: 'H2O', molarMass: 18.02 },
      ],
      givens: [flow('1', 20.04), { stream: '1', quantity: 'componentFlow', component: 'CH4', value: 4 }],
      relations: [{ id: 'Q', kind: 'conversion', unit: 'U', component: 'CH4', value: 1 }],
    })
    expect(result.extents[0]?.value).toBeCloseTo(4000 / 16.04, 9)
    expect(cell(result, '2', 'flow').value).toBeCloseTo(20.04, 12)
    expect(codes(result)).toContain('massScaled')
  })

  it('dependent reactions leave an extent free that moves no cell', () => {
    const r = reactor.reactions?.[0] as NonNullable<Problem['reactions']>[number]
    const result = run({
      ...reactor,
      reactions: [r, { ...r, id: 'r2' }],
      givens: [...fed, { stream: '2', quantity: 'componentFlow', component: 'CH4', value: 2 }],
    })
    expect(result.status).toBe('solved')
    expect(result.summary).toMatchObject({ degreesOfFreedom: 1, extentFreedom: 1 })
    expect(result.extents.map((its) => its.state)).toEqual(['unknown', 'unknown'])
  })
})

describe('inventory', () => {
  it('of a component enters its balance; of the total only the total balance', () => {
    const linked: Partial<Problem> = { streams: [{ id: '1' }, { id: '2' }], links: { U: { 1: 'in', 2: 'out' } } }
    const component = run({
      ...linked,
      units: [{ id: 'U', kind: 'mixer', inventory: [{ component: 'A', value: 5 }] }],
      givens: [flow('1', 100), share('1', 'A', 0.5)],
    })
    expect(cell(component, '2', 'componentFlow', 'A').value).toBeCloseTo(45, 12)
    expect(cell(component, '2', 'flow').value).toBeCloseTo(95, 12)
    const total = run({
      ...linked,
      units: [{ id: 'U', kind: 'mixer', inventory: [{ value: 0.12, unit: 't/d' }] }],
      givens: [flow('1', 100), share('1', 'A', 0.5)],
    })
    expect(cell(total, '2', 'flow').value).toBeCloseTo(95, 12)
    expect(state(total, '2', 'componentFlow', 'A')).toBe('unknown')
  })
})
