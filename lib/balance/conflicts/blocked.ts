import type { Model } from '../model'
import { assemble } from '../rows/assemble'
import type { Member } from '../rows/members'
import { CellState, type Solution } from '../solution'
import { forEachCell } from '../states/cells'
import type { CellArrays } from '../states/fill-cells'
import { knownMeasure } from '../states/knowledge'
import { resolve } from '../states/resolve'
import { membersOf } from './circuit-space'
import type { Settled } from './find-conflicts'

/** For each unknown cell, the conflicts without which it would be known: each put back alone, then all together. */
export function blockedCells(model: Model, settled: Settled, { states }: CellArrays): Solution['blockedBy'] {
  if (settled.sets.length === 0) return []
  const blocked = new Map<number, number[]>()
  const ask = (putBack: Iterable<Member>, conflicts: number[], onlyNew: boolean): void => {
    const leaveOut = new Set(settled.atOdds)
    for (const member of putBack) leaveOut.delete(member)
    const { knowledge } = resolve(
      model,
      assemble(model, { leaveOut, adjusted: settled.adjusted, scaleFractions: true }),
    )
    forEachCell(model, ({ slot, measure }) => {
      if (states[slot] !== CellState.unknown || (onlyNew && blocked.has(slot))) return
      if (knownMeasure(knowledge, measure) === undefined) return
      blocked.set(slot, [...(blocked.get(slot) ?? []), ...conflicts])
    })
  }
  for (const [index, { circuit }] of settled.sets.entries()) ask(membersOf(circuit), [index], false)
  if (settled.sets.length > 1)
    ask(
      settled.atOdds,
      settled.sets.map((_, index) => index),
      true,
    )
  return [...blocked].sort(([a], [b]) => a - b)
}
