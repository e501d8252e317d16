import type { Given, Problem, Rule } from '@/lib/balance/problem'
import { generator, randomBook } from './random-book'

/** Reads flows and parameters at a solution. */
export type Reading = {
  part: (stream: string, component: string) => number
  flow: (stream: string) => number
  parameter: (id: string) => number
}

/** A random book with a hidden truth in which some rules multiply unknowns, and those rules written out once more. */
export type NotLinearBook = {
  problem: Problem
  flow: number[][]
  extent: number[]
  parameters: Map<string, number>
  /** Each is 0 at a solution. */
  equations: ((at: Reading) => number)[]
}

/** Splits are not typed; shares, flows and ratios are tied to each other by products and free parameters. */
export function notLinearBook(seed: number, density: number): NotLinearBook {
  const random = generator(seed ^ 0x5bd1e995)
  const { problem, flow, extent } = randomBook(seed, {
    density,
    splitters: true,
    reactors: seed % 3 === 0,
    rules: true,
    maxUnits: 4,
    maxComponents: 3,
  })
  const relations = (problem.relations as Rule[]).filter(({ kind }) => kind !== 'split' || random() < 0.3)
  const parameters = new Map<string, number>()
  const equations: NotLinearBook['equations'] = []
  const below = (n: number): number => Math.floor(random() * n)
  const pick = <T>(list: readonly T[]): T => list[below(list.length)] as T
  const truth: Reading = {
    part: (s, c) =>
      (flow[problem.streams.findIndex(({ id }) => id === s)] as number[])[
        problem.components.findIndex(({ id }) => id === c)
      ] as number,
    flow: (s) => (flow[problem.streams.findIndex(({ id }) => id === s)] as number[]).reduce((sum, n) => sum + n, 0),
    parameter: (id) => parameters.get(id) as number,
  }
  const spots = problem.streams.flatMap(({ id, components }) =>
    (components ?? []).map((component) => ({ stream: id, component })),
  )
  const flowing = spots.filter(({ stream, component }) => truth.part(stream, component) > 0)
  const share = ({ stream, component }: (typeof spots)[number], at: Reading): number =>
    at.part(stream, component) / at.flow(stream)
  const word = ({ stream, component }: (typeof spots)[number], name = 'share'): string =>
    `${name}("${stream}", ${component})`
  const add = (rule: object, equation: (at: Reading) => number): void => {
    relations.push({ id: `N${relations.length}`, ...rule } as Rule)
    equations.push(equation)
  }
  const formula = (text: string, equation: (at: Reading) => number): void => add({ kind: 'formula', text }, equation)
  for (let k = flowing.length > 0 ? 1 + below(3) : 0; k > 0; k--) {
    const [a, b] = [pick(flowing), pick(flowing)]
    const [x, y] = [share(a, truth), share(b, truth)]
    switch (below(5)) {
      case 0: {
        formula(`${word(a)} * ${word(b)} = ${x * y}`, (at) => share(a, at) * share(b, at) - x * y)
        break
      }
      case 1: {
        formula(`${word(a)} = ${x / y} * ${word(b)}`, (at) => share(a, at) - (x / y) * share(b, at))
        break
      }
      case 2: {
        const F = truth.flow(a.stream)
        formula(`flow("${a.stream}") * ${word(b)} = ${F * y}`, (at) => at.flow(a.stream) * share(b, at) - F * y)
        break
      }
      case 3: {
        // One parameter for two ratios that are equal in truth: of a component and of another one scaled.
        const id = `p${parameters.size}`
        const value = truth.part(a.stream, a.component) / truth.part(b.stream, b.component)
        parameters.set(id, value)
        add(
          {
            kind: 'componentRatio',
            stream: a.stream,
            component: a.component,
            of: { stream: b.stream, component: b.component },
            value: { parameter: id },
          },
          (at) => at.part(a.stream, a.component) - at.parameter(id) * at.part(b.stream, b.component),
        )
        const d = pick(flowing)
        const level = value * truth.part(d.stream, d.component)
        formula(
          `${id} * ${word(d, 'part')} = ${level}`,
          (at) => at.parameter(id) * at.part(d.stream, d.component) - level,
        )
        break
      }
      default: {
        const level = x ** 2 + y
        formula(`${word(a)}^2 + ${word(b)} = ${level}`, (at) => share(a, at) ** 2 + share(b, at) - level)
      }
    }
  }
  const known = random() < 0.5
  return {
    problem: {
      ...problem,
      givens: (problem.givens as Given[]).filter(() => known || random() < 0.8),
      relations,
      parameters: [...parameters.keys()].map((id) => ({ id })),
    },
    flow,
    extent,
    parameters,
    equations,
  }
}
