// @ts-check
import { installDependencies } from './dependencies.mjs'
import { checkNodeVersion } from './node-version.mjs'
import { ensureHome } from './places.mjs'
import { claim, release } from './running.mjs'
import { say, sayTrouble } from './say.mjs'
import { serve } from './serve.mjs'
import { readSettingsFiles } from './settings-file.mjs'
import { stopSignal } from './stopping.mjs'

/** `npm start` and, with --dev, `npm run dev`: from a clean clone to a served application, until Ctrl-C. */
async function main() {
  checkNodeVersion()
  readSettingsFiles()
  ensureHome()
  const holder = claim()
  if (holder) {
    say(
      holder.address
        ? `Tallybrook runs already, at ${holder.address} (process ${holder.pid}). Stop it with Ctrl-C where it was started.`
        : `Tallybrook is being started already (process ${holder.pid}): its terminal will tell the address.`,
    )
    return 0
  }
  const signal = stopSignal()
  try {
    await installDependencies(signal)
    return await serve({ isDev: process.argv.includes('--dev'), signal })
  } catch (cause) {
    if (signal.aborted) {
      say('\nStopped.')
      return 0
    }
    sayTrouble(cause)
    return 1
  } finally {
    release()
  }
}

main().then(
  (code) => process.exit(code),
  (cause) => {
    sayTrouble(cause)
    process.exit(1)
  },
)
