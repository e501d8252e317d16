// @ts-check
import { spawn } from 'node:child_process'
import { checkout } from './places.mjs'
import { Trouble } from './say.mjs'

/** @typedef {{ code: number | null, output: string }} Ended */

/**
 * Runs a program to its end in the checkout and gives back what it printed. Nothing is read from the keyboard.
 * @param {string} program
 * @param {string[]} args
 * @param {{ env?: NodeJS.ProcessEnv, signal?: AbortSignal, show?: boolean, limitMs?: number }} [options]
 *   `show`: print its lines as they come; `limitMs`: end it, and all it started, after this long
 * @returns {Promise<Ended>}
 */
export function run(program, args, { env = process.env, signal, show = false, limitMs } = {}) {
  return new Promise((resolve, reject) => {
    signal?.throwIfAborted()
    // A group of its own, so that what it started ends with it.
    const child = spawn(program, args, { cwd: checkout, env, stdio: ['ignore', 'pipe', 'pipe'], detached: true })
    let output = ''
    /** @param {Buffer} chunk */
    const keep = (chunk) => {
      output += chunk.toString()
      if (show) process.stdout.write(chunk)
    }
    const stop = () => endGroup(child.pid, 'SIGTERM')
    const timer =
      limitMs &&
      setTimeout(() => {
        keep(Buffer.from(`\nEnded after ${Math.round(limitMs / 60_000)} minutes without finishing.\n`))
        endGroup(child.pid, 'SIGKILL')
      }, limitMs)
    const settle = () => {
      if (timer) clearTimeout(timer)
      signal?.removeEventListener('abort', stop)
    }
    signal?.addEventListener('abort', stop)
    child.stdout.on('data', keep)
    child.stderr.on('data', keep)
    child.on('error', (cause) => {
      settle()
      reject(new Trouble(`${program} could not be started: ${cause.message}.`, { cause }))
    })
    child.on('close', (code) => {
      settle()
      if (signal?.aborted) reject(signal.reason)
      else resolve({ code, output })
    })
  })
}

/** @param {number | undefined} pid leader of the group @param {NodeJS.Signals} signal */
export function endGroup(pid, signal) {
  if (!pid) return
  try {
    process.kill(-pid, signal)
  } catch {
    // It has ended by itself.
  }
}

/** The arguments that make Node run a program out of node_modules. @param {string} file */
export function moduleProgram(file) {
  return `${checkout}/node_modules/${file}`
}
