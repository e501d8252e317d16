// @ts-check
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { inCheckout, inLocal } from './places.mjs'
import { run } from './run.mjs'
import { elapsed, say, Trouble } from './say.mjs'

/** @typedef {{ packages: Record<string, { version?: string, optional?: boolean }> }} Lock */

const stampFile = () => inCheckout('node_modules', '.tallybrook-lock')

/** Installs what package-lock.json names when it is missing or older than that file. @param {AbortSignal} [signal] */
export async function installDependencies(signal) {
  const lockText = readFileSync(inCheckout('package-lock.json'), 'utf8')
  const stamp = createHash('sha256').update(lockText).digest('hex')
  if (existsSync(stampFile()) && readFileSync(stampFile(), 'utf8') === stamp) return
  const hidden = inCheckout('node_modules', '.package-lock.json')
  const isThere = existsSync(hidden) && installedAgrees(JSON.parse(lockText), JSON.parse(readFileSync(hidden, 'utf8')))
  if (!isThere) await install(signal)
  writeFileSync(stampFile(), stamp)
}

/**
 * True when everything the lock asks for is installed in that version, as npm itself noted it in node_modules; packages
 * for other machines (optional) may be missing.
 * @param {Lock} lock @param {Lock} installed
 */
export function installedAgrees(lock, installed) {
  return Object.entries(lock.packages).every(([place, { version, optional }]) => {
    if (place === '') return true
    const found = installed.packages[place]
    return found ? found.version === version : optional === true
  })
}

/** @param {AbortSignal} [signal] */
async function install(signal) {
  say('Installing dependencies (npm ci); a first time takes a minute or two.')
  const started = Date.now()
  const { program, args } = npmCommand()
  // --include=dev: NODE_ENV=production would leave out what builds and tests need.
  const ended = await run(program, [...args, 'ci', '--include=dev', '--no-audit', '--no-fund'], { signal })
  if (ended.code !== 0) {
    throw new Trouble(
      'The dependencies could not be installed: npm says why above. Check the network or the npm registry, then start again.',
      { output: ended.output },
    )
  }
  say(`Dependencies installed in ${elapsed(started)}.`)
}

/** npm as it runs us, when it does; otherwise the one on PATH. */
function npmCommand() {
  inLocal()
  const own = process.env.npm_execpath
  return own?.endsWith('.js') ? { program: process.execPath, args: [own] } : { program: 'npm', args: [] }
}
