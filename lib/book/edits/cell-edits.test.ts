import { describe, expect, it } from 'vitest'
import { applied, bookOfProblem, counter, done, smallPlant, sorted } from '@/tests/support/books'
import { invert } from '../change'
import { givenId } from '../ids'
import { clearGivens, setGiven, setGivenDetails, setGivens } from './givens'
import { linkInTheWay, setLink, setLinks } from './links'
import { setBlock } from './paste'

const { state, caseId, id } = bookOfProblem(smallPlant)
const makeId = counter('edit')
const flowOf = (tag: string) => ({ caseId, streamId: id('stream', tag), quantity: 'flow' as const, componentId: null })
const fractionOf = (stream: string, component: string) => ({
  caseId,
  streamId: id('stream', stream),
  quantity: 'massFraction' as const,
  componentId: id('component', component),
})
const typed = (text: string, value: number, unit = 'kg/h') => ({ text, value, unit, halfWidth: 0.5 })

describe('givens', () => {
  it('types a new value, with what was typed in the label', () => {
    const edit = setGiven(state, flowOf('104'), typed('50 000', 50_000), makeId)
    expect(edit.ok && edit.value.label).toBe('Total flow of 104: 50 000 kg/h')
    const given = done(state, edit).given.get(givenId(caseId, id('stream', '104'), 'flow', null))
    expect(given).toMatchObject({
      text: '50 000',
      value: 50_000,
      unit: 'kg/h',
      halfWidth: 0.5,
      use: 'given',
      sigma: null,
    })
  })

  it('keeps source and use of a value typed over, and carries its uncertainty to the new unit', () => {
    const after = done(state, setGiven(state, flowOf('101'), typed('26.4 t/d', 26.4, 't/d'), makeId))
    expect(after.given.get(givenId(caseId, id('stream', '101'), 'flow', null))).toMatchObject({
      value: 26.4,
      unit: 't/d',
      sigma: 0.12,
      source: 'FT-101',
      sourceKind: 'meter',
    })
  })

  it('keeps a wrong entry word for word, without a number, and the uncertainty for the next right one', () => {
    const place = flowOf('101')
    const wrong = done(state, setGiven(state, place, { text: '12 x', value: null }, makeId))
    const key = givenId(caseId, id('stream', '101'), 'flow', null)
    expect(wrong.given.get(key)).toMatchObject({ text: '12 x', value: null, sigma: 5, unit: 'kg/h' })
    const right = done(wrong, setGiven(wrong, place, typed('1.2 t/h', 1.2, 't/h'), makeId))
    expect(right.given.get(key)).toMatchObject({ value: 1.2, sigma: 0.005 })
  })

  it('clears, singly and in blocks', () => {
    const one = clearGivens(state, [flowOf('101'), flowOf('104')], makeId)
    expect(one.ok && one.value.label).toBe('Total flow of 101: cleared')
    const two = clearGivens(state, [flowOf('101'), flowOf('103')], makeId)
    expect(two.ok && two.value.label).toBe('2 values cleared')
    expect(done(state, two).given.size).toBe(2)
    const nothing = setGiven(state, flowOf('104'), null, makeId)
    expect(nothing.ok && nothing.value).toMatchObject({ create: [], update: [], remove: [] })
  })

  it('does nothing when the same is typed again', () => {
    const edit = setGiven(state, flowOf('103'), { text: '400 kg/h', value: 400, unit: 'kg/h', halfWidth: null }, makeId)
    expect(edit.ok && edit.value.update).toEqual([])
  })

  it('refuses a value where the component cannot be, and takes 0 or nothing there', () => {
    const place = fractionOf('103', 'A')
    const edit = setGiven(state, place, typed('3', 3, '%'), makeId)
    expect(edit).toEqual({
      ok: false,
      error: 'A in 103: cannot be present there. Let the component be present first, then type its value.',
    })
    const zero = setGivens(
      state,
      [
        { ...place, typed: typed('0', 0, '%') },
        { ...flowOf('104'), typed: typed('1', 1) },
      ],
      makeId,
    )
    expect(done(state, zero).given.size).toBe(5)
  })

  it('sets what a given carries besides its number', () => {
    const key = givenId(caseId, id('stream', '103'), 'flow', null)
    const edit = setGivenDetails(state, key, { sigma: 4, sourceKind: 'meter', source: 'FT-103' }, makeId)
    expect(edit.ok && edit.value.label).toBe('Total flow of 103: uncertainty 4, kind of source meter, source FT-103')
    expect(setGivenDetails(state, key, { sigma: 0 }, makeId)).toMatchObject({ ok: false })
    expect(setGivenDetails(state, key, { sigma: -1 }, makeId)).toMatchObject({ ok: false })
    expect(setGivenDetails(state, 'none', { use: 'check' }, makeId)).toMatchObject({ ok: false })
  })

  it('refuses a text that cannot be kept', () => {
    expect(setGiven(state, flowOf('101'), { text: 'x'.repeat(401), value: null }, makeId)).toMatchObject({ ok: false })
  })
})

describe('connections', () => {
  const cell = (stream: string, unit: string, direction: 'in' | 'out' | null) => ({
    streamId: id('stream', stream),
    unitId: id('unit', unit),
    direction,
  })

  it('refuses a second end, says which stands in the way, and moves it when told to', () => {
    const wanted = cell('101', 'E-1', 'in')
    expect(setLink(state, wanted, makeId)).toEqual({
      ok: false,
      error: 'Stream 101 already ends at T-1: clear that connection first, or move its end to E-1.',
    })
    expect(linkInTheWay(state, wanted)?.unitId).toBe(id('unit', 'T-1'))
    expect(setLink(state, cell('103', 'T-1', 'out'), makeId)).toMatchObject({
      error: 'Stream 103 already comes out of E-1: clear that connection first, or move its start to T-1.',
    })
    const moved = done(state, setLink(state, { ...wanted, move: true }, makeId))
    expect(moved.link.get(`${id('stream', '101')}/in`)?.unitId).toBe(id('unit', 'E-1'))
    expect(moved.link.size).toBe(state.link.size)
  })

  it('turns an end round in its cell, and clears it', () => {
    const turned = done(state, setLink(state, cell('101', 'T-1', 'out'), makeId))
    expect(turned.link.get(`${id('stream', '101')}/out`)?.unitId).toBe(id('unit', 'T-1'))
    expect(turned.link.has(`${id('stream', '101')}/in`)).toBe(false)
    const edit = setLink(state, cell('101', 'T-1', null), makeId)
    expect(done(state, edit).link.size).toBe(state.link.size - 1)
    expect(edit.ok && edit.value.label).toBe('Stream 101: not connected to T-1')
  })

  it('refuses a stream that would leave a unit and enter it again by a move', () => {
    // 102 comes out of T-1 and ends at E-1; its end moved to T-1 only turns the cell round.
    const after = done(state, setLink(state, { ...cell('102', 'T-1', 'in'), move: true }, makeId))
    expect(after.link.get(`${id('stream', '102')}/in`)?.unitId).toBe(id('unit', 'T-1'))
    expect(after.link.has(`${id('stream', '102')}/out`)).toBe(false)
  })

  it('sets many at once: clearing first, so that an end can be pasted elsewhere', () => {
    const edit = setLinks(state, [cell('101', 'E-1', 'in'), cell('101', 'T-1', null)], makeId)
    expect(done(state, edit).link.get(`${id('stream', '101')}/in`)?.unitId).toBe(id('unit', 'E-1'))
  })
})

describe('a block', () => {
  it('is one change, whatever its cells stand for', () => {
    const edit = setBlock(
      state,
      [
        { is: 'tag', kind: 'stream', id: id('stream', '104'), tag: '104X' },
        { is: 'fields', of: { kind: 'stream', id: id('stream', '104'), fields: { name: 'Liquor' } } },
        { is: 'link', streamId: id('stream', '105'), unitId: id('unit', 'T-1'), direction: null },
        { is: 'given', ...flowOf('104'), typed: typed('7', 7) },
        { is: 'given', ...flowOf('101'), typed: null },
        { is: 'given', ...fractionOf('104', 'A'), typed: { text: 'n/a', value: null } },
      ],
      makeId,
    )
    const after = done(state, edit)
    expect(after.stream.get(id('stream', '104'))).toMatchObject({ tag: '104X', name: 'Liquor' })
    expect([after.given.size, after.link.size]).toEqual([5, state.link.size - 1])
    expect(edit.ok && edit.value.label).toBe('6 cells pasted')
    expect(edit.ok && sorted(applied(after, invert(edit.value, makeId())))).toEqual(sorted(state))
  })

  it('is refused whole, with the cell that stands in the way', () => {
    const edit = setBlock(
      state,
      [
        { is: 'given', ...flowOf('104'), typed: typed('7', 7) },
        { is: 'link', streamId: id('stream', '101'), unitId: id('unit', 'E-1'), direction: 'in' },
      ],
      makeId,
    )
    expect(edit).toMatchObject({ ok: false, error: expect.stringMatching(/Stream 101 already ends at T-1/) })
  })
})
