import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '../change'
import { addComponents, addParameters, addStreams, addUnits } from '../edits/add'
import type { Edit } from '../edits/draft'
import { addReaction } from '../edits/reactions'
import { addRule, type RuleInput } from '../edits/rules'
import { fromProblem } from '../from-problem'
import { type RecordOf, ruleKinds } from '../kinds'
import { starters } from '../starters'
import { type BookState, inOrder, stateOf } from '../state'
import { readRulesText, rulesText, setRuleLine } from './rules-text'
import { setRules } from './set-rules'
import { ruleLine } from './write-line'

let made = 0
const makeId = () => `id-${++made}`

function done(state: BookState, edit: Edit): BookState {
  if (!edit.ok) throw new Error(edit.error)
  const applied = apply(state, edit.value)
  if (!applied.ok) throw new Error('does not apply')
  return applied.state
}

type Tags = { streams: string[]; components: string[]; units: string[]; parameters: string[]; reaction: string }
const usual: Tags = {
  streams: ['101', '102', '103', '105'],
  components: ['NaCl', 'H2O', 'O2'],
  units: ['T-101', 'C-103'],
  parameters: ['k1'],
  reaction: 'R1',
}

function bookWith({ streams, components, units, parameters, reaction }: Tags): BookState {
  let state = stateOf(
    fromProblem(
      {
        ...starters.salt.problem,
        streams: [],
        components: [],
        units: [],
        links: {},
        givens: [],
        relations: [],
        parameters: [],
        reactions: [],
      },
      makeId,
    ),
  )
  state = done(state, addStreams(state, { items: streams.map((tag) => ({ tag })) }, makeId))
  state = done(state, addComponents(state, { items: components.map((tag) => ({ tag })) }, makeId))
  state = done(state, addUnits(state, { items: units.map((tag) => ({ tag, unitKind: 'splitter' as const })) }, makeId))
  state = done(state, addParameters(state, { items: parameters.map((tag) => ({ tag })) }, makeId))
  const unitId = inOrder(state.unit)[0]?.id ?? ''
  return done(state, addReaction(state, { unitId, tag: reaction }, makeId))
}

function read(state: BookState, text: string): BookState {
  const { rules, issues } = readRulesText(state, text)
  expect(issues).toEqual([])
  return done(state, setRules(state, rules, makeId))
}

const linesOf = (state: BookState) => inOrder(state.rule).map((rule) => ruleLine(state, rule))

describe('rules as text', () => {
  it.each([
    'split of T-101 to 105 = 0.35',
    'recovery of NaCl in C-103 to 105 = 98 %',
    'conversion of NaCl in C-103 = 60 % ± 0.5 %',
    'extent of R1 = 12 ± 0.5',
    'yield of NaCl from H2O in C-103 = 0.9',
    'selectivity of NaCl over H2O in C-103 = k1 ± 0.02',
    'excess of O2 over NaCl in C-103 by R1 = 20 %',
    'flow(105) = 0.4 * flow(103)',
    'part(105, NaCl) = k1 * part(103, H2O)',
    'same composition in 101, 102, 103',
    'flow("105") + flow("103") = 100 # what the tank takes',
    'check: split of T-101 to 105 = ?',
    'withdrawn: same composition in ?',
    'formula flow("105") = 0.4 * flow("103")',
    'formula ?',
    'flow(?) = ? * flow(103)',
  ])('reads “%s” and writes it again', (line) => {
    const state = bookWith(usual)
    expect(linesOf(read(state, line))).toEqual([line])
  })

  it('reads what people write otherwise as the same rule', () => {
    const state = bookWith(usual)
    const text = `
      recovery of "NaCl" in C-103 to 105 = 0.98
      Q7 : check : flow( 105 )=40 % * flow(103)
      flow(105) + flow(103) = 2 * flow(101)
    `
    const after = read(state, text)
    expect(linesOf(after)).toEqual([
      'recovery of NaCl in C-103 to 105 = 98 %',
      'check: flow(105) = 0.4 * flow(103)',
      'flow("105") + flow("103") = 2 * flow("101")',
    ])
    expect(inOrder(after.rule).map(({ tag }) => tag)).toContain('Q7')
  })

  it.each([
    ['splt of T-101 to 105 = 0.35', 1, /A rule begins with split/],
    ['split T-101 to 105 = 0.35', 7, /“of” is wanted here, after split/],
    ['split of T-101 to 999 = 0.35', 19, /There is no stream “999”/],
    ['split of T-101 to 105 = 0,35', 26, /decimal sign as a point/],
    ['split of T-101 to 105 = 35 % ± 0.5', 32, /behind both/],
    ['split of T-101 to 105 = 0.35 ± 0', 32, /more than 0/],
    ['split of T-101 to 105 = 0.35 or so', 30, /not understood/],
    ['split of T-101 to 105 = k9', 25, /There is no parameter “k9”/],
    ['flow(105) = 0,4 * flow(103)', 1, /decimal sign as a point/],
    ['flow(105) = 2 * flw(103)', 1, /no function/],
    ['flow(105) + flow(777) = 2', 1, /There is no stream “777”/],
    ['same composition in 101, 101', 26, /listed twice/],
    ['# only a note', 1, /belongs to a rule/],
    ['recovery of "NaCl in C-103 to 105 = 1', 13, /A component is wanted/],
  ])('says where “%s” stops', (line, column, what) => {
    const { issues } = readRulesText(bookWith(usual), `split of T-101 to 105 = 0.3\n${line}`)
    expect(issues).toEqual([{ line: 2, column, what: expect.stringMatching(what) }])
  })

  it('tells a tag that stands twice', () => {
    const { issues } = readRulesText(bookWith(usual), 'Q1: formula ?\nQ2: formula ?\nQ1: formula ?')
    expect(issues).toEqual([{ line: 3, column: 1, what: 'The tag Q1 already stands in line 1.' }])
  })

  it('changes what changed, adds, removes and orders in one change', () => {
    const before = read(bookWith(usual), 'A: extent of R1 = 1\nB: extent of R1 = 2\nC: extent of R1 = 3')
    const { rules } = readRulesText(before, 'C: extent of R1 = 3\nextent of R1 = 4\nA: extent of R1 = 9')
    const edit = setRules(before, rules, makeId)
    expect(edit).toMatchObject({ ok: true, value: { label: 'Rules as text: 1 added, 1 changed and 1 removed' } })
    const after = done(before, edit)
    const tagged = inOrder(after.rule).map(({ tag, value }) => [tag, value])
    expect(tagged).toEqual([
      ['C', 3],
      [expect.any(String), 4],
      ['A', 9],
    ])
    const same = setRules(after, readRulesText(after, rulesText(after)).rules, makeId)
    expect(same).toMatchObject({ ok: true, value: { create: [], update: [], remove: [] } })
  })

  it('takes one line for one rule, and refuses it with the column', () => {
    const state = read(bookWith(usual), 'split of T-101 to 105 = 0.35')
    const id = inOrder(state.rule)[0]?.id ?? ''
    const after = done(state, setRuleLine(state, id, 'check: split of T-101 to 105 = 40 %', makeId))
    expect(linesOf(after)).toEqual(['check: split of T-101 to 105 = 0.4'])
    expect(setRuleLine(state, id, 'split of T-1 to 105 = 1', makeId)).toEqual({
      ok: false,
      error: 'At column 10: There is no unit “T-1”.',
    })
  })

  it('gives the same rules back, whatever names and notes they carry', () => {
    const tag = fc.oneof(
      fc.constantFrom(
        '101',
        '105A',
        'of',
        'check',
        'split',
        '?',
        'a b',
        'Na+',
        'x:y',
        '"q"',
        '3k',
        '-1',
        'Σ',
        '#',
        '±',
        'flow',
      ),
      fc.string({ minLength: 1, maxLength: 8, unit: 'grapheme' }).filter((text) => text.trim() !== ''),
    )
    const tags = (count: number) =>
      fc.uniqueArray(tag, { minLength: count, maxLength: count, selector: (text) => text.trim() })
    const text = fc.oneof(
      fc.constantFrom(
        'flow("a") = 2 * flow("b")',
        'flow(a) = 2',
        'not a formula',
        '?',
        '"quoted"',
        'a = b # c',
        'a ± b = 2',
        '',
        ' padded ',
        'x\ny',
        '"',
      ),
      fc.string({ maxLength: 20 }),
    )
    const number = fc.oneof(
      fc.double({ noNaN: true, noDefaultInfinity: true }).map((value) => value || 0),
      fc.integer({ min: -9999, max: 9999 }).map((value) => value / 100 || 0),
    )
    const width = fc.option(fc.double({ min: 1e-12, max: 1e6, noNaN: true }))
    const at = (size: number) => fc.option(fc.nat({ max: size - 1 }))
    const rule = fc.record({
      ruleKind: fc.constantFrom(...ruleKinds),
      use: fc.constantFrom('given' as const, 'check' as const, 'withdrawn' as const),
      unit: at(2),
      stream: at(3),
      component: at(3),
      otherStream: at(3),
      otherComponent: at(3),
      reaction: at(1),
      value: fc.option(fc.oneof(number, fc.constantFrom('p0', 'p1'))),
      text: fc.option(text),
      streams: fc.uniqueArray(fc.nat({ max: 2 }), { maxLength: 3 }),
      halfWidth: width,
      note: fc.option(text),
    })
    fc.assert(
      fc.property(tags(3), tags(3), tags(2), tags(2), tag, tags(3), fc.array(rule, { maxLength: 3 }), (...drawn) => {
        const [streams, components, units, parameters, reaction, ruleTags, rules] = drawn
        let state = bookWith({ streams, components, units, parameters, reaction })
        const ids = (records: ReadonlyMap<string, { id: string; position: number }>) =>
          inOrder(records).map(({ id }) => id)
        const [s, c, u, p, r] = [state.stream, state.component, state.unit, state.parameter, state.reaction].map(
          (records) => ids(records as ReadonlyMap<string, { id: string; position: number }>),
        ) as [string[], string[], string[], string[], string[]]
        const pick = (list: string[], index: number | null) => (index === null ? null : (list[index] ?? null))
        for (const [index, drawnRule] of rules.entries()) {
          const { value, ...rest } = drawnRule
          const input: RuleInput = {
            ruleKind: rest.ruleKind,
            tag: ruleTags[index] as string,
            use: rest.use,
            unitId: pick(u, rest.unit),
            streamId: pick(s, rest.stream),
            componentId: pick(c, rest.component),
            otherStreamId: pick(s, rest.otherStream),
            otherComponentId: pick(c, rest.otherComponent),
            reactionId: pick(r, rest.reaction),
            value: typeof value === 'number' ? value : null,
            parameterId: typeof value === 'string' ? (p[Number(value[1])] ?? null) : null,
            text: rest.text,
            halfWidth: rest.halfWidth,
            note: rest.note,
            streams: rest.streams.map((k) => s[k] as string),
          }
          state = done(state, addRule(state, input, makeId))
        }
        const written = rulesText(state)
        const { rules: found, issues } = readRulesText(state, written)
        expect(issues, written).toEqual([])
        const again = setRules(state, found, makeId)
        expect(again, written).toMatchObject({ ok: true, value: { create: [], update: [], remove: [] } })
        // Into an empty list as well, so that nothing is merely left as it stood.
        const empty = { ...state, rule: new Map(), ruleStream: new Map() } as BookState
        const rebuilt = done(empty, setRules(empty, readRulesText(empty, written).rules, makeId))
        expect(rulesText(rebuilt)).toBe(written)
        const bare = (rules: RecordOf<'rule'>[]) => rules.map(({ id: _, position: __, ...fields }) => fields)
        expect(bare(inOrder(rebuilt.rule))).toEqual(bare(inOrder(state.rule)))
      }),
      { numRuns: 300 },
    )
  })
})
