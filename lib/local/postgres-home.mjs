// @ts-check
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, mkdtempSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { checkout, inLocal } from './places.mjs'
import { canEnter, giveTo, newOwner, ownerOf } from './postgres-owner.mjs'
import { say, Trouble } from './say.mjs'

/**
 * Where one cluster lives and who runs it. In `folder`: data/, log, credentials.json, port.
 * @typedef {{ folder: string, data: string, owner: import('./postgres-owner.mjs').Owner }} Home
 */

/** The home of the database that keeps people's work: found again where it was made. @returns {Home} */
export function durableHome() {
  const usual = inLocal('postgres')
  const noted = inLocal('postgres-folder')
  const known = existsSync(noted) ? readFileSync(noted, 'utf8').trim() : usual
  if (hasCluster(known)) return existingHome(known)
  const hash = createHash('sha256').update(checkout).digest('hex').slice(0, 12)
  const home = makeHome([usual, `/var/lib/tallybrook-${hash}`])
  if (home.folder !== usual) {
    say(
      `The database is kept in ${home.folder}: the user who runs PostgreSQL cannot reach a folder inside this checkout.`,
    )
    writeFileSync(noted, `${home.folder}\n`)
  }
  return home
}

/** The home of a database that is thrown away, in the machine's folder for such things. @returns {Home} */
export function throwAwayHome() {
  const owner = newOwner()
  const base = [tmpdir(), '/tmp'].find((folder) => existsSync(folder) && canEnter(folder, owner))
  if (!base)
    throw new Trouble('The user who runs PostgreSQL can reach no folder for temporary files. Set TMPDIR to one.')
  const folder = mkdtempSync(path.join(base, 'tallybrook-test-'))
  giveTo(owner, folder)
  return { folder, data: path.join(folder, 'data'), owner }
}

/** @param {string} folder */
function hasCluster(folder) {
  return existsSync(path.join(folder, 'data', 'PG_VERSION'))
}

/** @param {string} folder @returns {Home} */
function existingHome(folder) {
  const data = path.join(folder, 'data')
  const owner = ownerOf(data)
  if (!canEnter(folder, owner)) {
    throw new Trouble(
      `The user who runs PostgreSQL can no longer reach ${folder}, where the database is. ` +
        'Let others pass through its parent folders again (chmod o+x), then start again.',
    )
  }
  return { folder, data, owner }
}

/** @param {string[]} candidates @returns {Home} */
function makeHome(candidates) {
  const owner = newOwner()
  for (const folder of candidates) {
    if (hasCluster(folder)) return existingHome(folder)
    if (!canEnter(path.dirname(folder), owner)) continue
    try {
      mkdirSync(folder, { recursive: true, mode: 0o700 })
    } catch {
      continue // not ours to write in: the next one
    }
    giveTo(owner, folder)
    return { folder, data: path.join(folder, 'data'), owner }
  }
  throw new Trouble(
    `No folder was found for the database: tried ${candidates.join(' and ')}. ` +
      'Move the checkout to a folder whose parents others may pass through (chmod o+x), or set DATABASE_URL.',
  )
}
