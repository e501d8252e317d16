import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import type { Given, Problem } from '@/lib/balance/problem'
import { bookOfProblem, counter, done, smallPlant } from '@/tests/support/books'
import { shiftDecimal } from './decimal-text'
import { renameTag, setFields, setFractions } from './edits/fields'
import { setGiven } from './edits/givens'
import { setInventory } from './edits/inventory'
import { setPresence } from './edits/presence'
import { addRule, type RuleInput } from './edits/rules'
import { parseProblem } from './problem-file'
import type { BookState } from './state'
import { toProblem } from './to-problem'

const folder = path.join(import.meta.dirname, '../../tests/fixtures/demo')
const files = readdirSync(folder).filter((name) => name.endsWith('.book.json'))
const read = (name: string): Problem => JSON.parse(readFileSync(path.join(folder, name), 'utf8'))

/** With every default said, links and coefficients in any order, and fractions of 1. */
function plain(problem: Problem): unknown {
  const all = problem.components.map(({ id }) => id)
  const given = ({ unit, ...rest }: Given) => {
    const fraction = rest.quantity === 'massFraction' || rest.quantity === 'moleFraction'
    const percent = fraction && unit === '%'
    const scale = <V extends number | undefined>(value: V): V =>
      (percent && value !== undefined ? shiftDecimal(value, -2) : value) as V
    return {
      use: 'given',
      instrument: 'main',
      ...rest,
      value: scale(rest.value),
      ...(rest.sigma !== undefined && { sigma: scale(rest.sigma) }),
      ...(rest.halfWidth !== undefined && { halfWidth: scale(rest.halfWidth) }),
      unit: percent ? '1' : (unit ?? (fraction ? '1' : problem.flowUnit)),
    }
  }
  const key = (entry: Pick<Given, 'stream' | 'quantity' | 'component' | 'instrument'>): string =>
    [entry.stream, entry.quantity, entry.component, entry.instrument].join()
  return {
    ...problem,
    streams: problem.streams.map((stream) => ({
      fractions: 'asTyped',
      ...stream,
      components: [...(stream.components ?? all)].sort(),
    })),
    units: problem.units.map(({ inventory = [], ...unit }) => ({
      balance: 'components',
      ...unit,
      inventory: inventory.map((entry) => ({ unit: problem.flowUnit, ...entry })),
    })),
    reactions: problem.reactions ?? [],
    parameters: problem.parameters ?? [],
    givens: (problem.givens ?? []).map(given).sort((a, b) => (key(a) < key(b) ? -1 : 1)),
    relations: (problem.relations ?? []).map((rule) => ({ use: 'given', ...rule })),
  }
}

describe('from a problem file into a book and back', () => {
  it('has plants to try', () => expect(files.length).toBeGreaterThanOrEqual(5))

  it.each(files)('loses nothing of %s', (name) => {
    const problem = read(name)
    const { state, caseId } = bookOfProblem(problem)
    const back = toProblem(state, caseId)
    expect(back.leftOut).toEqual([])
    expect(plain(back.problem)).toEqual(plain(problem))
    expect(back.streams.map((id) => state.stream.get(id)?.tag)).toEqual(problem.streams.map(({ id }) => id))
    expect(back.components.map((id) => state.component.get(id)?.tag)).toEqual(problem.components.map(({ id }) => id))
  })

  it('loses nothing of a problem that uses every part of the format', () => {
    const { state, caseId } = bookOfProblem(everything)
    const back = toProblem(state, caseId)
    expect(back.leftOut).toEqual([])
    expect(plain(back.problem)).toEqual(plain(everything))
  })

  it('shows fractions in % as a person would have typed them', () => {
    const { state } = bookOfProblem(read('demo-a-salt.book.json'))
    const texts = [...state.given.values()].map(({ text, value, unit, sigma, halfWidth }) => [
      text,
      value,
      unit,
      sigma,
      halfWidth,
    ])
    expect(texts).toContainEqual(['50000 kg/h', 50_000, 'kg/h', 250, null])
    expect(texts).toContainEqual(['0.194 %', 0.194, '%', 0.0097, null])
    expect(texts).toContainEqual(['24 %', 24, '%', 0.24, null])
  })
})

describe('what cannot be used is left out, and listed with its reason', () => {
  const { state, caseId, id } = bookOfProblem(smallPlant)
  const flow = (tag: string) => ({ caseId, streamId: id('stream', tag), quantity: 'flow' as const, componentId: null })
  const number = (value: number, unit: string) => ({ text: `${value}`, value, unit, halfWidth: null })
  /** The small plant has an unbalanced reaction, which goes with its rule and its unit; only what is new counts. */
  const usual = toProblem(state, caseId).leftOut.map(({ what }) => what)
  const leftOut = (after: BookState): string[] => {
    const made = toProblem(after, caseId)
    expect(parseProblem(made.problem)).toMatchObject({ ok: true })
    return made.leftOut.map(({ what }) => what).filter((what) => !usual.includes(what))
  }

  it('a reaction that does not balance takes its rules and the balances of its unit along', () => {
    expect(usual).toEqual([
      expect.stringMatching(/^Reaction R1: reaction R1 is not balanced: .*Cl \+1/),
      'Rule Q4: its reaction R1 is left out.',
      'Unit R-1: its reaction R1 is left out.',
    ])
    const { problem } = toProblem(state, caseId)
    expect(problem.units.map((unit) => unit.id)).toEqual(['T-1', 'E-1', 'S-1'])
    expect([problem.reactions, problem.relations?.map((rule) => rule.id)]).toEqual([[], ['Q1', 'Q2', 'Q3']])
  })

  it('a wrong entry', () => {
    const wrong = done(state, setGiven(state, flow('104'), { text: '12 x', value: null }, counter('edit')))
    expect(leftOut(wrong)).toEqual(['“12 x” could not be read as a number: type it again or clear the cell.'])
  })

  it('a value that needs a molar mass or a density that is not known', () => {
    const moles = { ...flow('101'), quantity: 'moleFlow' as const }
    const one = done(state, setGiven(state, moles, number(3, 'kmol/h'), counter('edit')))
    expect(leftOut(one)).toEqual(['Mole flow of 101: mole flow on a mass basis needs a molar mass for B.'])
    const volume = { ...flow('101'), quantity: 'volumeFlow' as const }
    const two = done(state, setGiven(state, volume, number(3, 'm3/h'), counter('edit')))
    expect(leftOut(two)).toEqual(['Volume flow of 101: volume flow needs the density of stream 101.'])
  })

  it('a unit of measure that does not fit', () => {
    const one = done(state, setGiven(state, flow('104'), number(3, 'm3/h'), counter('edit')))
    expect(leftOut(one)).toEqual(['Total flow of 104: "m3/h" does not fit: a mass unit is needed here.'])
  })

  it('an unfinished rule, a formula that cannot be read, a split from what is no outlet', () => {
    const rule = (input: RuleInput) => leftOut(done(state, addRule(state, input, counter('edit'))))
    expect(rule({ ruleKind: 'recovery', unitId: id('unit', 'E-1') })).toEqual([
      'Rule Q5 is unfinished: it needs a component, an outlet, a fraction.',
    ])
    expect(rule({ ruleKind: 'sameComposition', streams: [id('stream', '101')] })).toEqual([
      'Rule Q5 is unfinished: it needs at least two streams.',
    ])
    expect(rule({ ruleKind: 'formula', text: 'flow("101") = nonsense(3)' })).toHaveLength(1)
    expect(rule({ ruleKind: 'formula', text: 'flow("999") = 1' })).toEqual(['Rule Q5: "999" is no stream.'])
    expect(rule({ ruleKind: 'split', unitId: id('unit', 'S-1'), streamId: id('stream', '101'), value: 0.1 })).toEqual([
      'Rule Q5: stream 101 is no outlet of S-1.',
    ])
  })

  it('a unit whose inventory change or element balance cannot be used, with its rules', () => {
    const gain = { unitId: id('unit', 'S-1'), componentId: null, value: 1, unit: 'bar' }
    expect(leftOut(done(state, setInventory(state, gain, counter('edit'))))).toEqual([
      'Unit S-1: "bar" is no known flow unit.',
      'Rule Q1: its unit S-1 is left out.',
    ])
    const elements = setFields(state, 'unit', id('unit', 'T-1'), { balance: 'elements' }, counter('edit'))
    const after = done(state, elements)
    expect(leftOut(after)).toEqual(['Unit T-1: element balances of T-1 need a formula for B.'])
    expect(Object.keys(toProblem(after, caseId).problem.links)).toEqual(['E-1', 'S-1'])
  })

  it('a component by difference that cannot be in the stream', () => {
    const one = done(
      state,
      setFractions(state, id('stream', '101'), { difference: id('component', 'B') }, counter('one')),
    )
    const made = setPresence(one, [id('stream', '101')], [id('component', 'B')], 'absent', counter('two'))
    const after = done(one, made)
    expect(leftOut(after)).toEqual(['Stream 101: "B" cannot be in stream 101.'])
    expect(toProblem(after, caseId).streams).toHaveLength(5)
  })

  it('nothing of another case, and every tag is taken as it is', () => {
    const makeId = counter('edit')
    expect(toProblem(state, 'no such case').problem.givens).toEqual([])
    let odd = state
    for (const tag of ['__proto__', 'constructor', 'a.b', 'toString'])
      odd = done(odd, renameTag(odd, 'unit', id('unit', 'T-1'), tag, makeId))
    odd = done(odd, renameTag(odd, 'unit', id('unit', 'T-1'), '__proto__', makeId))
    odd = done(odd, renameTag(odd, 'stream', id('stream', '101'), 'a.b', makeId))
    expect(leftOut(odd)).toEqual([])
    expect(Object.keys(toProblem(odd, caseId).problem.links)).toEqual(['__proto__', 'E-1', 'S-1'])
  })
})

const everything: Problem = {
  format: 'tallybrook/1',
  name: 'Everything',
  basis: 'mass',
  flowUnit: 't/d',
  components: [
    { id: 'CH4', name: 'Methane', formula: 'CH4' },
    { id: 'O2', formula: 'O2', molarMass: 31.998 },
    { id: 'CO2', formula: 'CO2' },
    { id: 'H2O', formula: 'H2O' },
    { id: 'Ash', molarMass: 100 },
  ],
  streams: [
    { id: '1', components: ['CH4', 'Ash'], density: 650, fractions: 'scale', note: 'from the field' },
    { id: '2', components: ['O2'] },
    { id: '3', fractions: { difference: 'H2O' } },
    { id: '4' },
    { id: '5' },
  ],
  units: [
    { id: 'R', kind: 'reactor', inventory: [{ value: 0.5 }, { component: 'Ash', value: 2, unit: 'kg/h' }] },
    { id: 'S', name: 'Split', kind: 'splitter' },
    { id: 'E', kind: 'reactor', balance: 'elements' },
  ],
  links: { R: { 1: 'in', 2: 'in', 3: 'out' }, S: { 3: 'in', 4: 'out', 5: 'out' } },
  reactions: [{ id: 'burn', unit: 'R', name: 'Burning', stoichiometry: { CH4: -1, O2: -2, CO2: 1, H2O: 2 } }],
  parameters: [{ id: 'k', value: 0.3 }, { id: 'free' }],
  givens: [
    { stream: '1', quantity: 'flow', value: 10 },
    { stream: '1', quantity: 'flow', value: 420, unit: 'kg/h', instrument: 'FT-2', sigma: 4, kind: 'meter' },
    { stream: '1', quantity: 'massFraction', component: 'Ash', value: 350, unit: 'ppm', halfWidth: 0.5 },
    { stream: '1', quantity: 'volumeFlow', value: 15.5, use: 'withdrawn', source: 'P&ID', note: 'old' },
    { stream: '3', quantity: 'moleFraction', component: 'O2', value: 0.031, use: 'check', kind: 'laboratory' },
    { stream: '3', quantity: 'componentMoleFlow', component: 'CO2', value: 1.5, unit: 'kmol/h' },
    { stream: '2', quantity: 'componentFlow', component: 'O2', value: 40 },
  ],
  relations: [
    { id: 'a', kind: 'split', unit: 'S', stream: '4', value: { parameter: 'k' } },
    { id: 'b', kind: 'recovery', unit: 'S', component: 'Ash', stream: '4', value: 0.3, use: 'check', halfWidth: 0.01 },
    { id: 'c', kind: 'conversion', unit: 'R', component: 'CH4', value: 0.99, note: 'licensor' },
    { id: 'd', kind: 'flowRatio', stream: '2', of: '1', value: 4 },
    { id: 'e', kind: 'componentRatio', stream: '2', component: 'O2', of: { stream: '1', component: 'CH4' }, value: 4 },
    { id: 'f', kind: 'extent', reaction: 'burn', value: { parameter: 'free' } },
    { id: 'g', kind: 'yield', unit: 'R', product: 'CO2', from: 'CH4', value: 0.9 },
    { id: 'h', kind: 'selectivity', unit: 'R', product: 'CO2', over: 'H2O', value: 0.5 },
    { id: 'i', kind: 'excess', unit: 'R', component: 'O2', reaction: 'burn', limiting: 'CH4', value: 0.2 },
    { id: 'j', kind: 'sameComposition', streams: ['3', '4', '5'], use: 'withdrawn' },
    { id: 'l', kind: 'formula', text: 'flow("4") = k * flow("3")' },
  ],
}
