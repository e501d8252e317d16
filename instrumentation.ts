import type { Instrumentation } from 'next'

/** Once in each server process, before it answers. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME === 'nodejs') {
    const { startJobsWithServer } = await import('./lib/jobs/start-with-server')
    startJobsWithServer()
  }
}

/** Errors thrown while a page or action is rendered: logged with their cause; the error page shows the same digest. */
export const onRequestError: Instrumentation.onRequestError = async (cause, request, context) => {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return
  const { logger } = await import('./lib/http/logger')
  const { path, method, headers } = request
  const digest = cause instanceof Error && 'digest' in cause ? cause.digest : undefined
  const line = {
    err: cause,
    digest,
    method,
    path: path.split('?')[0],
    route: context.routePath,
    kind: context.routeType,
  }
  logger().error({ ...line, requestId: headers['x-request-id'] }, 'page failed')
}
