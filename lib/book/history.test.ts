import { describe, expect, it } from 'vitest'
import { applied, bookOfProblem, counter, done, smallPlant, sorted } from '@/tests/support/books'
import type { Change } from './change'
import { setFields } from './edits/fields'
import { setGiven, setGivens } from './edits/givens'
import { remove, removeStreams } from './edits/remove'
import { dropChange, emptyHistory, type History, pushChange, redo, skipUndo, undo } from './history'
import type { BookState } from './state'

const { state, caseId, id } = bookOfProblem(smallPlant)
const makeId = counter('step')
const flow = (tag: string) => ({ caseId, streamId: id('stream', tag), quantity: 'flow' as const, componentId: null })
const typed = (value: number) => ({ text: String(value), value, unit: 'kg/h', halfWidth: 0.5 })
const change = (edit: ReturnType<typeof setGiven>): Change => {
  if (!edit.ok) throw new Error(edit.error)
  return edit.value
}

function did(...steps: ((state: BookState) => Change)[]): { state: BookState; history: History } {
  let current = { state, history: emptyHistory }
  for (const step of steps) {
    const made = step(current.state)
    current = { state: applied(current.state, made), history: pushChange(current.history, made) }
  }
  return current
}

describe('undo and redo', () => {
  it('takes back one step at a time, a paste being one, and does it again under a new id', () => {
    const first = change(setGiven(state, flow('101'), typed(900), makeId))
    const made = did(
      () => first,
      (s) =>
        change(
          setGivens(
            s,
            ['102', '104', '105'].map((tag) => ({ ...flow(tag), typed: typed(1) })),
            makeId,
          ),
        ),
    )
    const one = undo(made.history, made.state, makeId)
    if (!one?.ok) throw new Error('refused')
    expect(one.value.state.given.size).toBe(4)
    expect(one.value.change.label).toBe('Undo: 3 values typed')
    const two = undo(one.value.history, one.value.state, makeId)
    if (!two?.ok) throw new Error('refused')
    expect(sorted(two.value.state)).toEqual(sorted(state))
    expect(undo(two.value.history, two.value.state, makeId)).toBeUndefined()
    const again = redo(two.value.history, two.value.state, makeId)
    if (!again?.ok) throw new Error('refused')
    expect(sorted(again.value.state)).toEqual(sorted(one.value.state))
    expect(again.value.change.id).not.toBe(first.id)
    expect(again.value.history.done).toHaveLength(1)
  })

  it('forgets what was taken back once something else is done', () => {
    const made = did((s) => change(setGiven(s, flow('101'), typed(900), makeId)))
    const back = undo(made.history, made.state, makeId)
    if (!back?.ok) throw new Error('refused')
    const history = pushChange(back.value.history, change(setGiven(state, flow('101'), typed(5), makeId)))
    expect(redo(history, state, makeId)).toBeUndefined()
  })

  it('notes no change that changes nothing', () => {
    expect(pushChange(emptyHistory, { id: 'nothing1', label: 'x', create: [], update: [], remove: [] })).toBe(
      emptyHistory,
    )
  })

  it('is refused with both values where someone else was there since, and can be passed over', () => {
    const made = did((s) => change(setGiven(s, flow('101'), typed(900), makeId)))
    const theirs = done(made.state, setGiven(made.state, flow('101'), typed(777), makeId))
    const step = undo(made.history, theirs, makeId)
    expect(step?.ok).toBe(false)
    if (!step || step.ok) return
    expect(step.error.message).toBe(
      'Undo is not possible: Total flow of 101 has been changed since, from “900” to “777”; you wanted “1000 kg/h”. (and 1 more)',
    )
    expect(skipUndo(made.history)).toEqual(emptyHistory)
  })

  it('is refused where what it leans on is gone', () => {
    const made = did((s) => change(removeStreams(s, [id('stream', '103')], makeId)))
    const theirs = done(made.state, remove(made.state, 'unit', [id('unit', 'E-1')], makeId))
    const step = undo(made.history, theirs, makeId)
    expect(step).toMatchObject({
      ok: false,
      error: { message: expect.stringMatching(/the unit that it names is gone/) },
    })
  })

  it('is refused where the record has been removed, or the place filled', () => {
    const named = did((s) => change(setFields(s, 'stream', id('stream', '103'), { name: 'Steam' }, makeId)))
    const gone = done(named.state, removeStreams(named.state, [id('stream', '103')], makeId))
    expect(undo(named.history, gone, makeId)).toMatchObject({ ok: false, error: { conflicts: [{ code: 'gone' }] } })
    const cleared = did((s) => change(setGiven(s, flow('101'), null, makeId)))
    const filled = done(cleared.state, setGiven(cleared.state, flow('101'), typed(3), makeId))
    expect(undo(cleared.history, filled, makeId)).toMatchObject({
      ok: false,
      error: {
        message:
          'Undo is not possible: Total flow of 101 has been filled in by someone else since: it now says “3”, yours was “1000 kg/h”.',
      },
    })
  })

  it('drops a change that the server refused', () => {
    const made = did((s) => change(setGiven(s, flow('101'), typed(900), makeId)))
    expect(dropChange(made.history, made.history.done[0]?.id as string)).toEqual(emptyHistory)
  })
})
