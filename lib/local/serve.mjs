// @ts-check
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { buildWhenStale } from './build.mjs'
import { mayHoldDemoTeam, migrate, openDatabase, seed } from './database.mjs'
import { demoAccounts } from './demo-accounts.mjs'
import { inLocal } from './places.mjs'
import { freePort, isFree } from './ports.mjs'
import { noteRunning } from './running.mjs'
import { say, Trouble } from './say.mjs'
import { keptSecret } from './secret.mjs'
import { startServer } from './server.mjs'

/**
 * Database, build, server; then waits for the end of either side and puts everything away, the server before the database.
 * @param {{ isDev: boolean, signal: AbortSignal }} options
 * @returns {Promise<number>} exit code
 */
export async function serve({ isDev, signal }) {
  const database = await openDatabase(signal)
  try {
    await migrate(database.url, signal)
    const isDemo = mayHoldDemoTeam(database)
    if (isDemo) say(await seed(database.url, signal))
    if (!isDev) await buildWhenStale(signal)
    const port = await choosePort()
    const secret = process.env.BETTER_AUTH_SECRET || keptSecret(inLocal('auth-secret'))
    const logFile = isDev ? undefined : inLocal('server.log')
    const server = await startServer({ port, databaseUrl: database.url, secret, logFile, isDev, isDemo, signal })
    noteRunning({ address: server.address, server: server.pid })
    writeFileSync(inLocal('port'), String(port))
    sayReady(server, isDemo)
    const stopped = await Promise.race([
      server.ended,
      new Promise((resolve) => signal.addEventListener('abort', () => resolve('asked'))),
    ])
    if (stopped !== 'asked') {
      throw new Trouble(`The server stopped by itself. Its last lines are ${isDev ? 'above' : 'in .local/server.log'}.`)
    }
    say('\nStopping.')
    await server.stop()
    return 0
  } finally {
    database.stop()
  }
}

/** PORT where it is set; else 3000, the last one used, or any that is free. */
async function choosePort() {
  const asked = process.env.PORT
  if (!asked)
    return freePort(3000, existsSync(inLocal('port')) ? Number(readFileSync(inLocal('port'), 'utf8')) : undefined)
  const port = Number(asked)
  if (!Number.isInteger(port) || port < 1 || port > 65535)
    throw new Trouble(`PORT is "${asked}": set it to a number from 1 to 65535.`)
  if (await isFree(port)) return port
  throw new Trouble(`Port ${port} is in use by another program. Stop that one, or set PORT to another number.`)
}

/** @param {import('./server.mjs').Server} server @param {boolean} isDemo */
function sayReady({ address, mailPage }, isDemo) {
  say(`\nTallybrook is ready: ${address}\n`)
  if (isDemo) {
    const { password, accounts } = demoAccounts()
    say('Demo accounts, on this machine only:')
    for (const { email, role } of accounts) say(`  ${role.padEnd(10)}${email}`)
    say(`  ${'password'.padEnd(10)}${password}\n`)
  }
  if (mailPage) say(`Mail that it sends stays on this machine: ${mailPage}\n`)
  else if (!process.env.SMTP_URL) say('It can send no mail: SMTP_URL is not set (see .env.example).\n')
  say('Your work is kept when you stop. Stop with Ctrl-C.')
}
