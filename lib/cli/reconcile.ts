import { parseArgs } from 'node:util'
import { reconcile } from '@/lib/balance'
import { answerFiles, refuse } from './problem-files'

/** `npm run -s reconcile -- FILE…`: one JSON result a line for each good file; `--level 0.95` is the level of the tests. */
const { values, positionals, tokens } = parseArgs({
  options: { level: { type: 'string', default: '0.95' } },
  allowPositionals: true,
  strict: false,
  tokens: true,
})
for (const token of tokens)
  if (token.kind === 'option' && token.name !== 'level') refuse(token.rawName, 'option', 'is not known; --level is')

const level = Number(values.level)
if (!(level > 0 && level < 1)) {
  refuse('--level', 'option', 'must be a number between 0 and 1, such as 0.95')
  process.exitCode = 2
} else answerFiles(positionals, 'npm run -s reconcile -- FILE…', (problem) => reconcile(problem, { level }))
