import fc from 'fast-check'
import { expect, it } from 'vitest'
import { BookStore } from '@/hooks/book-store'
import type { EditQueue } from '@/hooks/edit-queue'
import type { Change } from '@/lib/book/change'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { type BookState, recordsOf, stateOf } from '@/lib/book/state'
import { FakeServer, seeded } from './fake-server'

const book: RecordOf<'book'> = {
  kind: 'book',
  id: 'book-1',
  name: 'Plant',
  description: '',
  documentNumber: '',
  basis: 'mass',
  flowUnit: 'kg/h',
}
const component = (id: string, name: string): RecordOf<'component'> => ({
  kind: 'component',
  id,
  tag: id,
  name,
  formula: null,
  molarMass: null,
  position: 0,
})

class MemoryQueue implements EditQueue {
  private readonly kept: Change[] = []
  load = async () => [...this.kept]
  add = async (change: Change) => void this.kept.push(change)
  remove = async (id: string) => {
    const at = this.kept.findIndex((change) => change.id === id)
    if (at >= 0) this.kept.splice(at, 1)
  }
}

/** A random edit over few places, so that clients meet: add, rename or remove one of six components. */
function randomChange(state: BookState, random: () => number): Change {
  const id = `c${Math.floor(random() * 6)}`
  const current = state.component.get(id)
  const change: Change = { id: newId(), label: 'edit', create: [], update: [], remove: [] }
  if (!current) change.create.push(component(id, `n${Math.floor(random() * 1e6)}`))
  else if (random() < 0.3) change.remove.push(current)
  else
    change.update.push({
      kind: 'component',
      id,
      fields: { name: [current.name, `n${Math.floor(random() * 1e6)}`] },
    })
  return change
}

const byId = (state: BookState) => recordsOf(state).sort((a, b) => (a.id < b.id ? -1 : 1))

it('three clients over bad lines end with the server’s book, no acknowledged edit lost or doubled', async () => {
  await fc.assert(
    fc.asyncProperty(fc.integer(), async (seed) => {
      const random = seeded(seed)
      const start = stateOf([book, component('c0', 'first')])
      const server = new FakeServer(start)
      const stores = [0, 1, 2].map(
        () => new BookStore(server.line(random), new MemoryQueue(), { number: 0, state: start }),
      )
      const accepted = new Set<string>()
      for (let round = 0; round < 40; round++) {
        const store = stores[Math.floor(random() * 3)]!
        const change = randomChange(store.getSnapshot().state, random)
        if (store.edit(change) === null) accepted.add(change.id)
        if (random() < 0.3) await store.catchUp()
        if (random() < 0.3) await new Promise((done) => setTimeout(done, 1))
      }
      const answered = await settle(stores, random)
      for (const store of stores) {
        expect(store.getSnapshot().number).toBe(server.number)
        expect(byId(store.getSnapshot().state)).toEqual(byId(server.state))
      }
      const ids = server.changes.map((c) => c.change.id)
      expect(new Set(ids).size).toBe(ids.length)
      // What a person typed is on the server, or the person was asked about it.
      expect([...accepted].filter((id) => !ids.includes(id) && !answered.has(id))).toEqual([])
    }),
    { numRuns: 25 },
  )
}, 120_000)

/** People answer conflicts, the line comes back, everyone catches up. */
async function settle(stores: BookStore[], random: () => number): Promise<Set<string>> {
  const answered = new Set<string>()
  for (let quiet = 0; quiet < 3; ) {
    let busy = false
    for (const store of stores) {
      const { save } = store.getSnapshot()
      if ('change' in save) answered.add(save.change.id)
      if (save.status === 'conflict') {
        if (random() < 0.5) save.keepMine()
        else save.dropMine()
      } else if (save.status === 'rejected') save.dismiss()
      if (store.getSnapshot().save.status !== 'saved') {
        busy = true
        store.retry()
      }
      const before = store.getSnapshot().number
      if ((await store.catchUp()) !== before) busy = true
    }
    await new Promise((done) => setTimeout(done, 2))
    const numbers = new Set(stores.map((store) => store.getSnapshot().number))
    quiet = busy || numbers.size > 1 ? 0 : quiet + 1
  }
  return answered
}
