// @ts-check
import { readFileSync } from 'node:fs'
import { inCheckout } from './places.mjs'

/**
 * The accounts that the seed makes, out of the file that it reads.
 * @returns {{ password: string, accounts: { role: string, email: string }[] }}
 */
export function demoAccounts() {
  return JSON.parse(readFileSync(inCheckout('db', 'seed', 'demo-accounts.json'), 'utf8'))
}
