import { unstable_rethrow } from 'next/navigation'
import type { Logger } from 'pino'
import { type AppError, httpStatus, type Result } from '../errors'
import { logger } from './logger'
import { requestIdFrom, withRequestScope } from './request-scope'

const sentence = 'Something went wrong on our side. Please try again; if it goes on, report the request number.'

type Answer = Response | Result<unknown>

/**
 * Wraps a route handler: gives the request an id, logs method, path, status and time, turns a `Result` into an answer and
 * anything thrown into a plain sentence with that id. The answer always carries `x-request-id`.
 */
export async function handle(
  request: Request,
  name: string,
  answer: (scope: { requestId: string; log: Logger }) => Promise<Answer> | Answer,
  log: Logger = logger(),
): Promise<Response> {
  const requestId = requestIdFrom(request.headers)
  const started = performance.now()
  return withRequestScope({ requestId }, async () => {
    const response = await answerOrApologise(() => answer({ requestId, log }), requestId, name, log)
    const path = new URL(request.url).pathname
    const line = {
      name,
      method: request.method,
      path,
      status: response.status,
      ms: Math.round(performance.now() - started),
    }
    log[response.status >= 500 ? 'error' : 'info'](line, 'request')
    return response
  })
}

async function answerOrApologise(
  answer: () => Promise<Answer> | Answer,
  requestId: string,
  name: string,
  log: Logger,
): Promise<Response> {
  try {
    const given = await answer()
    return given instanceof Response ? withRequestId(given, requestId) : respond(given, requestId, log)
  } catch (cause) {
    unstable_rethrow(cause) // redirect() and notFound() are thrown by design
    log.error({ err: cause, name }, 'request failed')
    return refusal({ code: 'internal', message: sentence }, requestId)
  }
}

function respond(result: Result<unknown>, requestId: string, log: Logger): Response {
  if (!result.ok) {
    const { code, message } = result.error
    if (code === 'internal') {
      log.error({ error: result.error }, message)
      return refusal({ code, message: sentence }, requestId)
    }
    return refusal(result.error, requestId)
  }
  const headers = { 'x-request-id': requestId, 'cache-control': 'no-store' }
  if (result.value === undefined) return new Response(null, { status: 204, headers })
  return Response.json(result.value, { headers })
}

function refusal(error: AppError, requestId: string): Response {
  const headers = { 'x-request-id': requestId, 'cache-control': 'no-store' }
  return Response.json({ error: { ...error, requestId } }, { status: httpStatus(error.code), headers })
}

/** Headers of a response made by fetch or redirect cannot be changed in place. */
function withRequestId(response: Response, requestId: string): Response {
  const headers = new Headers(response.headers)
  headers.set('x-request-id', requestId)
  return new Response(response.body, { status: response.status, statusText: response.statusText, headers })
}
