// @ts-check
import { accessSync, constants } from 'node:fs'
import path from 'node:path'
import { aptPrefix, installPackage } from './debian-packages.mjs'
import { Trouble } from './say.mjs'

const names = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome']
const elsewhere = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
]

/** The browser for the browser tests; Debian's package is installed when there is none and that is allowed. @param {AbortSignal} [signal] */
export async function findChromium(signal) {
  const found = look()
  if (found) return found
  const prefix = aptPrefix()
  if (prefix) await installPackage('chromium', prefix, signal)
  const installed = look()
  if (installed) return installed
  throw new Trouble(
    'The browser tests need Chromium, which was not found on this machine. Install it (on Debian: apt-get install chromium), ' +
      'or set CHROMIUM to the path of a Chromium or Chrome.',
  )
}

function look() {
  const named = process.env.CHROMIUM
  const onPath = (process.env.PATH ?? '').split(path.delimiter).filter(Boolean)
  const places = names.flatMap((name) => onPath.map((folder) => path.join(folder, name)))
  return [...(named ? [named] : []), ...places, ...elsewhere].find(isProgram)
}

/** @param {string} file */
function isProgram(file) {
  try {
    accessSync(file, constants.X_OK)
    return true
  } catch {
    return false
  }
}
