import { diff } from '@/lib/book/diff'
import type { CaseId } from '@/lib/book/ids'
import { type BookState, recordsOf } from '@/lib/book/state'
import type { Answer, Asked, FromPanels, PanelKind, Question, ToPanels } from './panel-questions'

/** A question that has not been answered for this long is given up, and its worker ended. */
const BUDGET = 20_000
/** The same, once the book has changed since it was asked. */
const GRACE = 1_500

export type PanelPort = {
  postMessage: (message: ToPanels) => void
  terminate: () => void
  onmessage: ((event: MessageEvent<FromPanels>) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
}

/** What is known of one kind of question. */
export type PanelHandle<K extends PanelKind = PanelKind> = {
  /** The newest answer to the question asked; null until there is one. It stays while a newer is on its way. */
  answer: Answer<K> | null
  /** True while the answer is missing or older than the book. */
  stale: boolean
  /** A plain sentence where the book has no answer: it took too long, or went wrong. */
  trouble: string | null
}

type Book = { state: BookState; caseId: CaseId }
/** `key` is the question in words that can be compared. */
type Sought = Asked & { key: string }
type Out = Sought & { sequence: number; book: Book; since: number }
type Known = { key: string; book: Book; answer: Answer<PanelKind> | null; trouble: string | null }

const tooLong = `This took longer than ${BUDGET / 1000} seconds and was stopped. It is tried again after the next edit.`
const waiting: PanelHandle = { answer: null, stale: true, trouble: null }
/** What is under the cursor first, what takes longest last. */
const order: readonly PanelKind[] = ['limits', 'next', 'boundary', 'explain']

/**
 * Keeps the second worker busy with what somebody looks at, about the newest book whose states are there. One question is
 * out at a time; the newest of each kind wins; an answer about an older book or to an older question is dropped.
 */
export class PanelsClient {
  private port: PanelPort | null = null
  private sent: BookState | null = null
  private book: Book | null = null
  /** Whether the states of `book` have arrived. */
  private settled = false
  private out: Out | null = null
  private sequence = 0
  private timer: ReturnType<typeof setTimeout> | undefined
  private readonly lookers = new Map<PanelKind, Sought[]>()
  private readonly known = new Map<PanelKind, Known>()
  private readonly handles = new Map<PanelKind, PanelHandle>()
  private readonly listeners = new Set<() => void>()

  constructor(private readonly start: () => PanelPort) {}

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  /** What is known of a kind, if it is about this question. */
  read = <K extends PanelKind>(kind: K, key: string): PanelHandle<K> =>
    (this.known.get(kind)?.key === key ? (this.handles.get(kind) ?? waiting) : waiting) as PanelHandle<K>

  /** Somebody looks at the answer, until the function that comes back is called. */
  look = <K extends PanelKind>(kind: K, question: Question<K>, key: string): (() => void) => {
    const sought = { kind, question, key } as Sought
    this.lookers.set(kind, [...(this.lookers.get(kind) ?? []), sought])
    this.next()
    return () => {
      this.lookers.set(kind, this.lookers.get(kind)?.filter((other) => other !== sought) ?? [])
      this.next()
    }
  }

  /** The book that is on the screen; nothing is asked about it before `settle`. */
  show(state: BookState, caseId: CaseId): void {
    if (this.book?.state === state && this.book.caseId === caseId) return
    this.book = { state, caseId }
    this.settled = false
    this.tell()
  }

  /** The states of the book shown have arrived. */
  settle(): void {
    if (!this.book || this.settled) return
    this.settled = true
    this.next()
  }

  stop(): void {
    this.end()
    this.book = null
    this.settled = false
    this.known.clear()
    this.tell()
  }

  private next(): void {
    const { book } = this
    if (this.out) this.watch(this.out)
    if (this.out || !book || !this.settled) return
    const sought = this.firstOpen(book)
    if (!sought) return
    this.port ??= this.open()
    const sequence = ++this.sequence
    const before = this.sent
    const { key: _, ...asked } = sought
    this.out = { ...sought, sequence, book, since: Date.now() }
    this.sent = book.state
    this.watch(this.out)
    this.port.postMessage({
      sequence,
      caseId: book.caseId,
      book: !before
        ? { type: 'load', records: recordsOf(book.state) }
        : before === book.state
          ? null
          : { type: 'change', body: diff(before, book.state) },
      asked,
    })
  }

  /** Ends the worker when its time is over: sooner where its answer would be dropped and another question waits. */
  private watch(out: Out): void {
    const { book } = this
    const newest = this.lookers.get(out.kind)?.at(-1)
    const isOld = out.book !== book || newest?.key !== out.key
    const isInTheWay = isOld && this.settled && book !== null && this.firstOpen(book) !== undefined
    clearTimeout(this.timer)
    this.timer = setTimeout(
      () => {
        if (!isInTheWay) this.note(out, { trouble: tooLong })
        this.end()
        this.next()
      },
      Math.max(0, (isInTheWay ? GRACE : BUDGET) - (Date.now() - out.since)),
    )
  }

  /** The newest question of the first kind that somebody looks at and that this book has no answer to. */
  private firstOpen(book: Book): Sought | undefined {
    for (const kind of order) {
      const sought = this.lookers.get(kind)?.at(-1)
      const known = this.known.get(kind)
      if (sought && !(known && known.key === sought.key && known.book === book)) return sought
    }
    return undefined
  }

  private open(): PanelPort {
    const port = this.start()
    port.onmessage = (event) => this.received(event.data)
    port.onerror = (event) => {
      if (this.out) this.note(this.out, { trouble: `This could not be worked out: ${event.message ?? 'it stopped'}.` })
      this.end()
      this.next()
    }
    return port
  }

  private received(message: FromPanels): void {
    const { out } = this
    if (!out || message.sequence !== out.sequence) return
    clearTimeout(this.timer)
    this.out = null
    if (message.type === 'lost') this.sent = null
    else if (message.type === 'answered') this.note(out, { answer: message.answer })
    else this.note(out, { trouble: `This could not be worked out: ${message.what}` })
    this.next()
  }

  /** Keeps what came, unless the book or the question has moved on. */
  private note(
    { kind, key, book }: Out,
    { answer = null, trouble = null }: Partial<Pick<Known, 'answer' | 'trouble'>>,
  ) {
    const newest = this.lookers.get(kind)?.at(-1)
    if (book !== this.book || (newest && newest.key !== key)) return
    this.known.set(kind, { key, book, answer, trouble })
    this.tell()
  }

  private end(): void {
    clearTimeout(this.timer)
    this.port?.terminate()
    this.port = null
    this.sent = null
    this.out = null
  }

  private tell(): void {
    for (const [kind, { book, answer, trouble }] of this.known) {
      const stale = book !== this.book
      const was = this.handles.get(kind)
      if (was?.answer !== answer || was.stale !== stale || was.trouble !== trouble)
        this.handles.set(kind, { answer, stale, trouble })
    }
    for (const listener of this.listeners) listener()
  }
}
