import { drizzle } from 'drizzle-orm/node-postgres'
import { migrate } from 'drizzle-orm/node-postgres/migrator'
import { Client } from 'pg'
import { env } from '@/lib/env'
import { prepareQueues } from '@/lib/queue/prepare-queues'

/** Any number that no other program takes for its lock on the same database. */
const migrationLock = 7_331_001

/** Brings the tables of a database to what this checkout needs. One at a time: others wait for the lock and find it done. */
export async function migrateDatabase(url: string): Promise<void> {
  const client = new Client({ connectionString: url, connectionTimeoutMillis: 10_000 })
  await client.connect()
  try {
    await client.query('select pg_advisory_lock($1)', [migrationLock])
    await migrate(drizzle({ client }), { migrationsFolder: new URL('../migrations', import.meta.url).pathname })
    await prepareQueues(url)
  } finally {
    await client.end()
  }
}

if (process.argv[1] !== undefined && import.meta.url === new URL(process.argv[1], 'file:').href) {
  migrateDatabase(env.databaseUrl).catch((cause: unknown) => {
    console.error(cause)
    process.exitCode = 1
  })
}
