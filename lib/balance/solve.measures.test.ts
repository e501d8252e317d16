import { describe, expect, it } from 'vitest'
import { CellState, type Given, type MeasureName, type Problem, solve } from './index'
import { book, cell, flow, run, share, state } from './solve.fixture'

const given = (stream: string, value: number, name: MeasureName, more: Partial<Given> = {}): Given => ({
  stream,
  value,
  ...name,
  ...more,
})

/** States and values of one wanted measure, by stream. */
function wanted(problem: Partial<Problem>, name: MeasureName): [state: number, value: number][] {
  const whole = book(problem)
  const { wanted: found } = solve(whole, [{ quantity: 'volumeFlow' }, name])
  if (!found) throw new Error('Nothing was answered')
  const n = whole.streams.length
  return whole.streams.map((_, s) => [found.states[n + s] as number, found.values[n + s] as number])
}

const { given: GIVEN, solvable: SOLVABLE, unknown: UNKNOWN, absent: ABSENT, atOdds: AT_ODDS } = CellState

/** A dryer: salts and water in, vapour of water alone and a product out. */
const dryer: Partial<Problem> = {
  components: [{ id: 'NaCl' }, { id: 'KCl' }, { id: 'Water' }],
  streams: [{ id: 'wet' }, { id: 'vapour', components: ['Water'] }, { id: 'product' }],
  links: { U: { wet: 'in', vapour: 'out', product: 'out' } },
}
const drySalt: MeasureName = { quantity: 'dryMassFraction', component: 'NaCl', without: ['Water'] }
const moisture: MeasureName = { quantity: 'dryMassFraction', component: 'Water', without: ['Water'] }

describe('fractions on a dry basis', () => {
  // By hand: 1 000 kg/h with 20 % water leave 800 dry, of which 75 % are 600; 5 % of 800 are 40 kg/h water in the product.
  const givens = [
    flow('wet', 1000),
    share('wet', 'Water', 0.2),
    given('wet', 75, drySalt, { unit: '%' }),
    given('product', 0.05, moisture, { unit: 'kg/kg' }),
  ]

  it('close a dryer, moisture per dry mass too', () => {
    const result = run({ ...dryer, givens })
    expect(result.status).toBe('solved')
    expect(cell(result, 'wet', 'componentFlow', 'NaCl').value).toBeCloseTo(600, 8)
    expect(cell(result, 'wet', 'componentFlow', 'KCl').value).toBeCloseTo(200, 8)
    expect(cell(result, 'product', 'flow').value).toBeCloseTo(840, 8)
    expect(cell(result, 'vapour', 'flow').value).toBeCloseTo(160, 8)
    expect(result.cells.every(({ quantity }) => !quantity.startsWith('dry'))).toBe(true)
  })

  it('are answered for every stream when asked for', () => {
    const [wet, vapour, product] = wanted({ ...dryer, givens }, drySalt)
    expect(wet).toEqual([GIVEN, 0.75])
    expect(vapour).toEqual([ABSENT, Number.NaN])
    expect(product?.[0]).toBe(SOLVABLE)
    expect(product?.[1]).toBeCloseTo(0.75, 10)
    expect(wanted({ ...dryer, givens: givens.slice(0, 2) }, drySalt)[0]?.[0]).toBe(UNKNOWN)
  })

  it('on moles: dry gas of 100 kmol/h with 25 of water', () => {
    const result = run({
      basis: 'mole',
      flowUnit: 'kmol/h',
      components: [{ id: 'CO2' }, { id: 'O2' }, { id: 'N2' }, { id: 'H2O' }],
      streams: [{ id: '1' }],
      units: [],
      links: {},
      givens: [
        given('1', 0.1, { quantity: 'dryMoleFraction', component: 'CO2', without: ['H2O'] }),
        given('1', 0.05, { quantity: 'dryMoleFraction', component: 'O2', without: ['H2O'] }),
        { stream: '1', quantity: 'moleFraction', component: 'H2O', value: 0.2 },
        { stream: '1', quantity: 'componentFlow', component: 'N2', value: 85 },
      ],
    })
    expect(cell(result, '1', 'flow').value).toBeCloseTo(125, 9)
    expect(cell(result, '1', 'componentFlow', 'CO2').value).toBeCloseTo(10, 9)
    expect(cell(result, '1', 'componentFlow', 'H2O').value).toBeCloseTo(25, 9)
  })

  it('of all dry components agree within rounding, and clash beyond it', () => {
    const third = (component: string, value: number): Given =>
      given('1', value, { quantity: 'dryMassFraction', component, without: ['W'] }, { halfWidth: 0.0005 })
    const with3 = (values: number[]): Partial<Problem> => ({
      components: [{ id: 'A' }, { id: 'B' }, { id: 'C' }, { id: 'W' }],
      streams: [{ id: '1' }],
      units: [],
      links: {},
      givens: [flow('1', 100), share('1', 'W', 0.1), ...['A', 'B', 'C'].map((id, k) => third(id, values[k] as number))],
    })
    const agrees = run(with3([0.333, 0.333, 0.333]))
    expect(agrees.conflicts).toEqual([])
    expect(cell(agrees, '1', 'componentFlow', 'A').value).toBeCloseTo(30, 6)
    const clashes = run(with3([0.333, 0.333, 0.3]))
    expect(clashes.conflicts).toHaveLength(1)
    expect(clashes.conflicts[0]).toMatchObject({ code: 'fractionSum', stream: '1' })
    expect(clashes.conflicts[0]?.givens[0]).toMatchObject({ quantity: 'dryMassFraction', without: ['W'] })
    expect(cell(clashes, '1', 'componentFlow', 'W').value).toBeCloseTo(10, 8)
    const dry: MeasureName = { quantity: 'dryMassFraction', component: 'A', without: ['W'] }
    expect(wanted(with3([0.333, 0.333, 0.3]), dry)[0]).toEqual([AT_ODDS, 0.333])
  })
})

/** A concentrator of chalcopyrite in quartz. */
const mill: Partial<Problem> = {
  flowUnit: 't/h',
  components: [
    { id: 'Ccp', formula: 'CuFeS2' },
    { id: 'Qz', formula: 'SiO2' },
  ],
  streams: [{ id: 'feed' }, { id: 'conc' }, { id: 'tail' }],
  links: { U: { feed: 'in', conc: 'out', tail: 'out' } },
}
const copper: MeasureName = { quantity: 'elementMassFraction', element: 'Cu' }
// Standard atomic weights: Cu 63.546, CuFeS2 183.511.
const COPPER = 63.546 / 183.511

describe('the assay of an element', () => {
  it('is the mass of it in all components, by their formulas', () => {
    const result = run({ ...mill, givens: [flow('feed', 100), given('feed', 2, copper, { unit: '%' })] })
    expect(cell(result, 'feed', 'massFraction', 'Ccp').value).toBeCloseTo(0.02 / COPPER, 12)
  })

  it('is the same in a book of moles', () => {
    const result = run({
      ...mill,
      basis: 'mole',
      flowUnit: 'kmol/h',
      givens: [flow('feed', 100), given('feed', 0.02, copper)],
    })
    expect(cell(result, 'feed', 'massFraction', 'Ccp').value).toBeCloseTo(0.02 / COPPER, 12)
  })

  it('is told where it follows, and has no value where a formula is missing', () => {
    const givens = [flow('feed', 100), share('feed', 'Ccp', 0.1), flow('conc', 20), share('conc', 'Ccp', 0.45)]
    const [feed, , tail] = wanted({ ...mill, givens }, copper)
    expect(feed?.[1]).toBeCloseTo(0.1 * COPPER, 12)
    expect(tail?.[1]).toBeCloseTo((1 / 80) * COPPER, 12)
    const bare = { ...mill, components: [{ id: 'Ccp', formula: 'CuFeS2' }, { id: 'Qz' }], givens }
    expect(wanted(bare, copper)[0]).toEqual([ABSENT, Number.NaN])
  })

  it('of 0 keeps every component that holds the element out', () => {
    const components = [
      { id: 'Ccp', formula: 'CuFeS2' },
      { id: 'Cv', formula: 'CuS' },
      { id: 'Qz', formula: 'SiO2' },
    ]
    const result = run({ ...mill, components, givens: [flow('tail', 50), given('tail', 0, copper)] })
    expect(cell(result, 'tail', 'componentFlow', 'Ccp').value).toBe(0)
    expect(cell(result, 'tail', 'componentFlow', 'Cv').value).toBe(0)
    expect(cell(result, 'tail', 'componentFlow', 'Qz').value).toBeCloseTo(50, 9)
  })
})

const slurry: Partial<Problem> = {
  components: [{ id: 'Ore' }, { id: 'Slag' }, { id: 'Water', molarMass: 18 }, { id: 'Acid', molarMass: 98 }],
  streams: [{ id: '1' }],
  units: [],
  links: {},
}
const liquidToSolid: MeasureName = {
  quantity: 'groupMassRatio',
  parts: ['Water', 'Acid'],
  over: ['Ore', 'Slag'],
}
const dissolved: MeasureName = { quantity: 'groupMassRatio', parts: ['Ore', 'Slag'] }

describe('ratios of groups', () => {
  it('liquid to solid: 3 to 1 of 100 kg/h, the acid 10 % of the liquid', () => {
    const result = run({
      ...slurry,
      givens: [
        flow('1', 100),
        given('1', 3, liquidToSolid),
        given('1', 0.1, { quantity: 'groupMassRatio', parts: ['Acid'], over: ['Acid', 'Water'] }),
        share('1', 'Ore', 0.2),
      ],
    })
    expect(cell(result, '1', 'componentFlow', 'Acid').value).toBeCloseTo(7.5, 9)
    expect(cell(result, '1', 'componentFlow', 'Water').value).toBeCloseTo(67.5, 9)
    expect(cell(result, '1', 'componentFlow', 'Slag').value).toBeCloseTo(5, 9)
  })

  it('over the whole stream, in ppm and moles', () => {
    const ppm = run({
      ...slurry,
      givens: [flow('1', 1e6), given('1', 250, dissolved, { unit: 'ppm' }), share('1', 'Ore', 0.0001)],
    })
    expect(cell(ppm, '1', 'componentFlow', 'Slag').value).toBeCloseTo(150, 6)
    // 98 kg of acid are 1 kmol, 36 kg of water 2 kmol.
    const moles = run({
      ...slurry,
      streams: [{ id: '1', components: ['Water', 'Acid'] }],
      givens: [flow('1', 134), given('1', 0.5, { quantity: 'groupMoleRatio', parts: ['Acid'], over: ['Water'] })],
    })
    expect(cell(moles, '1', 'componentFlow', 'Acid').value).toBeCloseTo(98, 8)
  })

  it('of 1 over all leaves none of the rest, and a whole over itself is 1', () => {
    const result = run({ ...slurry, givens: [flow('1', 100), given('1', 1, dissolved)] })
    expect(cell(result, '1', 'componentFlow', 'Water').value).toBe(0)
    expect(cell(result, '1', 'componentFlow', 'Acid').value).toBe(0)
    expect(state(result, '1', 'componentFlow', 'Ore')).toBe('unknown')
    expect(wanted({ ...slurry, givens: [] }, { ...dissolved, over: ['Slag', 'Ore'] })[0]).toEqual([SOLVABLE, 1])
    const none = wanted({ ...slurry, streams: [{ id: '1', components: ['Water'] }], givens: [] }, dissolved)
    expect(none[0]).toEqual([ABSENT, Number.NaN])
  })

  it('meet each other in a minimal conflict with what is implied', () => {
    const result = run({
      ...slurry,
      givens: [
        given('1', 3, liquidToSolid),
        given('1', 0.3, dissolved),
        { ...given('1', 0.25, dissolved, { instrument: 'probe' }), use: 'check' },
      ],
    })
    expect(result.status).toBe('atOdds')
    const [conflict] = result.conflicts
    expect(conflict?.givens).toHaveLength(2)
    const typed = conflict?.givens.find(({ over }) => over === undefined)
    expect(typed).toMatchObject({ quantity: 'groupMassRatio', parts: ['Ore', 'Slag'], typed: 0.3 })
    expect(typed?.implied).toBeCloseTo(0.25, 9)
  })
})

describe('several instruments and volume flow', () => {
  it('takes two belt weighers as two readings, at odds when they differ', () => {
    const result = run({ ...slurry, givens: [flow('1', 100), flow('1', 101, { instrument: 'belt' })] })
    expect(result.conflicts[0]?.givens.map(({ instrument }) => instrument)).toEqual([undefined, 'belt'])
  })

  it('answers volume flow by density, given or following', () => {
    const streams = [{ id: '1', density: 1250 }, { id: '2' }, { id: '3', density: 1000 }]
    const { wanted: found } = solve(
      book({ streams, givens: [{ stream: '1', quantity: 'volumeFlow', value: 8 }, flow('3', 500)] }),
      [{ quantity: 'volumeFlow' }],
    )
    expect([...(found?.states ?? [])]).toEqual([GIVEN, ABSENT, SOLVABLE])
    expect(found?.values[0]).toBe(8)
    expect(found?.values[2]).toBeCloseTo(0.5, 12)
  })
})
