import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { fromProblem } from '@/lib/book/from-problem'
import { starters } from '@/lib/book/starters'
import { type BookState, recordsOf, stateOf } from '@/lib/book/state'
import { PanelBook } from './panel-book'
import type { FromPanels, ToPanels } from './panel-questions'
import { type PanelPort, PanelsClient } from './panels-client'

/** Stands where a worker stands; answers by the real book when told to. */
class FakePort implements PanelPort {
  readonly asked: ToPanels[] = []
  readonly book = new PanelBook()
  ended = false
  onmessage: PanelPort['onmessage'] = null
  onerror: PanelPort['onerror'] = null
  postMessage = (message: ToPanels) => void this.asked.push(message)
  terminate = () => {
    this.ended = true
  }
  say(message: FromPanels) {
    this.onmessage?.({ data: message } as MessageEvent<FromPanels>)
  }
  answer() {
    this.say(this.book.answer(this.asked.at(-1) as ToPanels))
  }
  get kinds() {
    return this.asked.map(({ asked }) => asked.kind)
  }
}

const salt = (): BookState => {
  let next = 0
  return stateOf(fromProblem(starters.salt.problem, () => `salt-${++next}`))
}
/** The same book with its first givens gone. */
const without = (state: BookState, count: number): BookState => {
  const gone = new Set([...state.given.keys()].slice(0, count))
  return stateOf(recordsOf(state).filter(({ id }) => !gone.has(id)))
}

describe('PanelsClient', () => {
  let ports: FakePort[]
  let client: PanelsClient
  let state: BookState
  let caseId: string
  const settle = (of: BookState) => {
    client.show(of, caseId)
    client.settle()
  }
  beforeEach(() => {
    vi.useFakeTimers()
    ports = []
    client = new PanelsClient(() => {
      const port = new FakePort()
      ports.push(port)
      return port
    })
    state = salt()
    caseId = [...state.case.keys()][0] as string
  })
  afterEach(() => vi.useRealTimers())

  it('asks nothing before states have arrived, and nothing that nobody looks at', () => {
    client.look('explain', {}, '{}')
    client.show(state, caseId)
    expect(ports).toHaveLength(0)
    client.settle()
    expect(ports[0]?.kinds).toEqual(['explain'])
    const other = new PanelsClient(() => {
      throw new Error('nobody looks')
    })
    other.show(state, caseId)
    other.settle()
  })

  it('gives the answer to who looks, and calls it stale once the book has changed', () => {
    client.look('explain', {}, '{}')
    settle(state)
    expect(client.read('explain', '{}')).toEqual({ answer: null, stale: true, trouble: null })
    ports[0]?.answer()
    const { answer, stale } = client.read('explain', '{}')
    expect(stale).toBe(false)
    expect(answer?.workings.length).toBeGreaterThan(3)
    expect(answer?.boundaries.length).toBeGreaterThan(3)
    client.show(without(state, 1), caseId)
    expect(client.read('explain', '{}')).toMatchObject({ answer, stale: true })
    expect(client.read('explain', '{"allBoundaries":true}').answer).toBe(null)
  })

  it('sends the book once, then its differences, and nothing where it has not changed', () => {
    client.look('next', {}, '{}')
    settle(state)
    ports[0]?.answer()
    expect(client.read('next', '{}').answer).toEqual([])
    client.look('explain', {}, '{}')
    ports[0]?.answer()
    settle(without(state, 1))
    ports[0]?.answer()
    expect(ports[0]?.asked.map(({ book }) => book?.type ?? null)).toEqual(['load', null, 'change', null])
    expect(client.read('next', '{}').answer?.[0]?.leaves).toBe(0)
  })

  it('answers the newest question of a kind and drops the answer to the older one', () => {
    client.look('boundary', { units: ['T-101'] }, 'a')
    settle(state)
    client.look('boundary', { units: ['T-101', 'E-102'] }, 'b')
    ports[0]?.answer()
    expect(client.read('boundary', 'a').answer).toBe(null)
    ports[0]?.answer()
    expect(client.read('boundary', 'b').answer?.units).toEqual(['T-101', 'E-102'])
    expect(ports[0]?.asked).toHaveLength(2)
  })

  it('drops the answer about an older book and asks about the newest only', () => {
    client.look('next', {}, '{}')
    settle(state)
    settle(without(state, 1))
    settle(without(state, 2))
    ports[0]?.answer()
    expect(client.read('next', '{}').answer).toBe(null)
    ports[0]?.answer()
    expect(ports[0]?.asked).toHaveLength(2)
    expect(client.read('next', '{}').answer?.[0]?.set.length).toBeGreaterThan(0)
  })

  it('asks no more once nobody looks', () => {
    const leave = client.look('next', {}, '{}')
    settle(state)
    ports[0]?.answer()
    leave()
    settle(without(state, 1))
    expect(ports[0]?.asked).toHaveLength(1)
  })

  it('ends a question over its budget, says so, and goes on with the others', () => {
    client.look('next', {}, '{}')
    client.look('explain', {}, '{}')
    settle(state)
    vi.advanceTimersByTime(19_000)
    expect(ports[0]?.ended).toBe(false)
    vi.advanceTimersByTime(2_000)
    expect(ports[0]?.ended).toBe(true)
    expect(client.read('next', '{}')).toMatchObject({ answer: null, stale: false })
    expect(client.read('next', '{}').trouble).toContain('longer than 20 seconds')
    expect(ports[1]?.kinds).toEqual(['explain'])
    expect(ports[1]?.asked[0]?.book?.type).toBe('load')
    ports[1]?.answer()
    vi.advanceTimersByTime(100_000)
    expect(ports).toHaveLength(2)
    settle(without(state, 1))
    expect(ports[1]?.kinds.at(-1)).toBe('next')
  })

  it('does not wait long for an answer that the book has left behind', () => {
    client.look('explain', {}, '{}')
    settle(state)
    vi.advanceTimersByTime(1_000)
    settle(without(state, 1))
    expect(ports[0]?.ended).toBe(false)
    vi.advanceTimersByTime(600)
    expect(ports[0]?.ended).toBe(true)
    ports[1]?.answer()
    expect(client.read('explain', '{}')).toMatchObject({ stale: false, trouble: null })
  })

  it('loads the whole book again when the worker lost its place', () => {
    client.look('next', {}, '{}')
    settle(state)
    ports[0]?.say({ type: 'lost', sequence: 1 })
    expect(ports[0]?.asked.at(-1)?.book?.type).toBe('load')
  })

  it('says what went wrong, once', () => {
    client.look('next', {}, '{}')
    settle(state)
    ports[0]?.say({ type: 'failed', sequence: 1, what: 'because' })
    expect(client.read('next', '{}').trouble).toContain('because')
    expect(ports[0]?.asked).toHaveLength(1)
    client.stop()
    expect(ports[0]?.ended).toBe(true)
  })
})
