import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { lusolve, type Matrix, lup as mathjsLup, matrix, sparse } from 'mathjs'
import { LuDecomposition, Matrix as MlMatrix } from 'ml-matrix'
import type { SquareRows } from './square-rows'

/** Milliseconds of one factorisation and solve, once: minutes are not worth a median. */
export function mathjsTime({ n, row, column, value, rhs }: SquareRows): number {
  const a = sparse() as Matrix
  a.resize([n, n])
  value.forEach((entry, k) => {
    a.set([row[k] as number, column[k] as number], entry)
  })
  const b = matrix(rhs.map((entry) => [entry]))
  const start = performance.now()
  lusolve(mathjsLup(a), b)
  return performance.now() - start
}

/** The same by ml-matrix, which is dense. */
export function mlMatrixTime({ n, row, column, value, rhs }: SquareRows): number {
  const a = MlMatrix.zeros(n, n)
  value.forEach((entry, k) => {
    a.set(row[k] as number, column[k] as number, entry)
  })
  const b = MlMatrix.columnVector(rhs)
  const start = performance.now()
  new LuDecomposition(a).solve(b)
  return performance.now() - start
}

/** The same by SciPy's SuperLU, the median of `times`; undefined where Python or SciPy is not installed. */
export function superLuTime(square: SquareRows, times: number): number | undefined {
  const script = fileURLToPath(new URL('superlu.py', import.meta.url))
  const run = spawnSync('python3', [script], { input: JSON.stringify({ ...square, times }), encoding: 'utf8' })
  return run.status === 0 ? Number(run.stdout) : undefined
}

/** The same by GNU Octave's backslash; undefined where it is not installed. */
export function octaveTime({ n, row, column, value, rhs }: SquareRows, times: number): number | undefined {
  const list = (numbers: readonly number[]): string => `[${numbers.join(';')}]`
  const program = [
    `A=sparse(${list(row.map((i) => i + 1))},${list(column.map((j) => j + 1))},${list(value)},${n},${n});`,
    `b=${list(rhs)};t=zeros(1,${times});`,
    `for k=1:${times},tic;x=A\\b;t(k)=1000*toc;end;printf("%g\\n",median(t));`,
  ].join('\n')
  const run = spawnSync('octave-cli', ['--quiet', '--no-init-file'], { input: program, encoding: 'utf8' })
  return run.status === 0 ? Number(run.stdout) : undefined
}
