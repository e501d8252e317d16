// @ts-check
import { randomBytes } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'

/** The secret kept in `file` for the owner's eyes only; made at the first call. @param {string} file */
export function keptSecret(file) {
  if (existsSync(file)) {
    const kept = readFileSync(file, 'utf8').trim()
    if (kept.length >= 32) return kept
  }
  const made = newSecret()
  writeFileSync(file, `${made}\n`, { mode: 0o600 })
  return made
}

/** 256 bits, safe in a URL and in SQL. */
export function newSecret() {
  return randomBytes(32).toString('hex')
}
