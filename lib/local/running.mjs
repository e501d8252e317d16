// @ts-check
import { spawnSync } from 'node:child_process'
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { inLocal } from './places.mjs'

/** One `npm start` at a time in a checkout. `address` is known once it serves. @typedef {{ pid: number, address?: string, server?: number }} Running */

const lockFile = () => inLocal('running.json')

/** Takes the lock; gives back who holds it when somebody does. @returns {Running | undefined} */
export function claim() {
  for (;;) {
    try {
      writeFileSync(lockFile(), JSON.stringify({ pid: process.pid }), { flag: 'wx', mode: 0o600 })
      return undefined
    } catch (cause) {
      if (!(cause instanceof Error && 'code' in cause && cause.code === 'EEXIST')) throw cause
    }
    const holder = whoRuns()
    if (holder) return holder
    endLeftServer(read())
    rmSync(lockFile(), { force: true })
  }
}

/** Who runs the program from this checkout now, if anybody. @returns {Running | undefined} */
export function whoRuns() {
  const noted = read()
  return noted && isCommand(noted.pid, 'start.mjs') ? noted : undefined
}

/** @param {Omit<Running, 'pid'>} facts */
export function noteRunning(facts) {
  writeFileSync(lockFile(), JSON.stringify({ pid: process.pid, ...facts }), { mode: 0o600 })
}

export function release() {
  if (read()?.pid === process.pid) rmSync(lockFile(), { force: true })
}

/** @returns {Running | undefined} */
function read() {
  try {
    return JSON.parse(readFileSync(lockFile(), 'utf8'))
  } catch {
    return undefined // none, or broken off while written
  }
}

/** A start that was killed outright leaves a server that ends by itself in a moment; one that hangs is ended here. @param {Running} [left] */
function endLeftServer(left) {
  if (!left?.server || !isCommand(left.server, 'next')) return
  try {
    process.kill(left.server, 'SIGKILL')
  } catch {
    // It has just ended.
  }
}

/** Process numbers are used again after a restart of the machine: the command line must fit too. @param {number} pid @param {string} word */
function isCommand(pid, word) {
  const file = `/proc/${pid}/cmdline`
  if (existsSync('/proc/self/cmdline')) return existsSync(file) && readFileSync(file, 'utf8').includes(word)
  return spawnSync('ps', ['-o', 'command=', '-p', String(pid)], { encoding: 'utf8' }).stdout.includes(word)
}
