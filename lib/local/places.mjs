// @ts-check
import { accessSync, chmodSync, constants, existsSync, mkdirSync, statSync } from 'node:fs'
import path from 'node:path'

/** The checkout. Everything here works from it, wherever the command was typed. */
export const checkout = path.resolve(import.meta.dirname, '../..')

/** What this machine keeps for this checkout: database, secrets, logs. Git-ignored. */
export const localFolder = path.join(checkout, '.local')

/** @param {string[]} parts */
export function inCheckout(...parts) {
  return path.join(checkout, ...parts)
}

/** A path in `.local`, which is made when missing. Others may pass through it (the database's owner must) but not list it. @param {string[]} parts */
export function inLocal(...parts) {
  if (!existsSync(localFolder)) {
    mkdirSync(localFolder, { recursive: true })
    chmodSync(localFolder, 0o711)
  }
  return path.join(localFolder, ...parts)
}

/** Some machines run us with a HOME that is missing or not ours; npm and Chromium then need another. */
export function ensureHome() {
  const home = process.env.HOME
  if (home && existsSync(home) && statSync(home).isDirectory() && isWritable(home)) return
  const own = inLocal('home')
  mkdirSync(own, { recursive: true })
  process.env.HOME = own
}

/** @param {string} folder */
function isWritable(folder) {
  try {
    accessSync(folder, constants.W_OK)
    return true
  } catch {
    return false
  }
}
