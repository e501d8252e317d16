import { describe, expect, it } from 'vitest'
import { parseProblem, problemJsonSchema } from './problem-file'

type Json = Record<string, unknown>
const good = (): Json => ({
  format: 'tallybrook/1',
  name: 'test',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [
    { id: 'A', molarMass: 20 },
    { id: 'B' },
    { id: 'H2', formula: 'H2' },
    { id: 'O2', formula: 'O2' },
    { id: 'H2O', formula: 'H2O' },
  ],
  streams: [{ id: '1' }, { id: '2' }, { id: '3', components: ['A', 'H2'] }],
  units: [
    { id: 'U', kind: 'splitter' },
    { id: 'R', kind: 'reactor' },
  ],
  links: { U: { 1: 'in', 2: 'out' }, R: { 2: 'in', 3: 'out' } },
  reactions: [{ id: 'r', unit: 'R', stoichiometry: { H2: -2, O2: -1, H2O: 2 } }],
  parameters: [{ id: 'k', value: 0.5 }],
  givens: [{ stream: '1', quantity: 'flow', value: 100 }],
  relations: [],
})
const given = (more: Json): Json => ({ givens: [{ stream: '1', quantity: 'flow', value: 1, ...more }] })
const rule = (more: Json): Json => ({ relations: [{ id: 'Q', ...more }] })

/** What is refused, as "path: what". */
function refusals(change: Json): string[] {
  const parsed = parseProblem({ ...good(), ...change })
  return parsed.ok ? [] : parsed.problems.map(({ path, what }) => `${path}: ${what}`)
}

describe('a good file', () => {
  it('is taken as it is', () => {
    const parsed = parseProblem(good())
    expect(parsed).toEqual({ ok: true, problem: good() })
  })

  it.each([
    [
      'a value of 0 on an absent component',
      given({ stream: '3', quantity: 'componentFlow', component: 'B', value: 0 }),
    ],
    ['fractions in %, ppm, g/kg, mg/kg', given({ quantity: 'massFraction', component: 'A', unit: 'mg/kg' })],
    [
      'a dry fraction in %, of a component that it leaves out too',
      given({ quantity: 'dryMassFraction', component: 'H2O', without: ['H2O'], unit: '%' }),
    ],
    [
      'the assay of an element where every formula is known',
      {
        streams: [{ id: '1' }, { id: '2' }, { id: '3', components: ['H2', 'H2O'] }],
        ...given({ stream: '3', quantity: 'elementMassFraction', element: 'H', unit: 'ppm' }),
      },
    ],
    ['a group over all', given({ quantity: 'groupMassRatio', parts: ['A', 'B'], unit: 'mg/kg' })],
    ['a group over another', given({ quantity: 'groupMassRatio', parts: ['A'], over: ['B', 'H2'], value: 3 })],
    ['0 of a group that cannot be there', given({ stream: '3', quantity: 'groupMassRatio', parts: ['B'], value: 0 })],
    ['a rate in another unit', given({ unit: 't/d' })],
    ['a split by a parameter', rule({ kind: 'split', unit: 'U', stream: '2', value: { parameter: 'k' } })],
    ['a formula with quoted ids', rule({ kind: 'formula', text: 'flow("1") = k * flow("2") + part("3", A)' })],
  ])('accepts %s', (_, change) => {
    expect(refusals(change)).toEqual([])
  })
})

describe('measures with keys of their own, refused', () => {
  const dry = { quantity: 'dryMassFraction', component: 'A' }
  const assay = { quantity: 'elementMassFraction', element: 'H' }
  const group = { quantity: 'groupMassRatio', parts: ['A'] }
  it.each<[string, Json, string]>([
    ['a missing list', given(dry), 'givens.0.without: dryMassFraction needs the components that it leaves out'],
    [
      'a missing component',
      given({ quantity: 'dryMoleFraction', without: ['B'] }),
      'givens.0.component: dryMoleFraction needs a component',
    ],
    [
      'a missing element',
      given({ quantity: 'elementMassFraction' }),
      'givens.0.element: elementMassFraction needs an element',
    ],
    [
      'a missing group',
      given({ quantity: 'groupMassRatio' }),
      'givens.0.parts: groupMassRatio needs a group of components',
    ],
    ['an empty group', given({ ...group, parts: [] }), 'givens.0.parts: must hold at least 1 entries'],
    [
      'a key of another measure',
      given({ ...group, element: 'H' }),
      'givens.0.element: groupMassRatio takes no "element": leave it out',
    ],
    ['a key on a plain measure', given({ over: ['A'] }), 'givens.0.over: flow takes no "over": leave it out'],
    [
      'an unknown component of a list',
      given({ ...dry, without: ['B', 'X'] }),
      'givens.0.without.1: "X" is no component',
    ],
    ['a component twice', given({ ...group, parts: ['A', 'A'] }), 'givens.0.parts.1: "A" is listed twice'],
    [
      'an unknown element',
      given({ ...assay, element: 'Xx' }),
      'givens.0.element: "Xx" is no element known here, such as Cu or S',
    ],
    ['a formula that is missing', given(assay), 'givens.0.element: needs a formula for A, B, which can be in stream 1'],
    [
      'an element that cannot be there',
      {
        streams: [{ id: '1', components: ['H2'] }, { id: '2' }, { id: '3', components: ['A', 'H2'] }],
        ...given({ ...assay, element: 'Cu' }),
      },
      'givens.0.element: no component that can be in stream 1 holds Cu, so it cannot be 1',
    ],
    [
      'an absent group',
      given({ ...group, stream: '3', parts: ['B', 'O2'] }),
      'givens.0.parts: none of B, O2 can be in stream 3, so it cannot be 1',
    ],
    [
      'nothing to divide by',
      given({ ...group, stream: '3', over: ['B'] }),
      'givens.0.over: none of B can be in stream 3, so nothing is left to divide by',
    ],
    [
      'nothing left dry',
      given({ ...dry, stream: '3', without: ['A', 'H2'] }),
      'givens.0.without: leaves nothing of stream 3 to divide by',
    ],
    [
      'an absent component',
      given({ quantity: 'dryMassFraction', stream: '3', component: 'B', without: ['H2'] }),
      'givens.0.component: B cannot be in stream 3, so it cannot be 1',
    ],
    [
      'a missing molar mass',
      given({ quantity: 'groupMoleRatio', parts: ['A'], over: ['B', 'H2'] }),
      'givens.0.quantity: groupMoleRatio on a mass basis needs a molar mass for B',
    ],
    [
      'a unit of the other basis',
      given({ ...group, unit: 'mol%' }),
      'givens.0.unit: "mol%" does not fit a groupMassRatio',
    ],
    ['a unit of flow', given({ ...group, unit: 'kg/h' }), 'givens.0.unit: "kg/h" is no known unit of a ratio'],
    [
      'the same groups in another order',
      {
        givens: [
          { stream: '1', quantity: 'groupMassRatio', parts: ['A', 'B'], value: 1 },
          { stream: '1', quantity: 'groupMassRatio', parts: ['B', 'A'], value: 2 },
        ],
      },
      'givens.1: is the same measure and instrument as givens.0',
    ],
  ])('%s', (_, change, refusal) => {
    expect(refusals(change)).toEqual([refusal])
  })

  it('needs no molar mass of what a dry basis leaves out', () => {
    const problem = given({ quantity: 'dryMoleFraction', component: 'A', without: ['B'], value: 0.5 })
    expect(refusals(problem)).toEqual([])
  })
})

describe('refused, each with its place', () => {
  it.each<[string, Json, string]>([
    ['an unknown key', { colour: 1 }, 'colour: "colour" is not a known key here'],
    ['an unknown key inside', given({ sgima: 1 }), 'givens.0.sgima: "sgima" is not a known key here'],
    [
      'an unknown key of a rule',
      rule({ kind: 'flowRatio', stream: '1', of: '2', value: 1, unit: 'U' }),
      'relations.0.unit: "unit" is not a known key here',
    ],
    ['a missing key', { name: undefined }, 'name: is missing'],
    ['a wrong kind of value', given({ value: '12' }), 'givens.0.value: must be a finite number'],
    [
      'a value that is not finite',
      given({ value: Number.POSITIVE_INFINITY }),
      'givens.0.value: must be a finite number',
    ],
    ['a sigma of 0', given({ sigma: 0 }), 'givens.0.sigma: must be above 0'],
    ['a half-width below 0', given({ halfWidth: -1 }), 'givens.0.halfWidth: must be above 0'],
    [
      'a rule’s half-width of 0',
      rule({ kind: 'flowRatio', stream: '1', of: '2', value: 1, halfWidth: 0 }),
      'relations.0.halfWidth: must be above 0',
    ],
    ['a molar mass of 0', { components: [{ id: 'A', molarMass: 0 }] }, 'components.0.molarMass: must be above 0'],
    [
      'an id that is too long',
      { parameters: [{ id: 'x'.repeat(41) }] },
      'parameters.0.id: must have at most 40 characters',
    ],
    ['an empty id', { parameters: [{ id: '' }] }, 'parameters.0.id: must not be empty'],
    [
      'a doubled stream id',
      { streams: [{ id: '1' }, { id: '2' }, { id: '3' }, { id: '1' }] },
      'streams.3.id: "1" is already the id of streams.0',
    ],
    [
      'a doubled rule id',
      { relations: ['1', '2'].map((of) => ({ id: 'Q', kind: 'flowRatio', stream: '3', of, value: 1 })) },
      'relations.1.id: "Q" is already the id of relations.0',
    ],
    ['a flow unit of the other basis', { flowUnit: 'kmol/h' }, 'flowUnit: "kmol/h" does not fit a mass basis'],
    ['an unknown flow unit', { flowUnit: 'furlong' }, 'flowUnit: "furlong" is no known flow unit, such as kg/h'],
    [
      'an unknown component in a stream',
      { streams: [{ id: '1', components: ['X'] }, { id: '2' }, { id: '3' }] },
      'streams.0.components.0: "X" is no component',
    ],
    ['an unknown stream in a link', { links: { U: { 9: 'in' } } }, 'links.U.9: "9" is no stream'],
    ['an unknown unit in a link', { links: { X: { 1: 'in' } } }, 'links.X: "X" is no unit'],
    [
      'a stream with two sinks',
      { links: { U: { 1: 'in' }, R: { 1: 'in' } } },
      'links.R.1: stream 1 already goes into U; a stream has one sink',
    ],
    [
      'a stream with two sources',
      { links: { U: { 2: 'out' }, R: { 2: 'out' } } },
      'links.R.2: stream 2 already comes out of U; a stream has one source',
    ],
    ['a given on an unknown stream', given({ stream: '9' }), 'givens.0.stream: "9" is no stream'],
    [
      'a given on an unknown component',
      given({ quantity: 'componentFlow', component: 'X' }),
      'givens.0.component: "X" is no component',
    ],
    [
      'a given on an absent component',
      given({ stream: '3', quantity: 'componentFlow', component: 'B' }),
      'givens.0.component: B cannot be in stream 3, so it cannot be 1',
    ],
    [
      'a fraction without a component',
      given({ quantity: 'massFraction' }),
      'givens.0.component: massFraction needs a component',
    ],
    [
      'a total with a component',
      given({ component: 'A' }),
      'givens.0.component: flow is of the whole stream: leave the component out',
    ],
    [
      'a given that needs a missing molar mass',
      given({ quantity: 'moleFlow' }),
      'givens.0.quantity: moleFlow on a mass basis needs a molar mass for B',
    ],
    [
      'a given that needs a missing density',
      given({ quantity: 'volumeFlow' }),
      'givens.0.quantity: volumeFlow needs the density of stream 1',
    ],
    [
      'a unit of another kind',
      given({ unit: 'kmol/h' }),
      'givens.0.unit: "kmol/h" does not fit: a mass unit is needed here',
    ],
    [
      'an amount for a rate',
      given({ unit: 'kg' }),
      'givens.0.unit: "kg" does not fit the book\'s kg/h: one is a rate, the other an amount',
    ],
    ['an unknown unit', given({ unit: 'stone/fortnight' }), 'givens.0.unit: "stone/fortnight" is no known flow unit'],
    [
      'a mole unit on a mass fraction',
      given({ quantity: 'massFraction', component: 'A', unit: 'mol%' }),
      'givens.0.unit: "mol%" does not fit a massFraction',
    ],
    [
      'two values of one measure and instrument',
      { givens: [1, 2].map((value) => ({ stream: '1', quantity: 'flow', value })) },
      'givens.1: is the same measure and instrument as givens.0',
    ],
    [
      'a reaction whose elements do not balance',
      { reactions: [{ id: 'r', unit: 'R', stoichiometry: { H2: -1, O2: -1, H2O: 1 } }] },
      'reactions.0.stoichiometry: reaction r is not balanced: O -1 atoms left over',
    ],
    [
      'a reaction without a molar mass on a mass basis',
      { reactions: [{ id: 'r', unit: 'R', stoichiometry: { A: -1, B: 1 } }] },
      'reactions.0.stoichiometry: reaction r needs a molar mass for B on a mass basis',
    ],
    [
      'a reaction whose mass does not balance',
      {
        components: [{ id: 'A', molarMass: 20 }, { id: 'B', molarMass: 20.1 }, { id: 'H2' }],
        reactions: [{ id: 'r', unit: 'R', stoichiometry: { A: -1, B: 1 } }],
      },
      "reactions.0.stoichiometry: reaction r is not balanced: -0.500 % of the reactants' mass is left over",
    ],
    [
      'a reaction in an unknown unit',
      { reactions: [{ id: 'r', unit: 'X', stoichiometry: { H2: -2, O2: -1, H2O: 2 } }] },
      'reactions.0.unit: "X" is no unit',
    ],
    [
      'element balances without a formula',
      {
        units: [
          { id: 'U', kind: 'splitter' },
          { id: 'R', kind: 'reactor', balance: 'elements' },
        ],
      },
      'units.1.balance: element balances of R need a formula for A',
    ],
    [
      'a split on a unit that is no splitter',
      rule({ kind: 'split', unit: 'R', stream: '3', value: 0.5 }),
      'relations.0.unit: unit R is no splitter',
    ],
    [
      'a split of a stream that is no outlet',
      rule({ kind: 'split', unit: 'U', stream: '1', value: 0.5 }),
      'relations.0.stream: stream 1 is no outlet of U',
    ],
    [
      'an unknown parameter',
      rule({ kind: 'extent', reaction: 'r', value: { parameter: 'x' } }),
      'relations.0.value.parameter: "x" is no parameter',
    ],
    [
      'an unknown reaction',
      rule({ kind: 'extent', reaction: 'x', value: 1 }),
      'relations.0.reaction: "x" is no reaction',
    ],
    ['an unknown kind of rule', rule({ kind: 'guess', value: 1 }), 'relations.0.kind: is not a known kind of rule'],
    [
      'a yield without molar masses',
      rule({ kind: 'yield', unit: 'R', product: 'B', from: 'A', value: 1 }),
      'relations.0: a yield on a mass basis needs a molar mass for B',
    ],
    [
      'a recovery of an absent component',
      rule({ kind: 'recovery', unit: 'R', component: 'B', stream: '3', value: 1 }),
      'relations.0.component: B cannot be in stream 3',
    ],
    [
      'a formula without "="',
      rule({ kind: 'formula', text: 'flow("1")' }),
      'relations.0.text: a formula needs exactly one "=" between two sides',
    ],
    [
      'a formula with another function',
      rule({ kind: 'formula', text: 'flow("1") = sqrt(4)' }),
      'relations.0.text: "sqrt" is no function of a formula; use flow, part, share, massShare or moleShare',
    ],
    [
      'a formula with an unquoted number',
      rule({ kind: 'formula', text: 'flow(1) = 3' }),
      'relations.0.text: in flow(…) an id that is not a plain name must be in quotes, as in flow("101")',
    ],
    [
      'a formula on an unknown stream',
      rule({ kind: 'formula', text: 'flow("9") = 3' }),
      'relations.0.text: "9" is no stream',
    ],
    [
      'a formula with an assignment',
      rule({ kind: 'formula', text: 'flow("1") = [1, 2]' }),
      'relations.0.text: a formula holds numbers, + - * / ^, brackets, parameters and flow, part, share, massShare, moleShare only',
    ],
    [
      'a component by difference that is absent',
      { streams: [{ id: '1' }, { id: '2' }, { id: '3', components: ['A'], fractions: { difference: 'B' } }] },
      'streams.2.fractions.difference: "B" cannot be in stream 3',
    ],
  ])('%s', (_, change, line) => {
    expect(refusals(change)).toContain(line)
  })

  it('lists every fault, not the first only', () => {
    expect(
      refusals({
        ...given({ stream: '9' }),
        ...rule({ kind: 'extent', reaction: 'x', value: 1 }),
        links: { X: { 1: 'in' } },
      }),
    ).toHaveLength(3)
  })

  it('does not stumble over what is no object', () => {
    for (const json of [null, 3, 'x', [], undefined]) expect(parseProblem(json).ok).toBe(false)
  })
})

describe('the contract as JSON Schema', () => {
  it('names the keys and refuses others', () => {
    const schema = problemJsonSchema()
    expect(schema).toMatchObject({ type: 'object', additionalProperties: false })
    expect(Object.keys(schema.properties as Json)).toContain('relations')
  })
})
