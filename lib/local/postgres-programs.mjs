// @ts-check
import { spawnSync } from 'node:child_process'
import { existsSync, readdirSync, realpathSync } from 'node:fs'
import path from 'node:path'
import { aptPrefix, installPackage } from './debian-packages.mjs'
import { Trouble } from './say.mjs'

/** @typedef {{ folder: string, major: number }} Programs */

const oldest = 14
const needed = ['initdb', 'pg_ctl', 'postgres']

/** Folders where systems put PostgreSQL's server programs, one a version. */
const familiar = [
  { base: '/usr/lib/postgresql', inside: 'bin' },
  { base: '/usr/pgsql', inside: 'bin' },
  { base: '/opt/homebrew/opt', inside: 'bin' },
  { base: '/usr/local/opt', inside: 'bin' },
  { base: '/Applications/Postgres.app/Contents/Versions', inside: 'bin' },
]

/**
 * The server programs to use: of version `major` where a database already has one, else the newest. Installs Debian's
 * package when there are none and that is allowed.
 * @param {{ major?: number, signal?: AbortSignal }} [wanted]
 * @returns {Promise<Programs>}
 */
export async function postgresPrograms({ major, signal } = {}) {
  const first = choose(findAll(), major)
  if (first) return first
  const prefix = aptPrefix()
  const name = major ? `postgresql-${major}` : 'postgresql'
  if (prefix) {
    await installPackage(name, prefix, signal)
    const installed = choose(findAll(), major)
    if (installed) return installed
  }
  const what = major ? `PostgreSQL ${major}, which made this checkout's database,` : `PostgreSQL ${oldest} or newer`
  throw new Trouble(
    `${what} was not found on this machine. Install its server (on Debian or Ubuntu: apt-get install ${name}) and start again, ` +
      'or set DATABASE_URL (for npm test: TEST_DATABASE_URL) to one you already have.',
  )
}

/** @param {Programs[]} found @param {number} [major] */
function choose(found, major) {
  const fit = found.filter((programs) => (major ? programs.major === major : programs.major >= oldest))
  return fit.sort((a, b) => b.major - a.major)[0]
}

/** @returns {Programs[]} */
function findAll() {
  const folders = [
    ...familiar.flatMap(versionFolders),
    ...(process.env.PATH ?? '').split(path.delimiter),
    pgConfigFolder(),
  ]
  const complete = folders.filter((folder) => folder && needed.every((name) => existsSync(path.join(folder, name))))
  return [...new Set(complete.map((folder) => realpathSync(folder)))].flatMap((folder) => {
    const major = majorOf(folder)
    return major ? [{ folder, major }] : []
  })
}

/** @param {{ base: string, inside: string }} place */
function versionFolders({ base, inside }) {
  if (base === '/usr/pgsql') return listed('/usr', /^pgsql-\d+$/).map((name) => path.join('/usr', name, inside))
  return listed(base, /^(postgresql(@\d+)?|\d+)$/).map((name) => path.join(base, name, inside))
}

/** @param {string} folder @param {RegExp} name */
function listed(folder, name) {
  return existsSync(folder) ? readdirSync(folder).filter((entry) => name.test(entry)) : []
}

function pgConfigFolder() {
  const asked = spawnSync('pg_config', ['--bindir'], { encoding: 'utf8' })
  return asked.status === 0 ? asked.stdout.trim() : ''
}

/** @param {string} folder */
function majorOf(folder) {
  const asked = spawnSync(path.join(folder, 'postgres'), ['--version'], { encoding: 'utf8' })
  return Number(/\(PostgreSQL\) (\d+)/.exec(asked.stdout ?? '')?.[1] ?? 0)
}
