// @ts-check
import { installDependencies } from './dependencies.mjs'
import { checkNodeVersion } from './node-version.mjs'
import { ensureHome } from './places.mjs'
import { elapsed, say, sayTrouble } from './say.mjs'
import { stopSignal } from './stopping.mjs'
import { sentence, sum } from './test-report.mjs'
import { stages } from './test-stages.mjs'

/**
 * `npm test`: every stage, or those named (`npm test -- unit browser`); words that are no stage narrow the test files
 * (`npm test -- unit lib/book`). Ends with "N passed, N failed".
 */
async function main() {
  checkNodeVersion()
  ensureHome()
  const words = process.argv.slice(2)
  const named = words.filter((word) => word in stages)
  const files = words.filter((word) => !(word in stages))
  if (files.length > 0 && named.length === 0) {
    say(`Say which stage to run first: ${Object.keys(stages).join(', ')}. For example: npm test -- unit ${files[0]}`)
    return 2
  }
  const signal = stopSignal()
  await installDependencies(signal)

  const started = Date.now()
  /** @type {Record<string, import('./test-report.mjs').Tally>} */
  const tallies = {}
  const chosen = Object.entries(stages).filter(([name]) => named.length === 0 || named.includes(name))
  for (const [place, [name, stage]] of chosen.entries()) {
    if (signal.aborted) break
    say(`\n[${place + 1}/${chosen.length}] ${name}`)
    const begun = Date.now()
    tallies[name] = await stage({ files, signal }).catch((cause) => {
      if (!signal.aborted) sayTrouble(cause)
      return { passed: 0, failed: 1, skipped: 0 }
    })
    say(`  ${name}: ${sentence(tallies[name])} (${elapsed(begun)})`)
  }

  const total = sum(Object.values(tallies))
  const failed = Object.entries(tallies).filter(([, tally]) => tally.failed > 0)
  say(`\nTook ${elapsed(started)}.`)
  if (failed.length > 0) say(`Failures in: ${failed.map(([name, tally]) => `${name} (${tally.failed})`).join(', ')}.`)
  if (signal.aborted) say('Stopped before the end.')
  say(sentence(total))
  return total.failed > 0 || total.passed === 0 || signal.aborted ? 1 : 0
}

main().then(
  (code) => process.exit(code),
  (cause) => {
    sayTrouble(cause)
    say('0 passed, 1 failed')
    process.exit(1)
  },
)
