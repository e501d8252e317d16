// @ts-check
import { existsSync, readFileSync } from 'node:fs'
import { parseEnv } from 'node:util'
import { inCheckout } from './places.mjs'

/** What `.env` and `.env.local` set and the shell does not goes into `process.env`: the same order as Next.js has. */
export function readSettingsFiles() {
  for (const name of ['.env.local', '.env']) {
    const file = inCheckout(name)
    if (!existsSync(file)) continue
    for (const [key, value] of Object.entries(parseEnv(readFileSync(file, 'utf8')))) {
      if (!process.env[key] && value) process.env[key] = value
    }
  }
}
