import { explain, measureNext, solve, toResult } from '@/lib/balance'
import { answerFiles, refuse } from './problem-files'

/** `npm run -s solve -- FILE…`: one JSON result a line for each good file, one line per fault of a bad one, exit 2 if any. */
const arguments_ = process.argv.slice(2)
const options = arguments_.filter((text) => text.startsWith('--'))
const files = arguments_.filter((text) => !text.startsWith('--'))

for (const option of options)
  if (option !== '--all-boundaries') refuse(option, 'option', 'is not known; --all-boundaries is')

const allBoundaries = options.includes('--all-boundaries')

answerFiles(files, 'npm run -s solve -- FILE…', (problem) => {
  const solution = solve(problem)
  const isOpen = solution.status === 'open' || solution.status === 'atOdds'
  const next = isOpen ? measureNext(problem) : []
  return toResult(problem, solution, explain(problem, solution, { allBoundaries }), next)
})
