import fc from 'fast-check'
import { expect, it } from 'vitest'
import { readEntry, typedOf } from '@/lib/sheet/entry'
import { applied, bookOfProblem, counter, smallPlant, sorted } from '@/tests/support/books'
import { apply, invert, isEmptyChange } from '../change'
import { check } from '../check'
import { emptyHistory, type History, pushChange, redo, undo } from '../history'
import type { Kind } from '../kinds'
import { ruleKinds } from '../kinds'
import { parseProblem } from '../problem-file'
import { type BookState, recordsOf } from '../state'
import { toProblem } from '../to-problem'
import { addComponents, addStreams, addUnits } from './add'
import type { Edit } from './draft'
import { moveAfter, renameTag, setFields, setFractions } from './fields'
import { clearGivens, setGiven, setGivenDetails } from './givens'
import { setInventory } from './inventory'
import { setLink } from './links'
import { setPresence } from './presence'
import { addReaction, setCoefficient } from './reactions'
import { remove } from './remove'
import { addRule, updateRule } from './rules'

/** Draws a record id of a kind, or undefined where there is none; the number is any. */
const pick = (state: BookState, kind: Kind, at: number): string => {
  const ids = [...state[kind].keys()]
  return ids[at % Math.max(ids.length, 1)] ?? 'none'
}

type Draw = { what: number; a: number; b: number; c: number; text: string; flag: boolean }
const texts = [
  '12',
  '24.00 %',
  '3,5',
  '',
  '1e3 t/d',
  'abc',
  '350 ppm',
  '-7',
  '0',
  '12 mol%',
  '__proto__',
  '105',
  'k',
  'flow("101")',
  'H2O',
  'Xx9',
  ' ',
]
const draw: fc.Arbitrary<Draw> = fc.record({
  what: fc.nat(17),
  a: fc.nat(40),
  b: fc.nat(40),
  c: fc.nat(40),
  text: fc.oneof(fc.constantFrom(...texts), fc.string({ maxLength: 12 })),
  flag: fc.boolean(),
})

/** Anything that a person can do at the workbench, sensible or not. */
function anyEdit(state: BookState, { what, a, b, c, text, flag }: Draw, makeId: () => string): Edit {
  const caseId = pick(state, 'case', 0)
  const streamId = pick(state, 'stream', a)
  const componentId = pick(state, 'component', b)
  const unitId = pick(state, 'unit', c)
  const fraction = c % 3 !== 0
  const quantities = fraction
    ? (['massFraction', 'moleFraction', 'componentFlow', 'componentMoleFlow'] as const)
    : (['flow', 'massFlow', 'moleFlow', 'volumeFlow'] as const)
  const place = { caseId, streamId, quantity: quantities[c % 4] as 'flow', componentId: fraction ? componentId : null }
  const listed = (['stream', 'component', 'unit', 'reaction', 'parameter', 'rule'] as const)[c % 6] as 'stream'
  switch (what) {
    case 0:
    case 1: {
      const measure = fraction ? 'massFraction' : 'massFlow'
      return setGiven(
        state,
        place,
        typedOf(readEntry(text, { measure, unit: fraction ? '%' : 'kg/h', decimal: 'point' })),
        makeId,
      )
    }
    case 2:
      return clearGivens(state, [place], makeId)
    case 3:
      return setGivenDetails(
        state,
        pick(state, 'given', a),
        { sigma: b - 2, use: flag ? 'check' : 'withdrawn', note: text },
        makeId,
      )
    case 4:
      return addStreams(state, { items: flag ? [{ tag: text }] : [{}, {}], ...(b % 2 && { after: streamId }) }, makeId)
    case 5:
      return addComponents(state, { items: [{ tag: text, formula: flag ? text : null }] }, makeId)
    case 6:
      return addUnits(state, { items: [{}], after: flag ? null : unitId }, makeId)
    case 7:
      return renameTag(state, listed, pick(state, listed, a), text, makeId)
    case 8:
      return moveAfter(state, listed, pick(state, listed, a), flag ? null : pick(state, listed, b), makeId)
    case 9:
      return remove(state, listed, [pick(state, listed, a)], makeId)
    case 10:
      return setPresence(state, [streamId], [componentId], flag ? 'absent' : 'present', makeId)
    case 11:
      return setLink(
        state,
        { streamId, unitId, direction: ([null, 'in', 'out'] as const)[b % 3] as null, move: flag },
        makeId,
      )
    case 12:
      return addReaction(state, { unitId, ...(flag && { coefficients: [{ componentId, value: b - 20 }] }) }, makeId)
    case 13:
      return setCoefficient(state, pick(state, 'reaction', a), componentId, flag ? c - 20 : c / 2, makeId)
    case 14:
      return addRule(
        state,
        {
          ruleKind: ruleKinds[a % ruleKinds.length] as 'split',
          unitId,
          componentId,
          streamId,
          otherStreamId: pick(state, 'stream', c),
          otherComponentId: pick(state, 'component', c),
          reactionId: state.reaction.size > 0 ? pick(state, 'reaction', b) : null,
          value: flag ? b / 40 : null,
          text,
          streams: [streamId, pick(state, 'stream', b)].filter((id) => id !== 'none'),
        },
        makeId,
      )
    case 15:
      return updateRule(
        state,
        pick(state, 'rule', a),
        { ruleKind: ruleKinds[b % ruleKinds.length] as 'split', value: c, text },
        makeId,
      )
    case 16:
      return setFractions(state, streamId, flag ? { difference: componentId } : 'scale', makeId)
    default:
      return c % 2
        ? setInventory(
            state,
            { unitId, componentId: flag ? componentId : null, value: b - 20, unit: text || 'kg/h' },
            makeId,
          )
        : setFields(state, 'component', componentId, { formula: text, molarMass: flag ? b : null }, makeId)
  }
}

const start = bookOfProblem(smallPlant).state

it('any run of edits keeps the book sound, can be taken back step by step, and gives a problem', () => {
  fc.assert(
    fc.property(fc.array(draw, { maxLength: 30 }), (draws) => {
      const makeId = counter('any')
      let state = start
      let history: History = emptyHistory
      const states = [start]
      for (const each of draws) {
        const edit = anyEdit(state, each, makeId)
        if (!edit.ok) {
          expect(edit.error).not.toBe('')
          continue
        }
        if (isEmptyChange(edit.value)) continue
        const before = sorted(state)
        const after = applied(state, edit.value)
        expect(sorted(state)).toEqual(before)
        expect(check(after, edit.value)).toEqual([])
        expect(sorted(applied(after, invert(edit.value, makeId())))).toEqual(before)
        state = after
        states.push(after)
        history = pushChange(history, edit.value)
      }
      expect(
        check(state, { id: 'all-records', label: 'all', create: recordsOf(state).slice(1), update: [], remove: [] }),
      ).toEqual([])
      for (const caseId of state.case.keys()) {
        const { problem, leftOut } = toProblem(state, caseId)
        expect(JSON.parse(JSON.stringify(problem))).toEqual(problem)
        expect(parseProblem(JSON.parse(JSON.stringify(problem)))).toMatchObject({ ok: true })
        for (const { what } of leftOut) expect(what).not.toBe('')
      }
      for (let i = states.length - 1; i > 0; i--) {
        const step = undo(history, state, makeId)
        if (!step?.ok) throw new Error(step?.error.message ?? 'nothing to undo')
        ;({ state, history } = step.value)
        expect(sorted(state)).toEqual(sorted(states[i - 1] as BookState))
      }
      for (let i = 1; i < states.length; i++) {
        const step = redo(history, state, makeId)
        if (!step?.ok) throw new Error(step?.error.message ?? 'nothing to redo')
        ;({ state, history } = step.value)
        expect(sorted(state)).toEqual(sorted(states[i] as BookState))
      }
    }),
    { numRuns: 150 },
  )
})

it('a change that someone else was first with is refused, with both values, and leaves the state alone', () => {
  fc.assert(
    fc.property(draw, draw, (mine, theirs) => {
      const [one, two] = [anyEdit(start, mine, counter('mine')), anyEdit(start, theirs, counter('them'))]
      if (!one.ok || !two.ok) return
      const after = applied(start, two.value)
      const before = sorted(after)
      const result = apply(after, one.value)
      if (!result.ok) {
        expect(result.conflicts.length).toBeGreaterThan(0)
        for (const conflict of result.conflicts)
          if (conflict.code === 'field') expect(conflict.theirs).not.toEqual(conflict.from)
          else if (conflict.code === 'exists') expect(conflict.theirs.id).toBe(conflict.mine.id)
      }
      expect(sorted(after)).toEqual(before)
    }),
    { numRuns: 300 },
  )
})
