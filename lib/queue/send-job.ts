import { type SQL, sql } from 'drizzle-orm'
import PgBoss from 'pg-boss'
import { type JobName, type JobPayload, jobKinds } from './job-kinds'

/** What a statement runs on: a database or, where it should stand or fall with more, a transaction. */
export type Runner = { execute(query: SQL): PromiseLike<{ rows: unknown[] }> }

type Options = {
  /** Not before this moment. */
  startAfter?: Date
}

/**
 * Puts a job into the queue through `runner`: in a transaction it is there if and only if that commits. The queue's
 * tables are made by `npm run db:migrate`.
 */
export async function sendJob<N extends JobName>(
  runner: Runner,
  name: N,
  payload: JobPayload<N>,
  { startAfter }: Options = {},
): Promise<void> {
  const data = jobKinds[name].payload.parse(payload)
  const id = await sender().send(name, data, { db: runningOn(runner), ...(startAfter ? { startAfter } : {}) })
  if (id === null) throw new Error(`The queue ${name} is missing: the database was not migrated`)
}

let made: PgBoss | undefined

/** Never started: it holds no connection, and all that it does goes through the runner it is handed. */
function sender(): PgBoss {
  const nowhere = { executeSql: () => Promise.reject(new Error('A job is sent through a runner')) }
  made ??= new PgBoss({ db: nowhere })
  return made
}

/** Turns "$1" and its value into drizzle's form, piece by piece. */
function runningOn(runner: Runner): PgBoss.Db {
  return {
    async executeSql(text, values) {
      const pieces = text.split(/\$(\d+)/)
      const chunks = pieces.map((piece, place) =>
        place % 2 === 0 ? sql.raw(piece) : sql`${sql.param(values[Number(piece) - 1] ?? null)}`,
      )
      const { rows } = await runner.execute(sql.join(chunks))
      return { rows }
    },
  }
}
