// @ts-check
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { inLocal } from './places.mjs'
import { startCluster } from './postgres-cluster.mjs'
import { applicationDatabase, createDatabase, dropDatabase } from './postgres-databases.mjs'
import { throwAwayHome } from './postgres-home.mjs'

/**
 * A new, empty database for tests: on the server of TEST_DATABASE_URL where that is set, else on a throw-away cluster.
 * `close` takes away whatever was made.
 * @returns {Promise<{ url: string, close: () => Promise<void> }>}
 */
export async function openTestDatabase() {
  const named = process.env.TEST_DATABASE_URL
  if (named) {
    const name = `tallybrook_test_${process.pid}_${Date.now()}`
    return { url: await createDatabase(named, name), close: () => dropDatabase(named, name) }
  }
  await sweep()
  const home = throwAwayHome()
  const note = noteOf(process.pid, home.folder)
  writeFileSync(note, home.folder)
  const cluster = await startCluster(home, { careless: true })
  const close = async () => {
    cluster.stop()
    rmSync(home.folder, { recursive: true, force: true })
    rmSync(note, { force: true })
  }
  return { url: await applicationDatabase(cluster), close }
}

/** Which process uses which throw-away folder, so that what a killed test run left can be found. @param {number} pid @param {string} folder */
function noteOf(pid, folder) {
  const notes = inLocal('test-clusters')
  mkdirSync(notes, { recursive: true })
  return path.join(notes, `${pid}-${path.basename(folder)}`)
}

/** Ends and removes the throw-away clusters of test runs that were killed. */
async function sweep() {
  const notes = inLocal('test-clusters')
  if (!existsSync(notes)) return
  for (const name of readdirSync(notes)) {
    if (isAlive(Number.parseInt(name, 10))) continue
    const folder = readFileSync(path.join(notes, name), 'utf8')
    const pidFile = path.join(folder, 'data', 'postmaster.pid')
    if (existsSync(pidFile)) end(Number.parseInt(readFileSync(pidFile, 'utf8'), 10), folder)
    rmSync(folder, { recursive: true, force: true })
    rmSync(path.join(notes, name), { force: true })
  }
}

/** @param {number} pid */
function isAlive(pid) {
  try {
    process.kill(pid, 0)
    return true
  } catch {
    return false
  }
}

/** Ends a left-over postmaster, if that is what the number still stands for. @param {number} pid @param {string} folder */
function end(pid, folder) {
  const commandLine = `/proc/${pid}/cmdline`
  if (!existsSync(commandLine) || !readFileSync(commandLine, 'utf8').includes(folder)) return
  process.kill(pid, 'SIGQUIT') // at once, and with its children
}
