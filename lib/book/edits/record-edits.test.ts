import { describe, expect, it } from 'vitest'
import { applied, bookOfProblem, counter, done, idByTag, smallPlant, sorted } from '@/tests/support/books'
import { invert } from '../change'
import { type BookState, inOrder, recordsOf, stateOf } from '../state'
import { addComponents, addStreams, addUnits } from './add'
import { moveAfter, renameTag, setBook, setFields, setFractions, setManyFields } from './fields'
import { setInventory } from './inventory'
import { setPresence } from './presence'
import { addReaction, setCoefficient } from './reactions'
import { remove, removeComponents, removeParameters, removeReactions, removeStreams, removeUnits } from './remove'
import { addRule, updateRule } from './rules'

const { state, id } = bookOfProblem(smallPlant)
const makeId = counter('edit')
const tags = (of: BookState, kind: 'stream' | 'component' | 'unit'): string[] =>
  inOrder<never>(of[kind] as never).map(({ tag }) => tag)

describe('adding', () => {
  it('gives the next tag, or a letter between two', () => {
    expect(tags(done(state, addStreams(state, { items: [{}, {}] }, makeId)), 'stream')).toEqual([
      '101',
      '102',
      '103',
      '104',
      '105',
      '106',
      '107',
    ])
    const between = done(state, addStreams(state, { items: [{}, {}], after: id('stream', '102') }, makeId))
    expect(tags(between, 'stream')).toEqual(['101', '102', '102A', '102B', '103', '104', '105'])
    const again = done(between, addStreams(between, { items: [{}], after: idByTag(between)('stream', '102A') }, makeId))
    expect(tags(again, 'stream')).toEqual(['101', '102', '102A', '102C', '102B', '103', '104', '105'])
    expect(tags(done(state, addUnits(state, { items: [{ unitKind: 'mixer' }] }, makeId)), 'unit').at(-1)).toBe('R-2')
    const first = done(state, addStreams(state, { items: [{ tag: '99' }], after: null }, makeId))
    expect(tags(first, 'stream')[0]).toBe('99')
  })

  it('starts the first of each kind, and counts on where a tag is taken', () => {
    const blank = stateOf(recordsOf(state).filter(({ kind }) => kind === 'book' || kind === 'case'))
    expect(tags(done(blank, addStreams(blank, { items: [{}, {}] }, makeId)), 'stream')).toEqual(['101', '102'])
    expect(tags(done(blank, addUnits(blank, { items: [{}] }, makeId)), 'unit')).toEqual(['U-101'])
    expect(tags(done(blank, addComponents(blank, { items: [{}, {}] }, makeId)), 'component')).toEqual([
      'Component 1',
      'Component 2',
    ])
    const odd = done(blank, addStreams(blank, { items: [{ tag: '008' }, { tag: '010' }, { tag: '009' }, {}] }, makeId))
    expect(tags(odd, 'stream')).toEqual(['008', '010', '009', '011'])
  })

  it('takes a pasted list, and refuses tags that are taken or doubled', () => {
    const edit = addComponents(state, { items: [{ tag: 'K', name: 'Potassium' }, { tag: ' Mg ' }] }, makeId)
    expect(edit.ok && edit.value.label).toBe('Add 2 components: K and Mg')
    expect(tags(done(state, edit), 'component')).toEqual(['W', 'A', 'B', 'K', 'Mg'])
    expect(addComponents(state, { items: [{ tag: 'A' }] }, makeId)).toMatchObject({
      error: 'There is already a component A: a tag stands for one component.',
    })
    expect(addComponents(state, { items: [{ tag: 'Z' }, { tag: 'Z' }] }, makeId)).toMatchObject({ ok: false })
    expect(addStreams(state, { items: [{ tag: 'x'.repeat(41) }] }, makeId)).toMatchObject({ ok: false })
  })

  it('numbers positions afresh where no room is left between two', () => {
    let current = state
    for (let i = 0; i < 70; i++) {
      const edit = addStreams(current, { items: [{}], after: id('stream', '101') }, makeId)
      current = done(current, edit)
    }
    const order = inOrder(current.stream)
    expect(order[0]?.tag).toBe('101')
    expect(order.at(-1)?.tag).toBe('105')
    expect(new Set(order.map(({ position }) => position)).size).toBe(75)
    expect(order).toHaveLength(75)
  })
})

describe('fields, tags and order', () => {
  it('sets names and other fields, singly and many at once', () => {
    const edit = setFields(state, 'stream', id('stream', '102'), { name: ' Blend ', phase: 'liquid' }, makeId)
    expect(edit.ok && edit.value.label).toBe('Stream 102: name Blend, phase liquid')
    expect(done(state, edit).stream.get(id('stream', '102'))).toMatchObject({ name: 'Blend', phase: 'liquid' })
    const many = setManyFields(
      state,
      [
        { kind: 'stream', id: id('stream', '101'), fields: { name: 'x' } },
        { kind: 'stream', id: id('stream', '101'), fields: { phase: '' } },
        { kind: 'unit', id: id('unit', 'T-1'), fields: { name: 'y' } },
      ],
      makeId,
    )
    expect(many.ok && many.value.update).toHaveLength(2)
    expect(setFields(state, 'stream', 'none', { name: 'x' }, makeId)).toMatchObject({ ok: false })
    expect(setFields(state, 'stream', id('stream', '101'), { density: -1 }, makeId)).toMatchObject({ ok: false })
    expect(setBook(state, { basis: 'mole', flowUnit: 'kmol/h' }, makeId)).toMatchObject({ ok: false })
    expect(
      done(state, setBook(state, { documentNumber: 'PB-1' }, makeId))
        .book.values()
        .next().value?.documentNumber,
    ).toBe('PB-1')
  })

  it('renames, and rewrites the formulas that name it', () => {
    const text = (of: BookState) => of.rule.get(id('rule', 'Q2'))?.text
    expect(text(done(state, renameTag(state, 'stream', id('stream', '105'), 'P-5', makeId)))).toBe(
      'flow("P-5") = k * part("101", A)',
    )
    expect(text(done(state, renameTag(state, 'component', id('component', 'A'), 'NaCl (aq)', makeId)))).toBe(
      'flow("105") = k * part("101", "NaCl (aq)")',
    )
    expect(text(done(state, renameTag(state, 'parameter', id('parameter', 'k'), 'ratio', makeId)))).toBe(
      'flow("105") = ratio * part("101", A)',
    )
    expect(renameTag(state, 'parameter', id('parameter', 'k'), 'a b', makeId)).toMatchObject({ ok: false })
    expect(renameTag(state, 'stream', id('stream', '105'), '101', makeId)).toMatchObject({
      error: 'There is already a stream 101: 105 is kept.',
    })
    expect(renameTag(state, 'stream', id('stream', '105'), '  ', makeId)).toMatchObject({ ok: false })
  })

  it('moves before, after and to the front', () => {
    const move = (tag: string, after: string | null) =>
      tags(
        done(state, moveAfter(state, 'stream', id('stream', tag), after && id('stream', after), makeId)),
        'stream',
      ).join(' ')
    expect(move('104', '101')).toBe('101 104 102 103 105')
    expect(move('104', null)).toBe('104 101 102 103 105')
    expect(move('101', '105')).toBe('102 103 104 105 101')
    expect(move('101', '101')).toBe('101 102 103 104 105')
    expect(move('102', '101')).toBe('101 102 103 104 105')
  })

  it('says what to do with fractions that do not add up', () => {
    const by = done(state, setFractions(state, id('stream', '101'), { difference: id('component', 'W') }, makeId))
    expect(by.stream.get(id('stream', '101'))).toMatchObject({
      fractions: 'difference',
      differenceComponentId: id('component', 'W'),
    })
    expect(setFractions(by, id('stream', '101'), { difference: 'none' }, makeId)).toMatchObject({ ok: false })
    const back = done(by, setFractions(by, id('stream', '101'), 'scale', makeId))
    expect(back.stream.get(id('stream', '101'))).toMatchObject({ fractions: 'scale', differenceComponentId: null })
  })
})

describe('removing lists all that goes with it', () => {
  const kinds = (before: BookState, after: BookState): Record<string, number> =>
    Object.fromEntries(
      Object.keys(before)
        .map((kind) => [kind, before[kind as 'stream'].size - after[kind as 'stream'].size] as const)
        .filter(([, count]) => count !== 0),
    )

  it.each([
    ['stream', '105', removeStreams, { stream: 1, given: 1, link: 2, rule: 3, ruleStream: 2 }],
    ['stream', '103', removeStreams, { stream: 1, given: 1, link: 1, absence: 2 }],
    ['component', 'A', removeComponents, { component: 1, given: 1, absence: 1, inventory: 1, coefficient: 1, rule: 1 }],
    ['unit', 'S-1', removeUnits, { unit: 1, link: 2, rule: 1 }],
    ['unit', 'R-1', removeUnits, { unit: 1, reaction: 1, coefficient: 2, rule: 1 }],
    ['reaction', 'R1', removeReactions, { reaction: 1, coefficient: 2, rule: 1 }],
    ['parameter', 'k', removeParameters, { parameter: 1, rule: 2 }],
  ] as const)('%s %s', (kind, tag, removing, gone) => {
    const edit = removing(state, [id(kind, tag)], makeId)
    const after = done(state, edit)
    expect(kinds(state, after)).toEqual(gone)
    if (!edit.ok) return
    expect(sorted(applied(after, invert(edit.value, makeId())))).toEqual(sorted(state))
  })

  it('names the rest in its label, and lets a stream outlive its component by difference', () => {
    const edit = removeStreams(state, [id('stream', '105')], makeId)
    expect(edit.ok && edit.value.label).toBe('Remove stream 105 with 1 given, 2 connections and 3 rules')
    const by = done(state, setFractions(state, id('stream', '101'), { difference: id('component', 'A') }, makeId))
    const after = done(by, removeComponents(by, [id('component', 'A')], makeId))
    expect(after.stream.get(id('stream', '101'))).toMatchObject({ fractions: 'asTyped', differenceComponentId: null })
    expect(remove(state, 'stream', ['none'], makeId)).toMatchObject({ ok: false })
  })
})

describe('presence', () => {
  it('takes the givens along and says so', () => {
    const edit = setPresence(
      state,
      [id('stream', '101'), id('stream', '105')],
      [id('component', 'A')],
      'absent',
      makeId,
    )
    expect(edit.ok && edit.value.label).toBe('A in 101 and 105: cannot be present, with 1 given removed')
    const after = done(state, edit)
    expect([after.absence.size, after.given.size]).toEqual([4, 3])
    const back = setPresence(
      after,
      [id('stream', '101'), id('stream', '103')],
      [id('component', 'A')],
      'present',
      makeId,
    )
    expect(done(after, back).absence.size).toBe(2)
  })
})

describe('reactions, rules, inventory', () => {
  it('adds a reaction and sets coefficients', () => {
    const after = done(
      state,
      addReaction(
        state,
        { unitId: id('unit', 'R-1'), coefficients: [{ componentId: id('component', 'B'), value: -1 }] },
        makeId,
      ),
    )
    const reactionId = idByTag(after)('reaction', 'R2')
    const set = done(after, setCoefficient(after, reactionId, id('component', 'W'), 2, makeId))
    expect(set.coefficient.get(`${reactionId}/${id('component', 'W')}`)?.value).toBe(2)
    expect(done(set, setCoefficient(set, reactionId, id('component', 'W'), 0, makeId)).coefficient.size).toBe(3)
    expect(addReaction(state, { unitId: 'none' }, makeId)).toMatchObject({ ok: false })
  })

  it('adds an unfinished rule, completes it, and empties what another kind has no use for', () => {
    const after = done(state, addRule(state, { ruleKind: 'recovery', unitId: id('unit', 'E-1') }, makeId))
    const ruleId = idByTag(after)('rule', 'Q5')
    const whole = done(
      after,
      updateRule(
        after,
        ruleId,
        { componentId: id('component', 'A'), streamId: id('stream', '104'), value: 0.9 },
        makeId,
      ),
    )
    expect(whole.rule.get(ruleId)).toMatchObject({ unitId: id('unit', 'E-1'), value: 0.9, parameterId: null })
    const by = done(whole, updateRule(whole, ruleId, { parameterId: id('parameter', 'k') }, makeId))
    expect(by.rule.get(ruleId)).toMatchObject({ value: null, parameterId: id('parameter', 'k') })
    const same = done(
      by,
      updateRule(
        by,
        ruleId,
        { ruleKind: 'sameComposition', streams: [id('stream', '101'), id('stream', '102')] },
        makeId,
      ),
    )
    expect(same.rule.get(ruleId)).toMatchObject({ unitId: null, componentId: null, parameterId: null, value: null })
    expect(same.ruleStream.size).toBe(4)
    expect(done(same, updateRule(same, ruleId, { ruleKind: 'formula', text: 'a = b' }, makeId)).ruleStream.size).toBe(2)
  })

  it('sets, changes and clears an inventory change', () => {
    const unitId = id('unit', 'E-1')
    const componentId = id('component', 'A')
    const set = done(state, setInventory(state, { unitId, componentId, value: 3, unit: 't/d' }, makeId))
    expect([...set.inventory.values()]).toMatchObject([{ value: 3, unit: 't/d' }])
    const total = done(set, setInventory(set, { unitId, componentId: null, value: -2 }, makeId))
    expect(total.inventory.size).toBe(2)
    expect(done(total, setInventory(total, { unitId, componentId, value: null }, makeId)).inventory.size).toBe(1)
  })
})
