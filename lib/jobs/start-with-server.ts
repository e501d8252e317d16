import { setTimeout as wait } from 'node:timers/promises'
import { env } from '@/lib/env'
import { logger } from '@/lib/http/logger'
import { handlers } from './handlers'
import { startWorker, type Worker } from './worker'

/** Well within the time that whoever stops the server gives it. */
const patienceMs = 4000

/** One worker a process, also where a module is loaded twice while developing. */
const shared = globalThis as { tallybrookJobs?: { stop: () => Promise<void> } }

/** Works off the queue from within the server process. The server answers meanwhile, even where the database does not yet. */
export function startJobsWithServer(): void {
  if (env.isBuilding || shared.tallybrookJobs) return
  const stopping = new AbortController()
  const worker = untilStarted(stopping.signal)
  const stop = async () => {
    stopping.abort()
    await (await worker)?.stop(patienceMs)
  }
  shared.tallybrookJobs = { stop }
  for (const signal of ['SIGTERM', 'SIGINT'] as const) stopBefore(signal, stop)
}

async function untilStarted(stopping: AbortSignal): Promise<Worker | undefined> {
  while (!stopping.aborted) {
    try {
      return await startWorker(env.databaseUrl, handlers, logger())
    } catch (err) {
      logger().error({ err }, 'the job worker could not start; trying again in 10 s')
      await wait(10_000, undefined, { signal: stopping }).catch(() => {})
    }
  }
  return undefined
}

/**
 * Next.js ends the process as soon as its last request is answered. What it does on a signal is put off until jobs have
 * stopped, so that no mail is cut off half sent.
 */
function stopBefore(signal: NodeJS.Signals, stop: () => Promise<void>): void {
  const others = process.listeners(signal)
  for (const listener of others) process.off(signal, listener)
  let isStopping = false
  process.on(signal, async () => {
    if (isStopping) return
    isStopping = true
    await stop().catch((err: unknown) => logger().error({ err }, 'the job worker did not stop in good order'))
    for (const listener of others) listener(signal)
    if (others.length === 0) process.exit(0)
  })
}
