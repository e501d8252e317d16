// @ts-check
import { spawnSync } from 'node:child_process'
import { existsSync } from 'node:fs'
import { run } from './run.mjs'
import { elapsed, say, Trouble } from './say.mjs'

/** How apt-get may be called here without asking anybody: as root, through sudo without a password, or not at all. */
export function aptPrefix() {
  if (!existsSync('/usr/bin/apt-get') || process.env.TALLYBROOK_NO_INSTALL === '1') return undefined
  if (process.getuid?.() === 0) return []
  const mayRun = spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status === 0
  return mayRun ? ['sudo', '-n'] : undefined
}

/**
 * Installs one Debian package.
 * @param {string} name @param {string[]} prefix from `aptPrefix` @param {AbortSignal} [signal]
 */
export async function installPackage(name, prefix, signal) {
  say(`Installing the Debian package ${name} (apt-get); this takes a minute.`)
  const started = Date.now()
  const options = ['-o', 'DPkg::Lock::Timeout=300', '-o', 'Acquire::Retries=3', '-q', '-y']
  /** @param {string[]} args */
  const apt = (args) => {
    const [program = 'apt-get', ...rest] = [
      ...prefix,
      'env',
      'DEBIAN_FRONTEND=noninteractive',
      'apt-get',
      ...options,
      ...args,
    ]
    return run(program, rest, { signal, limitMs: 10 * 60_000 })
  }
  const update = await apt(['update'])
  const install = await apt(['install', '--no-install-recommends', name])
  if (install.code !== 0) {
    throw new Trouble(
      `The Debian package ${name} could not be installed: apt-get says why above. Install it by hand, then start again.`,
      {
        output: update.output + install.output,
      },
    )
  }
  say(`${name} installed in ${elapsed(started)}.`)
}
