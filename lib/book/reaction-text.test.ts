import { describe, expect, it } from 'vitest'
import { apply } from './change'
import { setReactionText } from './edits/reactions'
import { fromProblem } from './from-problem'
import { reactionText, readReaction } from './reaction-text'
import { inOrder, stateOf } from './state'

const component = (tag: string, formula: string | null = tag, name = '') => ({ id: `c-${tag}`, tag, name, formula })
const gas = [
  component('H2'),
  component('O2'),
  component('Steam', 'H2O', 'Water vapour'),
  component('CH4'),
  component('CO2'),
  component('2-EH', 'C8H18O', '2-Ethylhexanol'),
  component('Tar', null),
]

const read = (text: string, components = gas): Record<string, number> | string => {
  const found = readReaction(text, components)
  if (!found.ok) return found.what
  return Object.fromEntries(found.coefficients.map(({ componentId, value }) => [componentId.slice(2), value]))
}

describe('a reaction typed as text', () => {
  it.each<[string, Record<string, number>]>([
    ['2 H2 + O2 -> 2 H2O', { H2: -2, O2: -1, Steam: 2 }],
    ['2H2+O2=2Steam', { H2: -2, O2: -1, Steam: 2 }],
    ['H2 + 1/2 O2 → Water vapour', { H2: -1, O2: -0.5, Steam: 1 }],
    ['H2 + 0.5 O2 --> Steam', { H2: -1, O2: -0.5, Steam: 1 }],
    ['H2 + 0,5 O2 <=> water vapour', { H2: -1, O2: -0.5, Steam: 1 }],
    ['CH4 + 2 O2 → CO2 + 2 OH2', { CH4: -1, O2: -2, CO2: 1, Steam: 2 }],
    ['2-EH + 12 O2 -> 8 CO2 + 9 Steam', { '2-EH': -1, O2: -12, CO2: 8, Steam: 9 }],
    ['2 2-EH + 24 O2 -> 16 CO2 + 18 H2O', { '2-EH': -2, O2: -24, CO2: 16, Steam: 18 }],
    ['CH4 -> Tar + H2', { CH4: -1, Tar: 1, H2: 1 }],
    ['H2 + H2 + O2 -> 2 H2O', { H2: -2, O2: -1, Steam: 2 }],
  ])('%s', (text, coefficients) => {
    expect(read(text)).toEqual(coefficients)
  })

  it.each<[string, string]>([
    ['H2 + O2', 'Write what is consumed, one arrow, and what is formed: 2 H2 + O2 -> 2 H2O.'],
    ['H2 -> O2 -> H2O', 'Write what is consumed, one arrow, and what is formed: 2 H2 + O2 -> 2 H2O.'],
    ['-> H2O', 'Nothing stands before the arrow.'],
    ['H2 ->', 'Nothing stands after the arrow.'],
    ['H2 + -> H2O', 'A plus sign has nothing beside it.'],
    [
      'H2 + Cl2 -> 2 HCl',
      '“Cl2” is no component of this book, by tag, formula or name: add it first, or mend the spelling.',
    ],
    ['H2 -> H2', 'The same stands on both sides: nothing reacts.'],
    ['H2 + O2 -> H2O', 'It does not balance: off in O by 1 (more consumed than formed).'],
    [
      'CH4 + O2 -> CO2 + H2O',
      'It does not balance: off in H by 2 (more consumed than formed) and in O by 1 (more formed than consumed).',
    ],
    ['1/0 H2 + O2 -> H2O', '“1/0 H2”: a coefficient is more than 0.'],
  ])('%s is refused', (text, what) => {
    expect(read(text)).toBe(what)
  })

  it('is written back as it can be read', () => {
    const found = readReaction('1/2 O2 + H2 -> H2O', gas)
    const text = reactionText(found.ok ? found.coefficients : [], gas)
    expect(text).toBe('H2 + 0.5 O2 -> Steam')
    expect(read(text)).toEqual({ H2: -1, O2: -0.5, Steam: 1 })
    expect(reactionText([], gas)).toBe('')
  })
})

describe('setting a reaction by its text', () => {
  it('replaces its coefficients in one change, clears them, and refuses what does not balance', () => {
    let count = 0
    const makeId = () => `id-${++count}`
    const problem = {
      format: 'tallybrook/1' as const,
      name: 'Burner',
      basis: 'mole' as const,
      flowUnit: 'kmol/h',
      components: ['H2', 'O2', 'H2O', 'CH4', 'CO2'].map((id) => ({ id, formula: id })),
      streams: [{ id: '1' }],
      units: [{ id: 'R', kind: 'reactor' as const }],
      links: {},
      reactions: [{ id: 'r1', unit: 'R', stoichiometry: { H2: -2, O2: -1, H2O: 2 } }],
    }
    let state = stateOf(fromProblem(problem, makeId))
    const id = inOrder(state.reaction)[0]?.id ?? ''
    const said = () => {
      const text = reactionText([...state.coefficient.values()], inOrder(state.component))
      return text
    }
    const type = (text: string) => {
      const made = setReactionText(state, id, text, makeId)
      if (!made.ok) return made.error
      const applied = apply(state, made.value)
      if (!applied.ok) throw new Error('does not apply')
      state = applied.state
      return made.value.label
    }
    expect(type('CH4 + 2 O2 = CO2 + 2 H2O')).toBe('Reaction r1: CH4 + 2 O2 = CO2 + 2 H2O')
    expect(said()).toBe('2 O2 + CH4 -> 2 H2O + CO2')
    expect(type('CH4 + O2 -> CO2 + 2 H2O')).toContain('off in O by 2')
    expect(said()).toBe('2 O2 + CH4 -> 2 H2O + CO2')
    type('')
    expect(state.coefficient.size).toBe(0)
  })
})
