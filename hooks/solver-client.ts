import { diff } from '@/lib/book/diff'
import type { CaseId } from '@/lib/book/ids'
import { type BookState, recordsOf } from '@/lib/book/state'
import { type SolverHandle, solvedCase } from './solver-handle'
import type { FromSolver, ToSolver } from './solver-messages'

/** A worker that has not answered for this long is ended and started anew. */
const BUDGET = 15_000

type Port = {
  postMessage: (message: ToSolver) => void
  terminate: () => void
  onmessage: ((event: MessageEvent<FromSolver>) => void) | null
  onerror: ((event: ErrorEvent) => void) | null
}

/**
 * Keeps a worker at the newest state. One question is out at a time; states that come meanwhile are folded into one
 * difference, so the newest always wins and the worker never works through a backlog.
 */
export class SolverClient {
  private port: Port | null = null
  private sent: BookState | null = null
  private wanted: { state: BookState; caseId: CaseId } | null = null
  private out: { sequence: number; state: BookState; caseId: CaseId } | null = null
  private sequence = 0
  private timer: ReturnType<typeof setTimeout> | undefined
  private failures = 0
  private handle: SolverHandle = { solved: null, stale: true, trouble: null }
  private readonly listeners = new Set<() => void>()

  constructor(private readonly start: () => Port) {}

  subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  getSnapshot = (): SolverHandle => this.handle

  ask(state: BookState, caseId: CaseId): void {
    if (this.wanted?.state === state && this.wanted.caseId === caseId) return
    this.wanted = { state, caseId }
    this.failures = 0
    if (!this.out) this.next()
  }

  stop(): void {
    clearTimeout(this.timer)
    this.port?.terminate()
    this.port = null
    this.sent = null
    this.out = null
    this.wanted = null
  }

  private next(): void {
    const wanted = this.wanted
    if (!wanted) return
    this.port ??= this.open()
    const sequence = ++this.sequence
    const before = this.sent
    this.out = { sequence, ...wanted }
    this.sent = wanted.state
    this.port.postMessage(
      before
        ? { type: 'change', sequence, caseId: wanted.caseId, body: diff(before, wanted.state) }
        : { type: 'load', sequence, caseId: wanted.caseId, records: recordsOf(wanted.state) },
    )
    clearTimeout(this.timer)
    this.timer = setTimeout(() => this.restart('The solver took too long and was started anew.'), BUDGET)
    if (!this.handle.stale) this.tell({ ...this.handle, stale: true })
  }

  private open(): Port {
    const port = this.start()
    port.onmessage = (event) => this.received(event.data)
    port.onerror = (event) =>
      this.restart(`The solver stopped (${event.message ?? 'no reason given'}) and was started anew.`)
    return port
  }

  private received(message: FromSolver): void {
    const out = this.out
    if (!out || message.sequence !== out.sequence) return
    clearTimeout(this.timer)
    this.out = null
    if (message.type === 'lost') {
      this.sent = null
      this.next()
      return
    }
    const current = this.wanted?.state === out.state && this.wanted.caseId === out.caseId
    if (message.type === 'solved') this.tell({ solved: solvedCase(message), stale: !current, trouble: null })
    else
      this.tell({ ...this.handle, stale: !current, trouble: `The solver could not work this table: ${message.what}` })
    if (!current) this.next()
  }

  private restart(trouble: string): void {
    clearTimeout(this.timer)
    this.port?.terminate()
    this.port = null
    this.sent = null
    this.out = null
    this.failures += 1
    this.tell({ ...this.handle, trouble })
    // The same table twice over the budget would go on for ever: wait for the next edit.
    if (this.failures < 2) this.next()
  }

  private tell(handle: SolverHandle): void {
    this.handle = handle
    for (const listener of this.listeners) listener()
  }
}
