// @ts-check
import { fork } from 'node:child_process'
import { closeSync, openSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { pathToFileURL } from 'node:url'
import { startMailStandIn } from './mail-stand-in.mjs'
import { checkout, inLocal } from './places.mjs'
import { endGroup, moduleProgram } from './run.mjs'
import { lastLines, Trouble } from './say.mjs'

/**
 * @typedef {{ pid: number, address: string, ended: Promise<number | null>, stop: () => Promise<void>, mailPage?: string }} Server
 *   `mailPage`: where the mail that it sends can be read, when a stand-in takes it
 */

/**
 * Starts the built application, or the development server, on loopback and waits until it answers.
 * @param {{ port: number, databaseUrl: string, secret: string, logFile?: string, isDev?: boolean, isDemo?: boolean, isTest?: boolean, mailFolder?: string, signal?: AbortSignal }} options
 *   without `logFile` its lines go to the terminal
 * @returns {Promise<Server>}
 */
export async function startServer({
  port,
  databaseUrl,
  secret,
  logFile,
  isDev = false,
  isDemo = true,
  isTest = false,
  mailFolder = inLocal('mail'),
  signal,
}) {
  const address = `http://127.0.0.1:${port}`
  const mail = isDemo && (isTest || !process.env.SMTP_URL) ? await startMailStandIn(mailFolder) : undefined
  /** @type {NodeJS.ProcessEnv} */
  const env = {
    ...process.env,
    NODE_ENV: isDev ? 'development' : 'production',
    NEXT_TELEMETRY_DISABLED: '1',
    DATABASE_URL: databaseUrl,
    BETTER_AUTH_SECRET: secret,
    BETTER_AUTH_URL: (!isTest && process.env.BETTER_AUTH_URL) || address,
    TALLYBROOK_LOCAL: isDemo ? '1' : '0',
    TALLYBROOK_TEST: isTest ? '1' : '0',
    ...(mail && {
      SMTP_URL: mail.url,
      MAIL_FROM: 'Tallybrook <no-reply@tallybrook.example>',
      TALLYBROOK_MAIL_FOLDER: mail.folder,
    }),
  }
  const log = logFile ? openSync(logFile, 'w', 0o600) : undefined
  const child = fork(
    moduleProgram('next/dist/bin/next'),
    [isDev ? 'dev' : 'start', '-H', '127.0.0.1', '-p', String(port)],
    {
      cwd: checkout,
      env,
      execArgv: ['--import', pathToFileURL(path.join(import.meta.dirname, 'end-with-parent.mjs')).href],
      stdio: ['ignore', log ?? 'inherit', log ?? 'inherit', 'ipc'],
      detached: true, // Ctrl-C reaches us alone, so that the server stops before the database
    },
  )
  if (log !== undefined) closeSync(log)
  /** @type {Promise<number | null>} */
  const ended = new Promise((resolve) => {
    child.once('exit', resolve)
    child.once('error', () => resolve(null))
  })
  const stop = async () => {
    endGroup(child.pid, 'SIGTERM')
    const patience = new AbortController()
    const force = wait(8000, undefined, { signal: patience.signal }).then(
      () => endGroup(child.pid, 'SIGKILL'),
      () => {},
    )
    await ended
    patience.abort()
    await force
    await mail?.close()
  }
  try {
    await untilReady(address, ended, signal)
  } catch (cause) {
    await stop()
    if (!(cause instanceof Trouble) || !logFile) throw cause
    throw new Trouble(`${cause.message} The end of ${path.relative(checkout, logFile)} is above.`, {
      output: lastLines(readFileSync(logFile, 'utf8'), 30),
    })
  }
  return { pid: child.pid ?? 0, address, ended, stop, ...(mail && { mailPage: `${address}/local/mail` }) }
}

/** @param {string} address @param {Promise<number | null>} ended @param {AbortSignal} [signal] */
async function untilReady(address, ended, signal) {
  let isGone = false
  ended.then(() => {
    isGone = true
  })
  let last = 'it did not answer'
  for (let look = 0; look < 480; look++) {
    signal?.throwIfAborted()
    if (isGone) throw new Trouble('The server stopped while starting.')
    try {
      const answer = await fetch(`${address}/api/health`, { redirect: 'manual', signal: AbortSignal.timeout(60_000) })
      if (answer.ok) return
      last = `/api/health answered ${answer.status}`
    } catch {
      last = 'it did not answer'
    }
    await wait(250)
  }
  throw new Trouble(`The server was not ready after two minutes: ${last}.`)
}
