import { currentRequestId, requestIdFrom } from '@/lib/http/request-scope'
import { auth } from './auth'

/** Who asks, and in which request. What every verb of lib/data takes first. */
export type Context = { userId: string | null; requestId: string }

/** Reads the session that the request's cookie names. No session, an ended one or a forged one: nobody. */
export async function contextFrom(headers: Headers): Promise<Context> {
  const session = await auth.api.getSession({ headers })
  return { userId: session?.user.id ?? null, requestId: currentRequestId() ?? requestIdFrom(headers) }
}
