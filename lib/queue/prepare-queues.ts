import PgBoss from 'pg-boss'
import { jobKind, jobNames } from './job-kinds'

/**
 * Brings the queue's own schema (`pgboss`) and its queues to what this checkout needs; part of migrating a database.
 * Safe to repeat, and while servers run.
 */
export async function prepareQueues(connectionString: string): Promise<void> {
  const boss = new PgBoss({ connectionString, max: 1, supervise: false, schedule: false })
  // Without a listener an error of an idle connection would end the process.
  boss.on('error', () => {})
  await boss.start()
  try {
    for (const name of jobNames) {
      const { retries, retryAfterSeconds, expiresAfterSeconds, every } = jobKind(name)
      const options = {
        name,
        retryLimit: retries,
        retryDelay: retryAfterSeconds,
        retryBackoff: true,
        expireInSeconds: expiresAfterSeconds,
      }
      await boss.createQueue(name, options)
      await boss.updateQueue(name, options) // of an earlier version
      if (every === undefined) await boss.unschedule(name)
      else await boss.schedule(name, every, {}, { tz: 'UTC' })
    }
  } finally {
    await boss.stop({ graceful: false })
  }
}
