// @ts-check
import { readFileSync } from 'node:fs'
import { inCheckout } from './places.mjs'
import { Trouble } from './say.mjs'

/** Refuses a Node older than package.json's `engines.node` (">=20.19"). @param {string} running */
export function checkNodeVersion(running = process.versions.node) {
  const wanted = JSON.parse(readFileSync(inCheckout('package.json'), 'utf8')).engines.node.replace('>=', '')
  if (isAtLeast(running, wanted)) return
  throw new Trouble(
    `This needs Node ${wanted} or newer and runs on Node ${running}. Install a newer one (https://nodejs.org) and start again.`,
  )
}

/** @param {string} version @param {string} least */
export function isAtLeast(version, least) {
  const have = version.split('.').map(Number)
  const want = least.split('.').map(Number)
  for (const [place, number] of want.entries()) {
    const difference = (have[place] ?? 0) - number
    if (difference !== 0) return difference > 0
  }
  return true
}
