import { Pool } from 'pg'
import PgBoss from 'pg-boss'
import type { Logger } from 'pino'
import { type JobName, jobKind, jobNames } from '@/lib/queue/job-kinds'
import type { Handlers } from './handlers'

export type Worker = {
  /** Takes no new job, waits for those at work, at most `ms`; what is not done by then is tried again later. */
  stop(ms: number): Promise<void>
}

/** Starts working off the queue of a migrated database. Any number of processes may: each job goes to one of them. */
export async function startWorker(connectionString: string, handlers: Handlers, log: Logger): Promise<Worker> {
  // A pool of its own: a busy site does not keep its mail waiting, nor the other way round.
  const pool = new Pool({ connectionString, max: 4, connectionTimeoutMillis: 10_000, application_name: 'jobs' })
  pool.on('error', (err) => log.warn({ err }, 'an idle database connection of the job queue was lost'))
  const boss = new PgBoss({ db: { executeSql: (text, values) => pool.query(text, values) }, migrate: false })
  boss.on('error', (err) => log.error({ err }, 'the job queue had an error'))
  try {
    await boss.start()
    for (const name of jobNames) await workOn(boss, name, handlers, log)
  } catch (cause) {
    await boss.stop({ graceful: false })
    await pool.end()
    throw cause
  }
  const stop = async (ms: number) => {
    await boss.stop({ graceful: true, timeout: ms })
    await pool.end()
  }
  return { stop }
}

async function workOn(boss: PgBoss, name: JobName, handlers: Handlers, log: Logger): Promise<void> {
  const { payload, atOnce, lookEverySeconds } = jobKind(name)
  const handle = handlers[name] as (payload: unknown, run: { isLastTry: boolean }) => Promise<void>
  const run = async ([job]: PgBoss.JobWithMetadata<unknown>[]) => {
    if (!job) return
    const isLastTry = job.retryCount >= job.retryLimit
    try {
      await handle(payload.parse(job.data), { isLastTry })
    } catch (err) {
      log[isLastTry ? 'error' : 'warn']({ err, job: name, id: job.id, try: job.retryCount + 1 }, 'a job failed')
      throw err
    }
  }
  const options = { includeMetadata: true, batchSize: 1, pollingIntervalSeconds: lookEverySeconds } as const
  for (let worker = 0; worker < atOnce; worker++) await boss.work<unknown>(name, options, run)
}
