import { describe, expect, it } from 'vitest'
import type { Change } from '@/lib/book/change'
import { stateOf } from '@/lib/book/state'
import type { ApiFailure, BookApi } from './book-api'
import { BookStore } from './book-store'

const noQueue = { load: async () => [], add: async () => {}, remove: async () => {} }
const signedOut: ApiFailure = { ok: false, kind: 'signedOut', what: 'You are signed out.' }
const noAccess: ApiFailure = { ok: false, kind: 'noAccess', what: 'Your access has ended.' }
const down: ApiFailure = { ok: false, kind: 'wait', what: 'No line.' }

const water = (id: string): Change => ({
  id,
  label: 'Water',
  create: [{ kind: 'component', id: `c-${id}`, tag: id, name: 'Water', formula: null, molarMass: null, position: 1 }],
  update: [],
  remove: [],
})

/** A server that lets in or not. `refusal`: what every call is answered; `sending`: what only edits are. */
function opened() {
  const server = { refusal: null as ApiFailure | null, sending: null as ApiFailure | null, number: 1 }
  const api: BookApi = {
    changesAfter: async () => server.refusal ?? { ok: true, value: { number: server.number, changes: [] } },
    snapshot: async () => server.refusal ?? { ok: true, value: { number: server.number, records: [] } },
    send: async (changes) =>
      server.refusal ??
      server.sending ?? {
        ok: true,
        value: { results: changes.map(({ id }) => ({ id, ok: true, number: ++server.number })) },
      },
  }
  const store = new BookStore(api, noQueue, { number: 1, state: stateOf([]) })
  return { server, store, status: () => store.getSnapshot().save }
}

const settled = () => new Promise((done) => setTimeout(done, 20))

describe('a book that is no longer open to the person', () => {
  it.each([signedOut, noAccess])('is told at the next look, and nothing more is edited: $kind', async (refusal) => {
    const { server, store, status } = opened()
    server.refusal = refusal
    await store.catchUp()
    expect(status()).toEqual({ status: 'ended', waiting: 0, why: refusal.kind, what: refusal.what })
    expect(store.edit(water('a'))).toBe(refusal.what)
    expect(store.getSnapshot().state.component.size).toBe(0)
  })

  it('is open again as soon as a look succeeds, and what waited is sent', async () => {
    const { server, store, status } = opened()
    server.sending = down
    expect(store.edit(water('a'))).toBeNull()
    await settled()
    server.refusal = signedOut
    await store.catchUp()
    expect(status()).toMatchObject({ status: 'ended', waiting: 1 })
    server.refusal = null
    server.sending = null
    await store.catchUp()
    await settled()
    expect(status()).toEqual({ status: 'saved' })
    expect(store.edit(water('b'))).toBeNull()
  })

  it('is not what a broken line means', async () => {
    const { server, store, status } = opened()
    server.refusal = down
    await store.catchUp()
    expect(status()).toEqual({ status: 'saved' })
    expect(store.edit(water('a'))).toBeNull()
  })

  it('stays closed to edits where reading is allowed and sending is not', async () => {
    const { server, store, status } = opened()
    server.sending = noAccess
    expect(store.edit(water('a'))).toBeNull()
    await settled()
    expect(status()).toMatchObject({ status: 'ended', waiting: 1, why: 'noAccess' })
    await store.catchUp()
    expect(status()).toMatchObject({ status: 'ended', waiting: 1 })
    expect(store.edit(water('b'))).toBe(noAccess.what)
  })
})
