import { readFileSync, statSync } from 'node:fs'
import { type LabOptions, type LabReading, readLabFile } from '@/lib/lab'
import { limits } from '@/lib/lab/limits'

/** `npm run -s lab -- FILE`: one JSON object of tallybrook-lab/1, or one line a problem on standard error and exit 2. */
const problems: string[] = []
const files: string[] = []
const options: LabOptions = {}

const arguments_ = process.argv.slice(2)
for (let at = 0; at < arguments_.length; at++) {
  const [name = '', joined] = splitOption(arguments_[at] as string)
  const value = () => joined ?? arguments_[++at]
  if (name === '--decimal') {
    const decimal = value()
    if (decimal === 'comma' || decimal === 'point') options.decimal = decimal
    else problems.push('--decimal: must be comma or point')
  } else if (name === '--dates') {
    const dates = value()
    if (dates === 'dmy' || dates === 'mdy') options.dates = dates
    else problems.push('--dates: must be dmy or mdy')
  } else if (name.startsWith('--')) problems.push(`${name}: is not known; --decimal and --dates are`)
  else files.push(name)
}
if (files.length !== 1) problems.push('Name one file, or - for standard input: npm run -s lab -- FILE')

const bytes = problems.length === 0 ? readBytes(files[0] as string) : undefined
if (bytes) {
  const answer = await readLabFile(bytes, options)
  if (answer.ok) await print(answer.reading)
  else problems.push(...answer.problems.map((problem) => `${files[0]}: ${problem}`))
}
if (problems.length > 0) {
  for (const problem of problems) process.stderr.write(`${problem.replace(/\s+/g, ' ')}\n`)
  process.exitCode = 2
}

function splitOption(text: string): [string, string?] {
  const at = text.startsWith('--') ? text.indexOf('=') : -1
  return at < 0 ? [text] : [text.slice(0, at), text.slice(at + 1)]
}

function readBytes(file: string): Uint8Array | undefined {
  try {
    if (file !== '-' && statSync(file).size > limits.bytes) {
      problems.push(`${file}: The file is larger than 20 MB. Split it.`)
      return undefined
    }
    return new Uint8Array(readFileSync(file === '-' ? 0 : file))
  } catch (error) {
    problems.push(`${file}: cannot be read (${error instanceof Error ? error.message : String(error)})`)
    return undefined
  }
}

/** Piece by piece: a large answer is longer than one string may be. */
async function print({ format, shape, decimal, samples, totals, questions, notUnderstood }: LabReading): Promise<void> {
  await write(`${JSON.stringify({ format, shape, decimal }).slice(0, -1)},"samples":`)
  await writeList(samples)
  await write(',"totals":')
  await writeList(totals)
  await write(`,"questions":${JSON.stringify(questions)},"notUnderstood":`)
  await writeList(notUnderstood)
  await write('}\n')
}

async function writeList(list: unknown[]): Promise<void> {
  await write('[')
  for (let at = 0; at < list.length; at += 1000) {
    const piece = list.slice(at, at + 1000).map((item) => JSON.stringify(item))
    await write(`${at === 0 ? '' : ','}${piece.join(',')}`)
  }
  await write(']')
}

function write(text: string): Promise<void> {
  return new Promise((done) => {
    if (process.stdout.write(text)) done()
    else process.stdout.once('drain', done)
  })
}
