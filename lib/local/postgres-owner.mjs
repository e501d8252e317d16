// @ts-check
import { spawnSync } from 'node:child_process'
import { chownSync, readFileSync, statSync } from 'node:fs'
import path from 'node:path'
import { Trouble } from './say.mjs'

/** PostgreSQL refuses to run as root: who runs it. Empty for the person who typed the command. @typedef {{ uid?: number, gid?: number }} Owner */

/** The owner for a new cluster: oneself, or for root the first unprivileged user that the machine has for this. @returns {Owner} */
export function newOwner() {
  if (process.getuid?.() !== 0) return {}
  const users = readFileSync('/etc/passwd', 'utf8')
  for (const name of ['postgres', 'nobody']) {
    const found = new RegExp(`^${name}:[^:]*:(\\d+):(\\d+):`, 'm').exec(users)
    if (found) return { uid: Number(found[1]), gid: Number(found[2]) }
  }
  throw new Trouble(
    'PostgreSQL cannot run as root, and this machine has no user postgres or nobody. Start as another user.',
  )
}

/** The owner of a cluster that exists; refuses one that belongs to somebody else. @param {string} data @returns {Owner} */
export function ownerOf(data) {
  const { uid, gid } = statSync(data)
  const self = process.getuid?.()
  if (self === uid) return {}
  if (self === 0) return { uid, gid }
  throw new Trouble(
    `The database in ${path.dirname(data)} belongs to another user of this machine (number ${uid}). ` +
      'Start as the user who started it first (perhaps root), or set DATABASE_URL to a database of your own.',
  )
}

/** Whether `owner` can get into `folder`: asked by going there. @param {string} folder @param {Owner} owner */
export function canEnter(folder, owner) {
  return spawnSync('/bin/sh', ['-c', 'cd "$1"', 'sh', folder], { ...owner, cwd: '/', stdio: 'ignore' }).status === 0
}

/** @param {Owner} owner @param {string} place a file or folder */
export function giveTo(owner, place) {
  if (owner.uid !== undefined && owner.gid !== undefined) chownSync(place, owner.uid, owner.gid)
}
