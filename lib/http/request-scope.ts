import { AsyncLocalStorage } from 'node:async_hooks'

/** What every log line inside one request carries. */
export type RequestScope = { requestId: string }

const storage = new AsyncLocalStorage<RequestScope>()

export function withRequestScope<T>(scope: RequestScope, run: () => T): T {
  return storage.run(scope, run)
}

export function currentRequestId(): string | undefined {
  return storage.getStore()?.requestId
}

/** A caller's id is kept only when it is harmless in a log and in a header; otherwise a new one is made. */
export function requestIdFrom(headers: Headers): string {
  const sent = headers.get('x-request-id')
  return sent !== null && /^[A-Za-z0-9._-]{8,64}$/.test(sent) ? sent : crypto.randomUUID()
}
