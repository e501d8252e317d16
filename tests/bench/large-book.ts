import { slotOf, solve } from '@/lib/balance'
import type { Given, Problem, Rule } from '@/lib/balance/problem'
import { generator } from '../properties/random-book'

/**
 * A fully determined plant of about `nStreams` streams: trains of mixer, separator, separator, splitter with a recycle,
 * linked one after another. Half of the separators are given by recoveries, half by the composition of their product.
 */
export function largeBook(nStreams: number, nComponents: number, seed = 1): Problem {
  const random = generator(seed)
  const components = Array.from({ length: nComponents }, (_, c) => ({ id: `C${c + 1}`, molarMass: 18 + 7 * c }))
  const streams: Problem['streams'] = []
  const units: Problem['units'] = []
  const links: Problem['links'] = {}
  const givens: Given[] = []
  const relations: Rule[] = []
  const stream = (): string => {
    const id = `${101 + streams.length}`
    streams.push({ id })
    return id
  }
  const unit = (kind: Problem['units'][number]['kind'], inlets: string[], outlets: string[]): string => {
    const id = `U-${units.length + 1}`
    units.push({ id, kind })
    links[id] = Object.fromEntries([
      ...inlets.map((s) => [s, 'in' as const]),
      ...outlets.map((s) => [s, 'out' as const]),
    ])
    return id
  }
  const composition = (s: string, skip: number): void => {
    const parts = components.map(() => 0.2 + random())
    const sum = parts.reduce((total, part) => total + part, 0)
    components.forEach(({ id }, c) => {
      if (c !== skip)
        givens.push({ stream: s, quantity: 'massFraction', component: id, value: (parts[c] as number) / sum })
    })
  }
  const byComposition: { unit: string; cake: string; of: string }[] = []
  let from: string | undefined
  for (let train = 0; streams.length + 8 <= nStreams; train++) {
    const feed = stream()
    givens.push({ stream: feed, quantity: 'flow', value: 1000 * (1 + random()) })
    composition(feed, train % nComponents)
    const [blend, vapour, slurry, cake, liquor, recycle, purge] = [
      stream(),
      stream(),
      stream(),
      stream(),
      stream(),
      stream(),
      stream(),
    ]
    unit('mixer', [feed, recycle, ...(from === undefined ? [] : [from])], [blend])
    const first = unit('separator', [blend], [vapour, slurry])
    const second = unit('separator', [slurry], [cake, liquor])
    for (const { id: component } of components) {
      relations.push({
        id: `R${relations.length}`,
        kind: 'recovery',
        unit: first,
        component,
        stream: vapour,
        value: 0.05 + 0.3 * random(),
      })
      relations.push({
        id: `R${relations.length}`,
        kind: 'recovery',
        unit: second,
        component,
        stream: cake,
        value: 0.2 + 0.6 * random(),
      })
    }
    if (train % 2 === 1) byComposition.push({ unit: second, cake, of: slurry })
    const splitter = unit('splitter', [liquor], [recycle, purge])
    relations.push({
      id: `R${relations.length}`,
      kind: 'split',
      unit: splitter,
      stream: recycle,
      value: 0.4 + 0.4 * random(),
    })
    from = purge
  }
  const problem: Problem = {
    format: 'tallybrook/1',
    name: `${nStreams} x ${nComponents}`,
    basis: 'mass',
    flowUnit: 'kg/h',
    components,
    streams,
    units,
    links,
    givens,
    relations,
  }
  return withCompositions(problem, byComposition)
}

/** Puts the composition of a product and a flow ratio, as they come out, in place of a separator's recoveries. */
function withCompositions(problem: Problem, swaps: { unit: string; cake: string; of: string }[]): Problem {
  const { values, nComponents } = solve(problem)
  const at = (id: string): number => problem.streams.findIndex((its) => its.id === id)
  const flow = (id: string): number => values[slotOf(nComponents, at(id), 'flow')] as number
  const swapped = new Set(swaps.map(({ unit }) => unit))
  return {
    ...problem,
    givens: [
      ...(problem.givens ?? []),
      ...swaps.flatMap(({ cake }) =>
        problem.components.slice(1).map(
          ({ id }, c): Given => ({
            stream: cake,
            quantity: 'massFraction',
            component: id,
            value: values[slotOf(nComponents, at(cake), 'fraction', c + 1)] as number,
          }),
        ),
      ),
    ],
    relations: [
      ...(problem.relations ?? []).filter((rule) => !(rule.kind === 'recovery' && swapped.has(rule.unit))),
      ...swaps.map(
        ({ unit, cake, of }): Rule => ({
          id: `F-${unit}`,
          kind: 'flowRatio',
          stream: cake,
          of,
          value: flow(cake) / flow(of),
        }),
      ),
    ],
  }
}
