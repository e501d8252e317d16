import { drizzle } from 'drizzle-orm/node-postgres'
import { Pool } from 'pg'
import { env } from '@/lib/env'
import { logger } from '@/lib/http/logger'
import * as account from './schema/account'
import * as book from './schema/book'
import * as settings from './schema/settings'
import * as team from './schema/team'

const schema = { ...account, ...team, ...settings, ...book }

/** Kept on globalThis so that reloading a module while developing does not open a second pool. */
const shared = globalThis as { tallybrookPool?: Pool }

function makePool(): Pool {
  const pool = new Pool({
    connectionString: env.databaseUrl,
    max: 10,
    connectionTimeoutMillis: 10_000,
    statement_timeout: 60_000,
    idle_in_transaction_session_timeout: 60_000,
  })
  // Without a listener, a connection lost while idle would end the process.
  pool.on('error', (err) => logger().warn({ err }, 'an idle database connection was lost'))
  return pool
}

/** Connects on the first query, not on import. */
shared.tallybrookPool ??= makePool()
export const pool = shared.tallybrookPool
export const db = drizzle({ client: pool, schema })

export type Database = typeof db
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0]
/** What a query runs on, in or out of a transaction. */
export type Runner = Database | Transaction
