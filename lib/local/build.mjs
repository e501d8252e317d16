// @ts-check
import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { checkout, inCheckout } from './places.mjs'
import { moduleProgram, run } from './run.mjs'
import { whoRuns } from './running.mjs'
import { elapsed, say, Trouble } from './say.mjs'

/** What the built application is made of, beside the files at the top of the checkout. */
const folders = ['app', 'components', 'hooks', 'lib', 'db', 'public', 'styles', 'migrations']
const topFiles = /\.(ts|tsx|mjs|css)$|^package-lock\.json$|^tsconfig\.json$/
const left = /\.test\.tsx?$|^lib\/local\/|^vitest\.config|^drizzle\.config|^next-env/

const stampFile = () => inCheckout('.next', 'tallybrook-build')

/** Builds for production unless the sources are those of the last build. @param {AbortSignal} [signal] */
export async function buildWhenStale(signal) {
  const stamp = hashOfSources()
  if (
    existsSync(stampFile()) &&
    existsSync(inCheckout('.next', 'BUILD_ID')) &&
    readFileSync(stampFile(), 'utf8') === stamp
  )
    return
  const other = whoRuns()
  if (other && other.pid !== process.pid) {
    throw new Trouble(
      `The sources have changed since the last build, and npm start (process ${other.pid}) serves that build now. ` +
        'Stop it with Ctrl-C, so that it can be built again.',
    )
  }
  say('Building; this takes about half a minute.')
  const started = Date.now()
  rmSync(stampFile(), { force: true })
  const ended = await run(process.execPath, [moduleProgram('next/dist/bin/next'), 'build'], { env: buildEnv(), signal })
  if (ended.code !== 0) throw new Trouble('The build failed: the reason is above.', { output: ended.output })
  writeFileSync(stampFile(), stamp)
  say(`Built in ${elapsed(started)}.`)
}

/** The build must not depend on how it will be run: pages that read settings do so when asked for. */
function buildEnv() {
  const env = { ...process.env, NODE_ENV: /** @type {const} */ ('production'), NEXT_TELEMETRY_DISABLED: '1' }
  for (const name of Object.keys(env)) {
    if (/^(TALLYBROOK_|BETTER_AUTH_|DATABASE_URL$|TEST_DATABASE_URL$|SMTP_URL$|MAIL_FROM$|VITEST)/.test(name))
      Reflect.deleteProperty(env, name)
  }
  return env
}

function hashOfSources() {
  const hash = createHash('sha256')
  for (const file of sourceFiles())
    hash
      .update(file)
      .update('\0')
      .update(readFileSync(inCheckout(file)))
      .update('\0')
  return hash.digest('hex')
}

/** Paths from the checkout, in one order on every machine. */
export function sourceFiles() {
  const top = readdirSync(checkout).filter((name) => topFiles.test(name))
  const inside = folders.flatMap((folder) =>
    existsSync(inCheckout(folder))
      ? readdirSync(inCheckout(folder), { recursive: true, withFileTypes: true })
          .filter((entry) => entry.isFile())
          .map((entry) => path.relative(checkout, path.join(entry.parentPath ?? entry.path, entry.name)))
      : [],
  )
  return [...top, ...inside]
    .map((file) => file.split(path.sep).join('/'))
    .filter((file) => !left.test(file))
    .sort()
}
