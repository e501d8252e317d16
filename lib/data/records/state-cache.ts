import { type BookState, recordsOf } from '@/lib/book/state'

/** Records kept in memory, over all books. About 400 bytes each. */
const mostRecords = 300_000

type Kept = { number: number; state: BookState; size: number }

/**
 * The last states of the books at work, least recently used out first. A state under a book and a number never changes:
 * the number is taken under the book's lock and counts up with every edit. Only committed states may be put here.
 */
export class StateCache {
  private readonly kept = new Map<string, Kept>()
  private total = 0

  constructor(private readonly most = mostRecords) {}

  get(book: string, number: number): BookState | undefined {
    const found = this.kept.get(book)
    if (found?.number !== number) return undefined
    this.kept.delete(book)
    this.kept.set(book, found)
    return found.state
  }

  put(book: string, number: number, state: BookState): void {
    const before = this.kept.get(book)
    if (before && before.number >= number) return
    this.drop(book)
    const size = recordsOf(state).length
    if (size > this.most) return
    this.kept.set(book, { number, state, size })
    this.total += size
    for (const oldest of this.kept.keys()) {
      if (this.total <= this.most) break
      this.drop(oldest)
    }
  }

  private drop(book: string): void {
    const found = this.kept.get(book)
    if (!found) return
    this.kept.delete(book)
    this.total -= found.size
  }
}

export const stateCache = new StateCache()
