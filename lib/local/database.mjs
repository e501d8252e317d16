// @ts-check

import { startCluster } from './postgres-cluster.mjs'
import { applicationDatabase } from './postgres-databases.mjs'
import { durableHome } from './postgres-home.mjs'
import { moduleProgram, run } from './run.mjs'
import { say, Trouble } from './say.mjs'

/** @typedef {{ url: string, isOwn: boolean, stop: () => void }} Database `isOwn`: this checkout's own, not one named by DATABASE_URL */

/** The database to work with, running. @param {AbortSignal} [signal] @returns {Promise<Database>} */
export async function openDatabase(signal) {
  const named = process.env.DATABASE_URL
  if (named) {
    say('Using the database that DATABASE_URL names.')
    return { url: named, isOwn: false, stop: () => {} }
  }
  const home = durableHome()
  const cluster = await startCluster(home, { signal })
  say(`PostgreSQL runs on port ${cluster.port}; your data is kept in ${home.folder}.`)
  return { url: await applicationDatabase(cluster), isOwn: true, stop: cluster.stop }
}

/** Brings the tables of `url` to what this checkout needs. @param {string} url @param {AbortSignal} [signal] */
export async function migrate(url, signal) {
  const ended = await runTypeScript('db/migrate.ts', url, signal)
  if (ended.code === 0) return
  throw new Trouble(
    'The database could not be brought up to date: the reason is above. Is DATABASE_URL right and its server running? ' +
      'A database used by a newer version of this program needs that version.',
    { output: ended.output },
  )
}

/** Adds the demo team unless it is there. Gives back what the seed says. @param {string} url @param {AbortSignal} [signal] */
export async function seed(url, signal) {
  const ended = await runTypeScript('db/seed/run.ts', url, signal, ['--demo'])
  if (ended.code === 0) return ended.output.trim()
  throw new Trouble('The demo team could not be added to the database: the reason is above.', { output: ended.output })
}

/** @param {string} file @param {string} url @param {AbortSignal} [signal] @param {string[]} [args] */
function runTypeScript(file, url, signal, args = []) {
  const env = { ...process.env, DATABASE_URL: url }
  return run(process.execPath, [moduleProgram('tsx/dist/cli.mjs'), file, ...args], {
    env,
    signal,
    limitMs: 10 * 60_000,
  })
}

/** Demo accounts have a password that everybody knows: only in a database on this very machine. @param {Database} database */
export function mayHoldDemoTeam({ url, isOwn }) {
  if (process.env.TALLYBROOK_DEMO) return process.env.TALLYBROOK_DEMO === '1'
  return isOwn || ['127.0.0.1', 'localhost', '[::1]'].includes(new URL(url).hostname)
}
