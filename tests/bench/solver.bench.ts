import { lusolve, type Matrix, lup as mathjsLup, matrix, sparse } from 'mathjs'
import { type Problem, solve } from '@/lib/balance'
import { buildModel, type Model } from '@/lib/balance/model'
import { assemble } from '@/lib/balance/rows/assemble'
import { compileRows } from '@/lib/balance/sparse/compiled-rows'
import { type Elimination, eliminate } from '@/lib/balance/sparse/elimination'
import { resolve } from '@/lib/balance/states/resolve'
import { largeBook } from './large-book'

/**
 * `npm run bench`: states and values of fully determined books of four sizes, assembly timed apart, beside one
 * factorisation and solve of the same independent square rows by mathjs sparse LU for the two small sizes.
 */
const sizes = [
  [60, 20],
  [300, 30],
  [600, 40],
  [1000, 50],
] as const
const MATHJS_UP_TO = 300

/** After as many runs to warm up, as a worker is warm while someone types. */
const median = (run: () => void, times: number): number => {
  for (let k = 0; k < times; k++) run()
  const taken = Array.from({ length: times }, () => {
    const start = performance.now()
    run()
    return performance.now() - start
  })
  return taken.sort((a, b) => a - b)[Math.floor(times / 2)] as number
}

/** Milliseconds of mathjs for the pivot rows as one square system. */
function mathjsTime(model: Model, e: Elimination): number {
  const rows = [
    ...e.peeled.rows.filter((i) => i >= 0),
    ...Array.from(e.core.pivotRow, (r) => e.coreRow[r] as number),
    ...e.singleRow,
  ]
  const n = model.nColumns
  if (rows.length !== n) throw new Error(`the book is not fully determined: ${rows.length} rows for ${n} unknowns`)
  const a = sparse() as Matrix
  a.resize([n, n])
  rows.forEach((i, r) => {
    for (let k = e.rows.start[i] as number; k < (e.rows.start[i + 1] as number); k++)
      a.set([r, e.rows.column[k] as number], e.rows.value[k] as number)
  })
  const b = matrix(rows.map((i) => [e.rows.rhs[i] as number]))
  const start = performance.now()
  lusolve(mathjsLup(a), b)
  return performance.now() - start
}

const points: { entries: number; ms: number }[] = []
for (const [nStreams, nComponents] of sizes) {
  const problem: Problem = largeBook(nStreams, nComponents)
  const model = buildModel(problem) as Model
  const times = nStreams > 500 ? 3 : nStreams > 100 ? 9 : 60
  const assembly = median(() => assemble(model), times)
  const whole = median(() => solve(problem), times)
  const assembled = assemble(model)
  const e = resolve(model, assembled).knowledge.elimination
  const compiled = compileRows(assembled.rows, model.nColumns)
  const elimination = median(() => eliminate(compiled, assembled.nonNegative), times)
  const { summary } = solve(problem)
  points.push({ entries: compiled.column.length, ms: whole })
  const parts = [
    `${nStreams} x ${nComponents}`,
    `${compiled.nRows} rows, ${compiled.column.length} entries, core ${e.coreRow.length}, unknown cells ${summary.unknown}`,
    `assembly ${assembly.toFixed(1)} ms`,
    `elimination ${elimination.toFixed(1)} ms`,
    `states and values ${whole.toFixed(1)} ms`,
  ]
  if (nStreams <= MATHJS_UP_TO) {
    const theirs = mathjsTime(model, e)
    parts.push(`mathjs LU ${theirs.toFixed(0)} ms, ${(theirs / whole).toFixed(1)} times ours`)
  }
  process.stdout.write(`${parts.join(' | ')}\n`)
}
const [small, large] = [points[1], points[points.length - 1]] as { entries: number; ms: number }[]
const growth = Math.log((large?.ms ?? 1) / (small?.ms ?? 1)) / Math.log((large?.entries ?? 1) / (small?.entries ?? 1))
process.stdout.write(
  `growth exponent from ${sizes[1].join(' x ')} to ${sizes[3].join(' x ')}: ${growth.toFixed(2)} per entry\n`,
)
