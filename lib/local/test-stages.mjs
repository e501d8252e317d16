// @ts-check
import { mkdirSync, rmSync } from 'node:fs'
import { buildWhenStale } from './build.mjs'
import { findChromium } from './chromium.mjs'
import { inCheckout } from './places.mjs'
import { postgresPrograms } from './postgres-programs.mjs'
import { moduleProgram, run } from './run.mjs'
import { elapsed, say } from './say.mjs'
import { sum, tallyOf } from './test-report.mjs'

/** @typedef {import('./test-report.mjs').Tally} Tally */
/** @typedef {(context: { files: string[], signal: AbortSignal }) => Promise<Tally>} Stage */

/** What a step takes at most on a machine that has much else to do. */
const limitMs = 20 * 60_000

/** Colours for a terminal, none for a log. */
const colours = process.stdout.isTTY ? { FORCE_COLOR: '1' } : { NO_COLOR: '1' }

/** On two cores the default is one worker. */
const everyCore = ['--maxWorkers=100%']

/** In the order they run. @type {Record<string, Stage>} */
export const stages = {
  check: async ({ signal }) =>
    sum([
      await step('format and lint', ['@biomejs/biome/bin/biome', 'check', '--error-on-warnings', '.'], signal),
      await step('types of routes', ['next/dist/bin/next', 'typegen'], signal),
      await step('types', ['typescript/bin/tsc', '--noEmit'], signal),
      await vitest('architecture', [], signal),
    ]),
  unit: ({ files, signal }) => vitest('unit', [...everyCore, ...files], signal),
  component: ({ files, signal }) => vitest('component', [...everyCore, ...files], signal),
  integration: async ({ files, signal }) => {
    if (!process.env.TEST_DATABASE_URL) await postgresPrograms({ signal })
    return vitest('integration', files, signal)
  },
  browser: async ({ files, signal }) => {
    if (!process.env.TEST_DATABASE_URL) await postgresPrograms({ signal })
    await findChromium(signal)
    await buildWhenStale(signal)
    return vitest('browser', files, signal)
  },
}

/** A program that is right or wrong as a whole: says nothing when right. @param {string} name @param {string[]} command @param {AbortSignal} signal */
async function step(name, [program = '', ...args], signal) {
  const started = Date.now()
  const env = { ...process.env, ...colours, NEXT_TELEMETRY_DISABLED: '1' }
  const ended = await run(process.execPath, [moduleProgram(program), ...args], { env, signal, limitMs })
  const isRight = ended.code === 0
  if (!isRight) process.stdout.write(`${ended.output}\n`)
  say(`  ${name}: ${isRight ? 'right' : 'WRONG'} (${elapsed(started)})`)
  return { passed: 0, failed: isRight ? 0 : 1, skipped: 0 }
}

/** Runs one vitest project, its lines shown as they come. @param {string} project @param {string[]} words files and options @param {AbortSignal} signal */
async function vitest(project, words, signal) {
  const report = inCheckout('test-results', `${project}.json`)
  mkdirSync(inCheckout('test-results'), { recursive: true })
  rmSync(report, { force: true })
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`]
  const args = [moduleProgram('vitest/vitest.mjs'), 'run', '--project', project, ...reporters, ...words]
  const env = { ...process.env, ...colours }
  const ended = await run(process.execPath, args, { env, signal, limitMs, show: true })
  return tallyOf(report, ended.code)
}
