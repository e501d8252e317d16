import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Solution } from '@/lib/balance/solution'
import { apply } from '@/lib/book/change'
import type { RecordOf } from '@/lib/book/kinds'
import { type BookState, stateOf } from '@/lib/book/state'
import { SolverClient } from './solver-client'
import type { FromSolver, ToSolver } from './solver-messages'

const component = (id: string): RecordOf<'component'> => ({
  kind: 'component',
  id,
  tag: id,
  name: '',
  formula: null,
  molarMass: null,
  position: 0,
})

/** Stands where a worker stands; answers when told to. */
class FakePort {
  readonly asked: ToSolver[] = []
  ended = false
  onmessage: ((event: MessageEvent<FromSolver>) => void) | null = null
  onerror: ((event: ErrorEvent) => void) | null = null
  postMessage = (message: ToSolver) => void this.asked.push(message)
  terminate = () => {
    this.ended = true
  }
  answer(components: string[], sequence = this.asked.at(-1)!.sequence) {
    const message: FromSolver = {
      type: 'solved',
      sequence,
      solution: {} as Solution,
      streams: [],
      components,
      rows: [],
      leftOut: [],
    }
    this.onmessage?.({ data: message } as MessageEvent<FromSolver>)
  }
  say(message: FromSolver) {
    this.onmessage?.({ data: message } as MessageEvent<FromSolver>)
  }
}

const state = (...ids: string[]) => stateOf(ids.map(component))

function replay(asked: ToSolver[]): string[] {
  let held: BookState = stateOf([])
  for (const message of asked) {
    if (message.type === 'load') held = stateOf(message.records)
    else {
      const applied = apply(held, { id: 'x', label: 'x', ...message.body })
      if (!applied.ok) throw new Error('the difference does not fit')
      held = applied.state
    }
  }
  return [...held.component.keys()].sort()
}

describe('SolverClient', () => {
  let ports: FakePort[]
  let client: SolverClient
  beforeEach(() => {
    vi.useFakeTimers()
    ports = []
    client = new SolverClient(() => {
      const port = new FakePort()
      ports.push(port)
      return port
    })
  })
  afterEach(() => vi.useRealTimers())

  it('loads once, then sends differences', () => {
    client.ask(state('a'), 'base')
    ports[0]!.answer(['a'])
    client.ask(state('a', 'b'), 'base')
    expect(ports[0]!.asked.map((m) => m.type)).toEqual(['load', 'change'])
    expect(replay(ports[0]!.asked)).toEqual(['a', 'b'])
  })

  it('asks only for the newest of the states that came while one was out', () => {
    client.ask(state('a'), 'base')
    client.ask(state('a', 'b'), 'base')
    client.ask(state('c'), 'base')
    ports[0]!.answer(['a'])
    expect(ports[0]!.asked).toHaveLength(2)
    expect(client.getSnapshot()).toMatchObject({ stale: true, solved: { components: ['a'] } })
    expect(replay(ports[0]!.asked)).toEqual(['c'])
    ports[0]!.answer(['c'])
    expect(client.getSnapshot()).toMatchObject({ stale: false, solved: { components: ['c'] } })
  })

  it('passes over an answer to a question that it did not ask', () => {
    client.ask(state('a'), 'base')
    ports[0]!.answer(['x'], 99)
    expect(client.getSnapshot().solved).toBe(null)
  })

  it('ends a worker over its budget, starts another with the whole book, and says so', () => {
    client.ask(state('a'), 'base')
    vi.advanceTimersByTime(20_000)
    expect(ports[0]!.ended).toBe(true)
    expect(ports[1]!.asked.map((m) => m.type)).toEqual(['load'])
    expect(client.getSnapshot().trouble).toContain('too long')
    ports[1]!.answer(['a'])
    expect(client.getSnapshot().trouble).toBe(null)
  })

  it('does not start workers for ever on a table that always takes too long', () => {
    client.ask(state('a'), 'base')
    vi.advanceTimersByTime(200_000)
    expect(ports).toHaveLength(2)
    client.ask(state('b'), 'base')
    expect(ports).toHaveLength(3)
  })

  it('loads the whole book again when the worker lost its place', () => {
    client.ask(state('a'), 'base')
    ports[0]!.answer(['a'])
    client.ask(state('b'), 'base')
    ports[0]!.say({ type: 'lost', sequence: ports[0]!.asked.at(-1)!.sequence })
    expect(ports[0]!.asked.at(-1)).toMatchObject({ type: 'load' })
    expect(replay(ports[0]!.asked.slice(-1))).toEqual(['b'])
  })

  it('says what went wrong when the solver failed, and keeps the last answer', () => {
    client.ask(state('a'), 'base')
    ports[0]!.answer(['a'])
    client.ask(state('b'), 'base')
    ports[0]!.say({ type: 'failed', sequence: ports[0]!.asked.at(-1)!.sequence, what: 'because' })
    expect(client.getSnapshot()).toMatchObject({ solved: { components: ['a'] }, stale: false })
    expect(client.getSnapshot().trouble).toContain('because')
  })
})
