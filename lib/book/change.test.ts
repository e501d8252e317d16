import { describe, expect, it } from 'vitest'
import { applied, bookOfProblem, smallPlant, sorted } from '@/tests/support/books'
import { apply, type Change, changeSchema, invert, isEmptyChange } from './change'
import type { RecordOf } from './kinds'

const { state, id } = bookOfProblem(smallPlant)
const streamId = id('stream', '101')
const stream = state.stream.get(streamId) as RecordOf<'stream'>
const empty = { id: 'change01', label: 'a change', create: [], update: [], remove: [] } satisfies Change
const rename = (from: string, to: string): Change => ({
  ...empty,
  update: [{ kind: 'stream', id: streamId, fields: { name: [from, to] } }],
})

describe('apply', () => {
  it('gives a new state that shares what it did not touch, and leaves the old one', () => {
    const before = sorted(state)
    const after = applied(state, rename('Feed', 'Brine'))
    expect(after.stream.get(streamId)?.name).toBe('Brine')
    expect(after.given).toBe(state.given)
    expect(after.stream.get(id('stream', '102'))).toBe(state.stream.get(id('stream', '102')))
    expect(sorted(state)).toEqual(before)
  })

  it('reports both values of every field that has changed since', () => {
    expect(apply(state, rename('Old', 'Mine'))).toEqual({
      ok: false,
      conflicts: [
        { code: 'field', kind: 'stream', id: streamId, field: 'name', from: 'Old', theirs: 'Feed', mine: 'Mine' },
      ],
    })
    expect(apply(state, { ...empty, remove: [{ ...stream, name: 'Old' }] })).toMatchObject({
      conflicts: [{ code: 'field', field: 'name', from: 'Old', theirs: 'Feed', mine: undefined }],
    })
  })

  it('reports what is gone and what stands in the place already', () => {
    expect(apply(state, { ...empty, update: [{ kind: 'stream', id: 'none', fields: { name: ['', 'x'] } }] })).toEqual({
      ok: false,
      conflicts: [{ code: 'gone', kind: 'stream', id: 'none' }],
    })
    expect(apply(state, { ...empty, remove: [{ ...stream, id: 'none' }] })).toMatchObject({
      conflicts: [{ code: 'gone' }],
    })
    expect(apply(state, { ...empty, create: [stream] })).toMatchObject({
      conflicts: [{ code: 'exists', theirs: stream, mine: stream }],
    })
  })

  it('applies the whole or nothing, and lists every reason', () => {
    const change = { ...rename('Old', 'x'), create: [stream] }
    expect(apply(state, change)).toMatchObject({ ok: false, conflicts: [{ code: 'field' }, { code: 'exists' }] })
  })

  it('can remove a record and make its like in one change', () => {
    const after = applied(state, { ...empty, remove: [stream], create: [{ ...stream, name: 'New' }] })
    expect(after.stream.get(streamId)?.name).toBe('New')
  })
})

describe('invert', () => {
  it('takes a change back, and twice does it again', () => {
    const change: Change = { ...rename('Feed', 'Brine'), remove: [...state.absence.values()] }
    const after = applied(state, change)
    expect(sorted(applied(after, invert(change, 'change02')))).toEqual(sorted(state))
    const twice = invert(invert(change, 'change02'), 'change03')
    expect(sorted(applied(state, twice))).toEqual(sorted(after))
    expect(invert(change, 'change02', 'Back').label).toBe('Back')
  })
})

it('knows an empty change, and which changes can be sent', () => {
  expect(isEmptyChange(empty)).toBe(true)
  expect(isEmptyChange(rename('a', 'b'))).toBe(false)
  expect(changeSchema.safeParse(rename('a', 'b')).success).toBe(true)
  expect(changeSchema.safeParse({ ...empty, create: [stream] }).success).toBe(true)
  expect(changeSchema.safeParse({ ...empty, id: 'short' }).success).toBe(false)
  expect(changeSchema.safeParse({ ...empty, label: '' }).success).toBe(false)
  expect(changeSchema.safeParse({ ...empty, create: [{ ...stream, density: -1 }] }).success).toBe(false)
  expect(changeSchema.safeParse({ ...empty, create: [{ ...stream, extra: 1 }] }).success).toBe(false)
  expect(
    changeSchema.safeParse({ ...empty, update: [{ kind: 'stream', id: 'x', fields: { name: ['a'] } }] }).success,
  ).toBe(false)
})
