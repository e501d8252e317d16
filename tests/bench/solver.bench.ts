import { writeFileSync } from 'node:fs'
import { createSolver, type Problem, solve } from '@/lib/balance'
import { buildModel, type Model } from '@/lib/balance/model'
import { assemble } from '@/lib/balance/rows/assemble'
import { resolve } from '@/lib/balance/states/resolve'
import { largeBook } from './large-book'
import { mathjsTime, mlMatrixTime, octaveTime, superLuTime } from './others'
import { type Line, report } from './report'
import { squareRows } from './square-rows'
import { workerEdit } from './worker-edit'

/**
 * `npm run bench`: states and values of fully determined books of four sizes, assembly timed apart, beside one
 * factorisation and solve of the same independent square rows by others. Prints a table and writes tests/bench/results.md.
 */
const sizes = [
  [60, 20],
  [300, 30],
  [600, 40],
  [1000, 50],
] as const
/** Beyond these a run takes minutes. */
const MATHJS_UP_TO = 300
const ML_MATRIX_UP_TO = 60

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

/** The problem with one flow moved at every second call: an edit of a value. */
function edits(problem: Problem): () => Problem {
  const [first, ...rest] = problem.givens ?? []
  if (!first) throw new Error('the book has nothing to edit')
  const moved = { ...problem, givens: [{ ...first, value: 1.01 * first.value }, ...rest] }
  let flip = false
  return () => {
    flip = !flip
    return flip ? moved : problem
  }
}

function measure(nStreams: number, nComponents: number): Line {
  const problem = largeBook(nStreams, nComponents)
  const times = nStreams > 500 ? 5 : nStreams > 100 ? 11 : 61
  const assembly = median(() => assemble(buildModel(problem) as Model), times)
  const whole = median(() => solve(problem), times)
  const solver = createSolver()
  const next = edits(problem)
  const edit = median(() => solver.solve(next()), times)
  const inWorker = median(workerEdit(problem), times)
  const model = buildModel(problem) as Model
  const { rows, ...elimination } = resolve(model, assemble(model)).knowledge.elimination
  const square = squareRows({ rows, ...elimination })
  const { unknown } = solve(problem).summary
  if (unknown > 0) throw new Error(`${unknown} cells of the ${nStreams} x ${nComponents} book came out unknown`)
  return {
    size: `${nStreams} x ${nComponents}`,
    rows: rows.nRows,
    entries: rows.column.length,
    assembly,
    rest: whole - assembly,
    whole,
    edit,
    inWorker,
    superLu: superLuTime(square, times),
    octave: octaveTime(square, times),
    mathjs: nStreams <= MATHJS_UP_TO ? mathjsTime(square) : undefined,
    mlMatrix: nStreams <= ML_MATRIX_UP_TO ? mlMatrixTime(square) : undefined,
  }
}

const text = report(sizes.map(([nStreams, nComponents]) => measure(nStreams, nComponents)))
process.stdout.write(text)
writeFileSync(new URL('results.md', import.meta.url), text)
