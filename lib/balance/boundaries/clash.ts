import type { ConflictSet, Settled } from '../conflicts/find-conflicts'
import type { Model } from '../model'
import { measuresOfRule } from '../rows/rules'
import type { BookRows } from '../workings/book-rows'
import { balancesOf } from '../workings/region'

/** True where typed values that cannot all hold meet in a boundary's own equations. */
export function clashesAt(
  model: Model,
  { sets, assembly }: Settled,
  book: BookRows,
  units: readonly number[],
  crossing: readonly number[],
): boolean {
  const crosses = new Set(crossing)
  return sets.some((set) => {
    if (!membersStreams(model, book, set).every((s) => crosses.has(s))) return false
    const met = [...set.circuit.structure].flatMap((number) => {
      const source = assembly.rows.sources[number]
      return source?.type === 'balance' ? [source] : []
    })
    const its = [...new Set(met.map(({ unit }) => unit))].sort((a, b) => a - b)
    if (its.length === 0) return true
    if (!its.every((u) => units.includes(u))) return false
    if (its.length === units.length) return true
    // With more units inside it still meets where the balances that it needs are the same.
    const columnsOf = (list: readonly number[]): Map<string, string> =>
      new Map(
        balancesOf(book, list).map(({ uses: [use], columns }) => [
          `${use?.equation} ${use?.component ?? use?.element ?? ''}`,
          [...columns].sort((a, b) => a - b).join(),
        ]),
      )
    const [wide, narrow] = [columnsOf(units), columnsOf(its)]
    return met.every(({ component, element }) => {
      const name = component === undefined ? undefined : (model.problem.components[component]?.id as string)
      const key = name === undefined && element === undefined ? 'total ' : `balance ${name ?? element}`
      return wide.get(key) !== undefined && wide.get(key) === narrow.get(key)
    })
  })
}

function membersStreams(model: Model, { streamOf }: BookRows, { circuit, stream }: ConflictSet): number[] {
  const nGivens = model.problem.givens?.length ?? 0
  const streams = new Set<number>(stream === undefined ? [] : [stream])
  for (const member of circuit.weight.keys()) {
    if (member < nGivens) {
      streams.add(model.streamIndex.get(model.problem.givens?.[member]?.stream as string) as number)
      continue
    }
    const rule = model.problem.relations?.[member - nGivens]
    for (const { numerator, denominator } of rule ? measuresOfRule(model, rule) : [])
      for (const j of [...numerator.columns, ...(denominator?.columns ?? [])])
        if ((streamOf[j] as number) >= 0) streams.add(streamOf[j] as number)
  }
  return [...streams]
}
