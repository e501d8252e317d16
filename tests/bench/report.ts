import { cpus, loadavg } from 'node:os'

/** One book's times in milliseconds; undefined where another solver is not installed or would take minutes. */
export type Line = {
  size: string
  rows: number
  entries: number
  /** Model and rows from a problem. */
  assembly: number
  /** States and values from the rows. */
  rest: number
  whole: number
  /** A problem with one other value, by a solver that remembers the structure. */
  edit: number
  /** The same in the worker: the change to the book, the problem from it, the answer. */
  inWorker: number
  superLu: number | undefined
  octave: number | undefined
  mathjs: number | undefined
  mlMatrix: number | undefined
}

const ms = (time: number | undefined): string =>
  time === undefined ? '-' : time < 10 ? time.toFixed(1) : time.toFixed(0)
const ratio = (above: number | undefined, below: number | undefined): string =>
  above === undefined || below === undefined ? '-' : (above / below).toFixed(1)

function table(head: string[], lines: string[][]): string {
  const all = [head, ...lines]
  const widths = head.map((_, k) => Math.max(...all.map((its) => (its[k] as string).length)))
  const row = (its: string[]): string => `| ${its.map((text, k) => text.padStart(widths[k] as number)).join(' | ')} |`
  return [row(head), `| ${widths.map((width) => `${'-'.repeat(width - 1)}:`).join(' | ')} |`, ...lines.map(row)].join(
    '\n',
  )
}

/** Growth of a time from the second size to the last, per entry: 1 is proportional. */
function growth(lines: readonly Line[], time: (line: Line) => number): string {
  const [from, to] = [lines[1], lines[lines.length - 1]] as [Line, Line]
  return (Math.log(time(to) / time(from)) / Math.log(to.entries / from.entries)).toFixed(2)
}

/** The result of `npm run bench` as Markdown. */
export function report(lines: readonly Line[]): string {
  const cores = cpus().length
  const ours = table(
    ['book', 'rows', 'entries', 'assembly', 'states and values', 'both', 'edit', 'edit in the worker'],
    lines.map((its) => [
      its.size,
      `${its.rows}`,
      `${its.entries}`,
      ...[its.assembly, its.rest, its.whole, its.edit, its.inWorker].map(ms),
    ]),
  )
  const theirs = table(
    ['book', 'SuperLU', 'Octave', 'mathjs', 'ml-matrix', 'ours / SuperLU', 'mathjs / ours'],
    lines.map((its) => [
      its.size,
      ...[its.superLu, its.octave, its.mathjs, its.mlMatrix].map(ms),
      ratio(its.rest, its.superLu),
      ratio(its.mathjs, its.rest),
    ]),
  )
  return `# Speed of the solver

Written by \`npm run bench\`; times are medians in milliseconds, warm, on a ${cores}-core machine with Node ${process.versions.node}; at
the end of the run ${(loadavg()[0] as number).toFixed(0)} processes wanted its cores (more than ${cores} makes every time longer). The books are fully determined.

${ours}

States and values grow with the entries to the power ${growth(lines, ({ rest }) => rest)} from the second size to the last; with assembly, ${growth(lines, ({ whole }) => whole)}.

One factorisation and solve of the same independent rows, as many as there are unknowns, by others; "-" is not installed, or minutes:

${theirs}

Ours in the ratios is states and values: rank, probes, refinement, conflicts and every cell, not the solve alone.
`
}
