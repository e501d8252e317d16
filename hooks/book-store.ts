import type { Change } from '@/lib/book/change'
import { check } from '@/lib/book/check'
import { conflictsText } from '@/lib/book/conflict-text'
import { newId } from '@/lib/book/ids'
import { addPending, type Overlay, overlayOf, receive, replaceConfirmed, replacePending } from '@/lib/book/overlay'
import { rebase } from '@/lib/book/rebase'
import { type BookState, stateOf } from '@/lib/book/state'
import type { ApiFailure, BookApi, WriteResult } from './book-api'
import type { SaveStatus } from './book-handle'
import type { EditQueue } from './edit-queue'

export type BookSnapshot = { state: BookState; number: number; save: SaveStatus }

type End = ApiFailure & { kind: 'signedOut' | 'noAccess' }
const isEnd = (failure: ApiFailure): failure is End => failure.kind === 'signedOut' || failure.kind === 'noAccess'

const BATCH = 40
const FIRST_WAIT = 500
const LONGEST_WAIT = 30_000

/**
 * One open book in one browser: confirmed state, unsent edits, and the one serial sender. Edits apply at once, are written
 * to the queue, then sent; nothing is dropped without the person being told. React reads it through useSyncExternalStore.
 */
export class BookStore {
  private overlay: Overlay
  private snapshot: BookSnapshot
  private readonly listeners = new Set<() => void>()
  private failure: ApiFailure | null = null
  /** Why the book cannot be read any more, as the last look at it was told. */
  private ended: End | null = null
  private rejected: Extract<SaveStatus, { status: 'rejected' }> | null = null
  private sending = false
  private wait = FIRST_WAIT
  private timer: ReturnType<typeof setTimeout> | undefined
  /** Told when an own change will never be on the server as it was made. */
  onDropped: (id: string) => void = () => {}
  private readonly written = new Map<string, Promise<void>>()

  constructor(
    private readonly api: BookApi,
    private readonly queue: EditQueue,
    initial: { number: number; state: BookState },
    private readonly lock: <T>(work: () => Promise<T>) => Promise<T> = (work) => work(),
  ) {
    this.overlay = overlayOf(initial.state, initial.number)
    this.snapshot = this.describe()
  }

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  getSnapshot = (): BookSnapshot => this.snapshot

  /** Takes up edits that an earlier page left unsent. */
  async resume(): Promise<void> {
    const left = await this.queue.load().catch(() => [])
    const known = new Set(this.overlay.pending.map((change) => change.id))
    const mine = left.filter((change) => !known.has(change.id))
    if (mine.length > 0) {
      this.set(overlayOf(this.overlay.confirmed, this.overlay.number, [...mine, ...this.overlay.pending]))
    }
    void this.pump()
  }

  /** Applies and queues a change, or says in a sentence why it cannot stand. */
  edit = (change: Change): string | null => {
    const closed = this.closed()
    if (closed) return closed.what
    const added = addPending(this.overlay, change)
    if (!added.ok) return conflictsText(this.overlay.shown, added.conflicts)
    const problems = check(added.overlay.shown, change)
    if (problems[0]) return problems[0].what
    this.written.set(
      change.id,
      this.queue.add(change).catch(() => undefined),
    )
    this.set(added.overlay)
    void this.pump()
    return null
  }

  /** Fetches what others did. Resolves to the number known afterwards. */
  catchUp = async (): Promise<number> => {
    for (;;) {
      const answer = await this.api.changesAfter(this.overlay.number)
      this.note(answer.ok ? null : answer)
      if (!answer.ok) return this.overlay.number
      const next = receive(this.overlay, answer.value.changes)
      if (!next) return this.reload()
      const before = this.overlay.number
      if (next !== this.overlay) this.set(next)
      if (this.overlay.number >= answer.value.number || this.overlay.number === before) return this.overlay.number
    }
  }

  /** The line is back, or the person signed in again: try at once. */
  retry = (): void => {
    clearTimeout(this.timer)
    this.wait = FIRST_WAIT
    void this.pump()
  }

  /** What a look at the book was told. Let in again, what waits is sent. */
  private note(failure: ApiFailure | null): void {
    const was = this.ended
    // A line that is down says nothing about who may read the book.
    if (failure === null) this.ended = null
    else if (isEnd(failure)) this.ended = failure
    if (was?.what === this.ended?.what) return
    this.set(this.overlay)
    if (was && !this.ended) this.retry()
  }

  /** The refusal that ended editing here, if one did. */
  private closed(): End | null {
    return this.ended ?? (this.failure && isEnd(this.failure) ? this.failure : null)
  }

  private async reload(): Promise<number> {
    const answer = await this.api.snapshot()
    if (answer.ok) this.set(replaceConfirmed(this.overlay, stateOf(answer.value.records), answer.value.number))
    return this.overlay.number
  }

  private async pump(): Promise<void> {
    if (this.sending) return
    this.sending = true
    try {
      while (this.overlay.pending.length > 0 && !this.overlay.broken) {
        const sent = await this.lock(() => this.sendBatch())
        if (!sent) break
      }
    } finally {
      this.sending = false
      this.set(this.overlay)
    }
  }

  /** Sends the oldest unsent edits. False: stop for now. */
  private async sendBatch(): Promise<boolean> {
    const batch = this.overlay.pending.slice(0, BATCH)
    await Promise.all(batch.map((change) => this.written.get(change.id)))
    const answer = await this.api.send(batch)
    if (!answer.ok) {
      this.failure = answer
      if (answer.kind === 'wait') {
        this.timer = setTimeout(() => void this.pump(), this.wait)
        this.wait = Math.min(this.wait * 2, LONGEST_WAIT)
      }
      return false
    }
    this.failure = null
    this.wait = FIRST_WAIT
    for (const result of answer.value.results) {
      const change = batch.find((c) => c.id === result.id)
      if (!change) continue
      if (result.ok) await this.confirm(change, result.number)
      else return this.refused(change, result)
    }
    return true
  }

  private async confirm(change: Change, number: number): Promise<void> {
    const next = receive(this.overlay, [{ number, change }])
    if (next) this.set(next)
    else await this.catchUp()
    // The change is on the server whatever number this browser has reached.
    if (this.overlay.pending.some((pending) => pending.id === change.id)) await this.reload()
    if (this.overlay.pending.some((pending) => pending.id === change.id))
      this.set(replacePending(this.overlay, change.id, null))
    await this.forget(change.id)
  }

  private async refused(change: Change, result: Extract<WriteResult, { ok: false }>): Promise<boolean> {
    if (result.code === 'conflict') {
      const before = this.overlay.number
      await this.catchUp()
      // With others' changes folded in, the overlay itself finds the clash; if it does not, the whole book is fetched.
      if (!this.overlay.broken && this.overlay.number === before) await this.reload()
      if (this.overlay.broken) return false
      if (this.overlay.number !== before) return true
    }
    const problems = result.code === 'rejected' && result.problems !== 'idReused' ? result.problems : []
    this.rejected = {
      status: 'rejected',
      change,
      problems,
      what: problems[0]?.what ?? 'The server could not take this edit; it has been taken back.',
      dismiss: () => {
        this.rejected = null
        this.set(this.overlay)
      },
    }
    this.set(replacePending(this.overlay, change.id, null))
    this.onDropped(change.id)
    await this.forget(change.id)
    return true
  }

  private async forget(id: string): Promise<void> {
    this.written.delete(id)
    await this.queue.remove(id).catch(() => undefined)
  }

  private set(overlay: Overlay): void {
    this.overlay = overlay
    this.snapshot = this.describe()
    for (const listener of this.listeners) listener()
  }

  private describe(): BookSnapshot {
    return { state: this.overlay.shown, number: this.overlay.number, save: this.status() }
  }

  private status(): SaveStatus {
    const { broken, pending } = this.overlay
    const closed = this.closed()
    if (closed) return { status: 'ended', waiting: pending.length, why: closed.kind, what: closed.what }
    if (broken) {
      const { change, conflicts } = broken
      return {
        status: 'conflict',
        change,
        conflicts,
        dropMine: () => this.settle(change, null),
        keepMine: () => this.settle(change, rebase(change, this.overlay.confirmed, newId()) ?? null),
      }
    }
    if (this.rejected) return this.rejected
    if (pending.length === 0) return { status: 'saved' }
    if (this.failure) return { status: 'offline', waiting: pending.length, what: this.failure.what }
    return { status: 'saving', waiting: pending.length }
  }

  private settle(change: Change, by: Change | null): void {
    if (by)
      this.written.set(
        by.id,
        this.queue.add(by).catch(() => undefined),
      )
    this.set(replacePending(this.overlay, change.id, by))
    this.onDropped(change.id)
    void this.forget(change.id)
    void this.pump()
  }
}
