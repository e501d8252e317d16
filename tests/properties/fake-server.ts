import type { ApiAnswer, BookApi, WriteResult } from '@/hooks/book-api'
import { apply, type Change } from '@/lib/book/change'
import { check } from '@/lib/book/check'
import type { NumberedChange } from '@/lib/book/overlay'
import { type BookState, recordsOf } from '@/lib/book/state'

/** The server's side of a book, in memory: numbers changes, refuses conflicts whole, answers a known id alike. */
export class FakeServer {
  readonly changes: NumberedChange[] = []

  constructor(public state: BookState) {}

  get number(): number {
    return this.changes.length
  }

  write(change: Change): WriteResult {
    const known = this.changes.find((c) => c.change.id === change.id)
    if (known) return { id: change.id, ok: true, number: known.number }
    const applied = apply(this.state, change)
    if (!applied.ok) return { id: change.id, ok: false, code: 'conflict', conflicts: applied.conflicts }
    const problems = check(applied.state, change)
    if (problems.length > 0) return { id: change.id, ok: false, code: 'rejected', problems }
    this.state = applied.state
    this.changes.push({ number: this.number + 1, change })
    return { id: change.id, ok: true, number: this.number }
  }

  /** A line that delays, loses requests, and loses answers after the work was done. `random` in [0, 1). */
  line(random: () => number): BookApi {
    const lost: ApiAnswer<never> = { ok: false, kind: 'wait', what: 'no line' }
    const pause = () => new Promise<void>((done) => setTimeout(done, Math.floor(random() * 4)))
    return {
      send: async (changes) => {
        await pause()
        if (random() < 0.2) return lost
        const results: WriteResult[] = []
        for (const change of changes) {
          const result = this.write(change)
          results.push(result)
          if (!result.ok) break
        }
        await pause()
        return random() < 0.2 ? lost : { ok: true, value: { results } }
      },
      changesAfter: async (after) => {
        await pause()
        if (random() < 0.1) return lost
        return { ok: true, value: { number: this.number, changes: this.changes.slice(after, after + 5) } }
      },
      snapshot: async () => {
        await pause()
        return { ok: true, value: { number: this.number, records: recordsOf(this.state) } }
      },
    }
  }
}

/** mulberry32, a small seeded generator (public domain, T. Ettinger). */
export function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6d2b79f5) | 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}
