import { currentRequestId, requestIdFrom } from '@/lib/http/request-scope'
import { auth } from './auth'

/** Who asks, in which session and in which request. What every verb of lib/data takes first. */
export type Context = { userId: string | null; sessionId?: string | null; requestId: string }

/** Reads the session that the request's cookie names. No session, an ended one or a forged one: nobody. */
export async function contextFrom(headers: Headers): Promise<Context> {
  const found = await auth.api.getSession({ headers })
  const requestId = currentRequestId() ?? requestIdFrom(headers)
  return { userId: found?.user.id ?? null, sessionId: found?.session?.id ?? null, requestId }
}
