import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { explain, type Given, type Problem, type Result, solve, toResult } from '@/lib/balance'
import { parseProblem } from '@/lib/book/problem-file'
import { generator, type RandomBookOptions, randomBook } from './random-book'
import { Redo, type Truth } from './redo-step'

/** The same books on every run; TALLYBROOK_SEED=… draws others. */
const parameters = { numRuns: 20, verbose: 1 as const, seed: Number(process.env.TALLYBROOK_SEED ?? 20_261_201) }
const densities = [0.2, 0.35, 0.5, 0.8]

const keyOf = ({ stream, quantity, component }: { stream?: string; quantity?: string; component?: string }): string =>
  `${stream} ${quantity} ${component ?? ''}`

/** Every solvable cell and extent is found by one step, at its value, and steps are numbered in order. */
function expectCovered(result: Result): void {
  const found = new Map<string, { step: number; value: number }>()
  result.workings.forEach(({ step, finds }, k) => {
    expect(step).toBe(k + 1)
    for (const find of finds) {
      const key = find.reaction === undefined ? keyOf(find) : `xi ${find.reaction}`
      expect(found.has(key), `${key} is found twice`).toBe(false)
      found.set(key, { step, value: find.value })
    }
  })
  const wanted = result.cells.filter(({ state }) => state === 'solvable')
  for (const cell of wanted) {
    expect(found.get(keyOf(cell)), `${keyOf(cell)} is not found`).toEqual({ step: cell.step, value: cell.value })
    found.delete(keyOf(cell))
  }
  for (const { reaction, state, value } of result.extents) {
    if (state !== 'solvable') continue
    expect(found.get(`xi ${reaction}`)?.value, `extent ${reaction} is not found`).toBe(value)
    found.delete(`xi ${reaction}`)
  }
  expect([...found.keys()], 'found but not solvable').toEqual([])
}

/** Every step's equations, with typed values and what came before, give its finds; each find has its true value. */
function expectRedone(problem: Problem, result: Result, truth: Truth, molesPerMass = 1): void {
  const redo = new Redo(problem, truth, molesPerMass)
  const known = redo.givenRows()
  const largest = Math.max(...redo.truth.map(Math.abs))
  for (const step of result.workings) {
    if (step.kind !== 'simultaneous')
      expect(redo.faults(step, known), `step ${step.step}: ${JSON.stringify({ ...step, finds: [] })}`).toEqual([])
    for (const find of step.finds) {
      const value = redo.valueOf(find)
      known.push(redo.findRow(find))
      // The one component of a stream that does not flow.
      if (Number.isNaN(value)) continue
      const scale = find.quantity?.endsWith('Fraction') ? 1 : largest
      expect(Math.abs(find.value - value), `${keyOf(find)}: ${find.value}, truth ${value}`).toBeLessThanOrEqual(
        1e-6 * Math.max(Math.abs(value), 1e-6 * scale),
      )
    }
  }
}

function resultOf(problem: Problem): Result {
  const solution = solve(problem)
  return toResult(problem, solution, explain(problem, solution))
}

/** The result's own values as the truth, where it has them all. */
const ownTruth = (result: Result): Truth => {
  const flows = new Map(result.cells.map((cell) => [keyOf(cell), cell.value ?? 0]))
  const extents = new Map(result.extents.map(({ reaction, value }) => [reaction, value ?? 0]))
  return {
    flow: (stream, component) => flows.get(`${stream} componentFlow ${component}`) ?? 0,
    extent: (reaction) => extents.get(reaction) ?? 0,
  }
}

function parsedOf(text: string): Problem {
  const json = JSON.parse(text) as { book?: unknown }
  const parsed = parseProblem(json.book ?? json)
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems))
  return parsed.problem
}

const read = (folder: string, ends: string): { name: string; problem: Problem }[] =>
  readdirSync(join(import.meta.dirname, folder))
    .filter((name) => name.endsWith(ends))
    .map((name) => ({ name, problem: parsedOf(readFileSync(join(import.meta.dirname, folder, name), 'utf8')) }))

/** Molar masses written out, as the redoing knows no formulas. */
function withMasses(problem: Problem, result: Result): Problem {
  const massOf = (id: string): number => {
    const mass = result.cells.find(
      (cell) => cell.component === id && cell.quantity === 'componentMassFlow' && cell.value,
    )
    const mole = result.cells.find(
      (cell) => cell.component === id && cell.quantity === 'componentMoleFlow' && cell.value,
    )
    const other = mass ?? mole
    const own = result.cells.find(
      (cell) => cell.stream === other?.stream && cell.component === id && cell.quantity === 'componentFlow',
    )
    const ratio = (own?.value ?? Number.NaN) / (other?.value ?? Number.NaN)
    return problem.basis === 'mass' ? ratio : 1 / ratio
  }
  return {
    ...problem,
    components: problem.components.map((its) => ({ ...its, molarMass: its.molarMass ?? massOf(its.id) })),
  }
}

describe('workings of books that are known', () => {
  for (const { name, problem } of [...read('../fixtures/demo', '.book.json'), ...read('../published/cases', '.json')])
    it(name, () => {
      const result = resultOf(problem)
      expectCovered(result)
      if (result.status === 'solved') expectRedone(withMasses(problem, result), result, ownTruth(result))
    })
})

const kinds: Record<string, Omit<RandomBookOptions, 'density'>> = {
  'separators and mixers': { rules: true },
  'splitters and reactors': { rules: true, splitters: true, reactors: true },
  'sharp separations, flows of exactly 0': { rules: true, splitters: true, reactors: true, sharp: true },
}

describe('workings of random books with a hidden truth', () => {
  for (const [name, options] of Object.entries(kinds))
    it(`${name}: all that is solvable is found, and each step can be redone`, () => {
      fc.assert(
        fc.property(fc.nat(1e9), fc.constantFrom(...densities), (seed, density) => {
          const { problem, flow, extent } = randomBook(seed, { ...options, density })
          const result = resultOf(problem)
          expectCovered(result)
          const streams = new Map(problem.streams.map(({ id }, s) => [id, s]))
          const components = new Map(problem.components.map(({ id }, c) => [id, c]))
          const reactions = new Map((problem.reactions ?? []).map(({ id }, r) => [id, r]))
          expectRedone(problem, result, {
            flow: (s, c) => flow[streams.get(s) as number]?.[components.get(c) as number] as number,
            extent: (r) => extent[reactions.get(r) as number] as number,
          })
        }),
        parameters,
      )
    })
})

describe('workings of one stream without a unit', () => {
  const masses = { A: 18, B: 30, C: 44, D: 58.5 }
  const ids = Object.keys(masses) as (keyof typeof masses)[]

  /** The flow, a fraction and two ratios of groups, at a composition drawn at random. */
  function oneStream(seed: number): Problem {
    const random = generator(seed)
    const basis = random() < 0.5 ? 'mass' : 'mole'
    const flows = ids.map(() => 10 ** (3 * random()))
    const amounts = (of: 'mass' | 'mole'): number[] =>
      flows.map((n, c) => {
        const mass = masses[ids[c] as keyof typeof masses]
        return of === basis ? n : of === 'mass' ? n * mass : n / mass
      })
    const total = (of: 'mass' | 'mole', group: readonly string[] = ids): number =>
      amounts(of).reduce((sum, n, c) => sum + (group.includes(ids[c] as string) ? n : 0), 0)
    const ratio = (parts: string[], over?: string[]): Given => {
      const of = random() < 0.5 ? 'mass' : 'mole'
      const quantity = of === 'mass' ? 'groupMassRatio' : 'groupMoleRatio'
      return { stream: 'S', quantity, parts, ...(over && { over }), value: total(of, parts) / total(of, over) }
    }
    return {
      format: 'tallybrook/1',
      name: `stream ${seed}`,
      basis,
      flowUnit: basis === 'mass' ? 'kg/h' : 'kmol/h',
      components: ids.map((id) => ({ id, molarMass: masses[id] })),
      streams: [{ id: 'S' }],
      units: [],
      links: {},
      givens: [
        { stream: 'S', quantity: 'flow', value: total(basis) },
        { stream: 'S', quantity: 'massFraction', component: 'A', value: total('mass', ['A']) / total('mass') },
        random() < 0.5 ? ratio(['A', 'B'], ['C', 'D']) : ratio(['A', 'B']),
        random() < 0.5 ? ratio(['B', 'C'], ['A', 'D']) : ratio(['C'], ['B', 'D']),
      ],
    }
  }

  it('the flow, a fraction and two ratios of groups: every cell is found', () => {
    fc.assert(
      fc.property(fc.nat(1e9), (seed) => {
        const problem = oneStream(seed)
        const result = resultOf(problem)
        expect(result.summary.unknown).toBe(0)
        expect(result.workings.map(({ kind }) => kind)).not.toContain('simultaneous')
        expectCovered(result)
      }),
      parameters,
    )
  })
})
