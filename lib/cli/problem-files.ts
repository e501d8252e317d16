import { readFileSync } from 'node:fs'
import type { Problem } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'

let bad = false

/** One line a fault on standard error, whatever an id holds; the command then ends with 2. */
export function refuse(file: string, path: string, what: string): void {
  bad = true
  process.stderr.write(`${`${file}: ${path}: ${what}`.replace(/\s+/g, ' ')}\n`)
}

/** Answers each good file in order with one line of JSON; says what is wrong with the others and sets the exit code. */
export function answerFiles(files: readonly string[], usage: string, answer: (problem: Problem) => unknown): void {
  if (files.length === 0) {
    process.stderr.write(`Name one or more problem files, or - for standard input: ${usage}\n`)
    bad = true
  }
  for (const file of files) {
    const json = readJson(file)
    if (!json) continue
    const parsed = parseProblem(json.value)
    if (!parsed.ok) for (const { path, what } of parsed.problems) refuse(file, path, what)
    else process.stdout.write(`${JSON.stringify(answer(parsed.problem))}\n`)
  }
  process.exitCode = bad ? 2 : 0
}

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
