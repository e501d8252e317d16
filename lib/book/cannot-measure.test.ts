import { describe, expect, it } from 'vitest'
import { cannotOf, type Reach, setOutOfReach } from './cannot-measure'
import { apply, invert } from './change'
import { fromProblem } from './from-problem'
import { starters } from './starters'
import { type BookState, stateOf } from './state'

let next = 0
const makeId = () => `test-id-${++next}`
const salt = stateOf(fromProblem(starters.salt.problem, makeId))
const idOf = (state: BookState, tag: string) => [...state.stream.values()].find((one) => one.tag === tag)?.id ?? ''

function set(state: BookState, tag: string, reach: Reach, isOut: boolean) {
  const made = setOutOfReach(state, idOf(state, tag), reach, isOut, makeId)
  if (!made.ok) throw new Error(made.error)
  const applied = apply(state, made.value)
  if (!applied.ok) throw new Error('does not apply')
  return { state: applied.state, change: made.value }
}

describe('marks of what cannot be measured', () => {
  it('are none at first, and are kept one by one', () => {
    expect(cannotOf(salt)).toEqual({ flows: [], analyses: [] })
    const flow = set(salt, '107', 'flow', true)
    expect(flow.change.label).toBe('Flow of 107 cannot be measured')
    const both = set(flow.state, '107', 'analysis', true)
    const more = set(both.state, '103', 'analysis', true)
    expect(cannotOf(more.state)).toEqual({ flows: ['107'], analyses: ['103', '107'] })
    expect(cannotOf(set(more.state, '107', 'flow', false).state)).toEqual({ flows: [], analyses: ['103', '107'] })
  })

  it('are undone like any other change', () => {
    const { state, change } = set(salt, '107', 'flow', true)
    const back = apply(state, invert(change, makeId()))
    expect(back.ok && cannotOf(back.state)).toEqual({ flows: [], analyses: [] })
  })

  it('are refused for a stream that is gone', () =>
    expect(setOutOfReach(salt, 'gone', 'flow', true, makeId)).toMatchObject({ ok: false }))
})
