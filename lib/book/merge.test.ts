import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply, type Change } from './change'
import { diff } from './diff'
import { absenceId } from './ids'
import type { BookRecord, RecordOf } from './kinds'
import { rebase } from './rebase'
import { recordsOf, stateOf } from './state'

const stream = (id: string, name = '', position = 0): RecordOf<'stream'> => ({
  kind: 'stream',
  id,
  tag: id,
  name,
  phase: null,
  density: null,
  temperature: null,
  pressure: null,
  fractions: 'asTyped',
  differenceComponentId: null,
  note: null,
  position,
})
const absence = (streamId: string, componentId: string): RecordOf<'absence'> => ({
  kind: 'absence',
  id: absenceId(streamId, componentId),
  streamId,
  componentId,
})
const records = fc
  .uniqueArray(fc.tuple(fc.constantFrom('a', 'b', 'c', 'd'), fc.constantFrom('x', 'y'), fc.integer({ max: 3 })), {
    selector: ([id]) => id,
  })
  .map((list): BookRecord[] => list.flatMap(([id, name, at]) => [stream(id, name, at), absence(id, name)]))

const sorted = (list: BookRecord[]) => [...list].sort((a, b) => (a.kind + a.id < b.kind + b.id ? -1 : 1))

describe('diff', () => {
  it('leads from any state to any other', () => {
    fc.assert(
      fc.property(records, records, (before, after) => {
        const from = stateOf(before)
        const applied = apply(from, { id: 'change-1', label: 'x', ...diff(from, stateOf(after)) })
        if (!applied.ok) throw new Error(JSON.stringify(applied.conflicts))
        expect(sorted(recordsOf(applied.state))).toEqual(sorted(after))
      }),
    )
  })

  it('is empty between equal states', () => {
    const body = diff(stateOf([stream('a')]), stateOf([stream('a')]))
    expect(body).toEqual({ create: [], update: [], remove: [] })
  })
})

describe('rebase', () => {
  const change = (part: Partial<Change>): Change => ({
    id: 'change-1',
    label: 'x',
    create: [],
    update: [],
    remove: [],
    ...part,
  })

  it('starts an update from the value that stands', () => {
    const mine = change({ update: [{ kind: 'stream', id: 'a', fields: { name: ['old', 'mine'] } }] })
    const kept = rebase(mine, stateOf([stream('a', 'theirs')]), 'change-2')
    expect(kept?.update).toEqual([{ kind: 'stream', id: 'a', fields: { name: ['theirs', 'mine'] } }])
  })

  it('turns a creation at a place filled meanwhile into an update', () => {
    const kept = rebase(change({ create: [stream('a', 'mine')] }), stateOf([stream('a', 'theirs')]), 'change-2')
    expect(kept?.create).toEqual([])
    expect(kept?.update).toEqual([{ kind: 'stream', id: 'a', fields: { name: ['theirs', 'mine'] } }])
  })

  it('cannot keep an edit of a record that is gone, but a removal of it is content', () => {
    expect(
      rebase(change({ update: [{ kind: 'stream', id: 'a', fields: { name: ['', 'b'] } }] }), stateOf([]), 'c2'),
    ).toBe(undefined)
    expect(rebase(change({ remove: [stream('a')] }), stateOf([]), 'change-2')?.remove).toEqual([])
  })

  it('removes what stands, not what was seen', () => {
    const kept = rebase(change({ remove: [stream('a', 'seen')] }), stateOf([stream('a', 'theirs')]), 'change-2')
    expect(kept?.remove).toEqual([stream('a', 'theirs')])
  })
})
