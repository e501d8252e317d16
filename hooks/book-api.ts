import type { Change, ChangeConflict } from '@/lib/book/change'
import type { RecordProblem } from '@/lib/book/check'
import type { BookRecord } from '@/lib/book/kinds'
import type { NumberedChange } from '@/lib/book/overlay'

export type WriteResult =
  | { id: string; ok: true; number: number }
  | { id: string; ok: false; code: 'conflict'; conflicts: ChangeConflict[] }
  | { id: string; ok: false; code: 'rejected'; problems: RecordProblem[] | 'idReused' }

/**
 * `wait`: try again later. `stop`: sending again will not help until the person does something. `signedOut`, `noAccess`:
 * the book is not open to this person now, so nothing more is edited here.
 */
export type ApiFailure = { ok: false; kind: 'wait' | 'stop' | 'signedOut' | 'noAccess'; what: string }
export type ApiAnswer<T> = { ok: true; value: T } | ApiFailure

export type BookApi = {
  send: (changes: readonly Change[]) => Promise<ApiAnswer<{ results: WriteResult[] }>>
  changesAfter: (number: number) => Promise<ApiAnswer<{ number: number; changes: NumberedChange[] }>>
  snapshot: () => Promise<ApiAnswer<{ number: number; records: BookRecord[] }>>
}

async function call<T>(url: string, init?: RequestInit): Promise<ApiAnswer<T>> {
  let response: Response
  try {
    response = await fetch(url, { ...init, signal: AbortSignal.timeout(30_000) })
  } catch {
    return {
      ok: false,
      kind: 'wait',
      what: 'The server does not answer. Edits wait in this browser and are sent when it does.',
    }
  }
  if (response.ok) return { ok: true, value: (await response.json()) as T }
  const said = (await response.json().catch(() => null)) as { error?: { message?: string } } | null
  const message = said?.error?.message
  if (response.status === 401)
    return {
      ok: false,
      kind: 'signedOut',
      what: 'You are signed out, so nothing can be edited here now. Sign in again, here or in another tab.',
    }
  if (response.status === 403 || response.status === 404)
    return { ok: false, kind: 'noAccess', what: noAccess(message) }
  if (response.status === 429 || response.status >= 500)
    return {
      ok: false,
      kind: 'wait',
      what: message ?? 'The server could not take the edits just now. They are sent again shortly.',
    }
  return { ok: false, kind: 'stop', what: message ?? 'The server refused the edits. They are kept in this browser.' }
}

const noAccess = (message: string | undefined) =>
  `Your access to this book has ended or is less than it was, so nothing can be edited here now. ${message ?? 'Ask an owner of the team.'}`

export function bookApi(bookId: string): BookApi {
  const base = `/api/books/${encodeURIComponent(bookId)}`
  return {
    send: (changes) =>
      call(`${base}/changes`, {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify({ changes }),
      }),
    changesAfter: (number) => call(`${base}/changes?after=${number}`),
    snapshot: () => call(base),
  }
}
