import { readFileSync } from 'node:fs'
import { solve, toResult } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

/** `npm run -s solve -- FILE…`: one JSON result a line for each good file, one line per fault of a bad one, exit 2 if any. */
const arguments_ = process.argv.slice(2)
const options = arguments_.filter((text) => text.startsWith('--'))
const files = arguments_.filter((text) => !text.startsWith('--'))

let bad = false
const refuse = (file: string, path: string, what: string): void => {
  bad = true
  // One line a fault, whatever an id holds.
  process.stderr.write(`${`${file}: ${path}: ${what}`.replace(/\s+/g, ' ')}\n`)
}

for (const option of options)
  if (option !== '--all-boundaries') refuse(option, 'option', 'is not known; --all-boundaries is')
if (files.length === 0) {
  process.stderr.write('Name one or more problem files, or - for standard input: npm run -s solve -- FILE…\n')
  bad = true
}

for (const file of files) {
  const json = readJson(file)
  if (!json) continue
  const parsed = parseProblem(json.value)
  if (!parsed.ok) for (const { path, what } of parsed.problems) refuse(file, path, what)
  else process.stdout.write(`${JSON.stringify(toResult(parsed.problem, solve(parsed.problem)))}\n`)
}
process.exitCode = bad ? 2 : 0

function readJson(file: string): { value: unknown } | undefined {
  let text: string
  try {
    text = readFileSync(file === '-' ? 0 : file, 'utf8')
  } catch (error) {
    refuse(file, 'file', `cannot be read (${error instanceof Error ? error.message : String(error)})`)
    return undefined
  }
  try {
    return { value: JSON.parse(text.replace(/^\uFEFF/, '')) }
  } catch (error) {
    const reason = error instanceof Error ? error.message.replace(/\s+/g, ' ') : String(error)
    refuse(file, 'file', `is not JSON (${reason})`)
    return undefined
  }
}
