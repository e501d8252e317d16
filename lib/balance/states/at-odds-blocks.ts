import type { Settled } from '../conflicts/find-conflicts'
import type { Model } from '../model'
import { assemble } from '../rows/assemble'
import { memberOfRule } from '../rows/members'
import { blocksOf } from './free-scale'

/** Streams joined by rows to anything that is at odds: from such a block nothing is claimed. */
export function streamsAtOdds(model: Model, { atOdds }: Settled): (stream: number) => boolean {
  if (atOdds.size === 0) return () => false
  const assembly = assemble(model)
  const find = blocksOf(model, assembly)
  const blocks = new Set<number>()
  for (const { index, stream } of assembly.givens)
    if (atOdds.has(index)) blocks.add(find(model.totalColumn[stream] as number))
  const { rows } = assembly
  rows.source.forEach((number, i) => {
    const source = rows.sources[number]
    if (source?.type !== 'rule' || !atOdds.has(memberOfRule(model, source.index))) return
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++)
      blocks.add(find(rows.column[k] as number))
  })
  return (stream) => {
    const column = model.totalColumn[stream] as number
    return column >= 0 && blocks.has(find(column))
  }
}
