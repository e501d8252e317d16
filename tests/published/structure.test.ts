import { describe, expect, it } from 'vitest'
import { type Problem, solve } from '@/lib/balance'

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
