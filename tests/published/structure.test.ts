import { describe, expect, it } from 'vitest'
import { type CountedBoundary, explain, overlapSentences, type Problem, solve } from '@/lib/balance'

/**
 * Degrees of freedom by the rules of Felder & Rousseau, Elementary Principles of Chemical Processes, 3rd ed.,
 * sections 4.3 to 4.7 (recounted), and independent reactions as the rank of the stoichiometric matrix.
 */
const book = (rest: Partial<Problem>): Problem => ({
  format: 'tallybrook/1',
  name: 'structure',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: ['A', 'B', 'C'].map((id) => ({ id })),
  streams: ['1', '2', '3'].map((id) => ({ id })),
  units: [],
  links: {},
  ...rest,
})

describe('degrees of freedom', () => {
  it('a mixer of three components: 9 flows less 3 balances (section 4.3)', () => {
    const { summary } = solve(
      book({ units: [{ id: 'M', kind: 'mixer' }], links: { M: { 1: 'in', 2: 'in', 3: 'out' } } }),
    )
    expect(summary.degreesOfFreedom).toBe(6)
  })

  it('a splitter of three components: 9 flows less 5 independent equations (section 4.5)', () => {
    const { summary } = solve(
      book({ units: [{ id: 'SP', kind: 'splitter' }], links: { SP: { 1: 'in', 2: 'out', 3: 'out' } } }),
    )
    expect(summary.degreesOfFreedom).toBe(4)
  })

  it('an evaporator whose vapour has one component (section 4.4)', () => {
    const { summary } = solve(
      book({
        components: [{ id: 'S' }, { id: 'W' }],
        streams: [{ id: 'F' }, { id: 'V', components: ['W'] }, { id: 'L' }],
        units: [{ id: 'EV', kind: 'separator' }],
        links: { EV: { F: 'in', V: 'out', L: 'out' } },
        givens: [
          { stream: 'F', quantity: 'flow', value: 100 },
          { stream: 'F', quantity: 'massFraction', component: 'S', value: 0.1 },
          { stream: 'L', quantity: 'massFraction', component: 'S', value: 0.4 },
        ],
      }),
    )
    expect(summary.degreesOfFreedom).toBe(0)
  })

  it('a column with only its overhead composition known is one specification short (Example 4.4-2)', () => {
    const { summary } = solve(
      book({
        components: ['A', 'M', 'W'].map((id) => ({ id })),
        streams: ['C', 'top', 'bot'].map((id) => ({ id })),
        units: [{ id: 'D', kind: 'separator' }],
        links: { D: { C: 'in', top: 'out', bot: 'out' } },
        givens: [
          { stream: 'C', quantity: 'componentFlow', component: 'A', value: 47.7 },
          { stream: 'C', quantity: 'componentFlow', component: 'M', value: 174.3 },
          { stream: 'C', quantity: 'componentFlow', component: 'W', value: 9.9 },
          { stream: 'top', quantity: 'massFraction', component: 'A', value: 0.97 },
          { stream: 'top', quantity: 'massFraction', component: 'M', value: 0.02 },
        ],
      }),
    )
    expect(summary.degreesOfFreedom).toBe(1)
  })

  const propane = {
    basis: 'mole',
    flowUnit: 'kmol/h',
    components: ['C3H8', 'C3H6', 'H2'].map((id) => ({ id, formula: id })),
    streams: [{ id: 'ri', components: ['C3H8', 'C3H6'] }, { id: 'ro' }],
    links: { RX: { ri: 'in', ro: 'out' } },
  } as const

  it('a reactor by one extent: 5 flows + 1 extent - 3 balances (Example 4.7-2)', () => {
    const { summary } = solve(
      book({
        ...(propane as unknown as Partial<Problem>),
        units: [{ id: 'RX', kind: 'reactor' }],
        reactions: [{ id: 'r1', unit: 'RX', stoichiometry: { C3H8: -1, C3H6: 1, H2: 1 } }],
      }),
    )
    expect(summary.degreesOfFreedom).toBe(3)
  })

  it('the same reactor by two atomic balances: 5 - 2', () => {
    const { summary } = solve(
      book({
        ...(propane as unknown as Partial<Problem>),
        units: [{ id: 'RX', kind: 'reactor', balance: 'elements' }],
      }),
    )
    expect(summary.degreesOfFreedom).toBe(3)
  })

  const independent = (species: string[], reactions: Record<string, number>[]): number => {
    const { summary } = solve(
      book({
        basis: 'mole',
        flowUnit: 'kmol/h',
        components: species.map((id) => ({ id, formula: id })),
        streams: ['in', 'out'].map((id) => ({ id })),
        units: [{ id: 'RX', kind: 'reactor' }],
        links: { RX: { in: 'in', out: 'out' } },
        reactions: reactions.map((stoichiometry, k) => ({ id: `r${k}`, unit: 'RX', stoichiometry })),
      }),
    )
    return reactions.length - summary.extentFreedom
  }

  it('three ethylene oxide reactions, two independent (section 4.7)', () => {
    expect(
      independent(
        ['C2H4', 'O2', 'C2H4O', 'CO2', 'H2O'],
        [
          { C2H4: -1, O2: -0.5, C2H4O: 1 },
          { C2H4: -1, O2: -3, CO2: 2, H2O: 2 },
          { C2H4O: -1, O2: -2.5, CO2: 2, H2O: 2 },
        ],
      ),
    ).toBe(2)
  })

  it('steam reforming with the shift reaction twice over, two independent', () => {
    expect(
      independent(
        ['CH4', 'H2O', 'CO', 'CO2', 'H2'],
        [
          { CH4: -1, H2O: -1, CO: 1, H2: 3 },
          { CH4: -1, H2O: -2, CO2: 1, H2: 4 },
          { CO: -1, H2O: -1, CO2: 1, H2: 1 },
        ],
      ),
    ).toBe(2)
  })
})

describe('boundaries', () => {
  const boundaryOf = (problem: Problem, unit: string): CountedBoundary => {
    const { boundaries } = explain(problem, solve(problem))
    return boundaries.find(({ units }) => units.join() === unit) as CountedBoundary
  }

  it('a mixer of three components has three independent balances (section 4.3)', () => {
    const mixer = book({ units: [{ id: 'M', kind: 'mixer' }], links: { M: { 1: 'in', 2: 'in', 3: 'out' } } })
    const { overlaps, ...counts } = boundaryOf(mixer, 'M')
    // Per stream a flow and three fractions; the fractions add up: 12 - 3 sums is the book's 9 flows.
    expect(counts).toEqual({
      units: ['M'],
      crossing: ['1', '2', '3'],
      unknowns: 12,
      balances: 3,
      sums: 3,
      rules: 0,
      degreesOfFreedom: 6,
      independent: 6,
      redundant: 0,
      over: false,
      status: 'short',
    })
    expect(overlaps).toEqual([])
  })

  it('a splitter of three components: five independent equations, four free (section 4.5)', () => {
    const splitter = book({ units: [{ id: 'SP', kind: 'splitter' }], links: { SP: { 1: 'in', 2: 'out', 3: 'out' } } })
    expect(boundaryOf(splitter, 'SP')).toMatchObject({ rules: 2, degreesOfFreedom: 4, independent: 8, redundant: 0 })
  })

  it('a splitter whose compositions are known keeps one of its balances (section 4.5)', () => {
    const typed = book({
      units: [{ id: 'SP', kind: 'splitter' }],
      links: { SP: { 1: 'in', 2: 'out', 3: 'out' } },
      givens: ['1', '2', '3'].flatMap((stream) =>
        [0.2, 0.3, 0.5].map((value, c) => ({
          stream,
          quantity: 'massFraction' as const,
          component: 'ABC'.charAt(c),
          value,
        })),
      ),
    })
    const boundary = boundaryOf(typed, 'SP')
    expect(boundary).toMatchObject({ unknowns: 3, balances: 3, sums: 0, rules: 2, independent: 1, redundant: 4 })
    expect(overlapSentences(boundary.overlaps).join(' ')).toMatch(/B balance/)
  })

  it('an evaporator whose vapour has one component: two balances, and it can be worked (section 4.4)', () => {
    const evaporator = book({
      components: [{ id: 'S' }, { id: 'W' }],
      streams: [{ id: 'F' }, { id: 'V', components: ['W'] }, { id: 'L' }],
      units: [{ id: 'EV', kind: 'separator' }],
      links: { EV: { F: 'in', V: 'out', L: 'out' } },
      givens: [
        { stream: 'F', quantity: 'flow', value: 100 },
        { stream: 'F', quantity: 'massFraction', component: 'S', value: 0.1 },
        { stream: 'L', quantity: 'massFraction', component: 'S', value: 0.4 },
      ],
    })
    expect(boundaryOf(evaporator, 'EV')).toMatchObject({
      balances: 2,
      degreesOfFreedom: 0,
      redundant: 0,
      status: 'ready',
    })
  })

  it('a reactor counts its extent, and by elements its atomic balances (Example 4.7-2)', () => {
    const by = (balance: 'components' | 'elements'): CountedBoundary =>
      boundaryOf(
        book({
          basis: 'mole',
          flowUnit: 'kmol/h',
          components: ['C3H8', 'C3H6', 'H2'].map((id) => ({ id, formula: id })),
          streams: [{ id: 'ri', components: ['C3H8', 'C3H6'] }, { id: 'ro' }],
          links: { RX: { ri: 'in', ro: 'out' } },
          units: [{ id: 'RX', kind: 'reactor', balance }],
          ...(balance === 'components' && {
            reactions: [{ id: 'r1', unit: 'RX', stoichiometry: { C3H8: -1, C3H6: 1, H2: 1 } }],
          }),
        }),
        'RX',
      )
    expect(by('components')).toMatchObject({ unknowns: 8, balances: 3, sums: 2, degreesOfFreedom: 3, independent: 5 })
    expect(by('elements')).toMatchObject({ unknowns: 7, balances: 2, sums: 2, degreesOfFreedom: 3, independent: 4 })
  })
})
