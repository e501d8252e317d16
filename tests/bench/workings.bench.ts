import { explain, solve } from '@/lib/balance'
import { largeBook } from './large-book'

/**
 * `npm run bench:workings`: boundaries and workings of fully determined books, beside states and values of the same run.
 * From a copy of the answer, as a second worker has it, so the rows are settled once more.
 */
const sizes = [
  [60, 20, 15],
  [300, 30, 3],
] as const

const median = (run: () => void, times: number): number => {
  for (let k = 0; k < times; k++) run()
  const taken = Array.from({ length: times }, () => {
    const start = performance.now()
    run()
    return performance.now() - start
  })
  return taken.sort((a, b) => a - b)[Math.floor(times / 2)] as number
}

for (const [nStreams, nComponents, times] of sizes) {
  const problem = largeBook(nStreams, nComponents)
  const solution = solve(problem)
  const states = median(() => solve(problem), times)
  const all = median(() => explain(problem, structuredClone(solution)), times)
  const kept = median(() => explain(problem, solution), times)
  process.stdout.write(
    `${nStreams} x ${nComponents} | states and values ${states.toFixed(0)} ms | boundaries and workings ${kept.toFixed(0)} ms, ${(kept / states).toFixed(1)} times states | from a copy of the answer ${all.toFixed(0)} ms\n`,
  )
}
