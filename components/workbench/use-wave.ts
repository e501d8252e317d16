import { useEffect, useState } from 'react'
import type { SolvedCase } from '@/hooks/solver-handle'
import { CellState, slotsPerStream } from '@/lib/balance/solution'
import { valueRow } from './rows'

/** More cells than this at once would be a flash, not a wave. */
const MOST = 2_000

/** Cells that the newest answer has just settled, by `row~column`, in the order in which the wave reaches them. */
export function useWave(solved: SolvedCase | null): ReadonlyMap<string, number> | null {
  const [last, setLast] = useState(solved)
  const [wave, setWave] = useState<ReadonlyMap<string, number> | null>(null)
  if (solved !== last) {
    setLast(solved)
    setWave(last && solved ? settled(last, solved) : null)
  }
  useEffect(() => {
    if (!wave) return
    const timer = setTimeout(() => setWave(null), 1_600)
    return () => clearTimeout(timer)
  }, [wave])
  return wave
}

function settled(before: SolvedCase, after: SolvedCase): ReadonlyMap<string, number> | null {
  const n = after.solution.nComponents
  if (before.solution.nComponents !== n || before.solution.states.length !== after.solution.states.length) return null
  const per = slotsPerStream(n)
  const cells: [key: string, order: number][] = []
  for (let slot = 0; slot < after.solution.states.length; slot++) {
    if (after.solution.states[slot] !== CellState.solvable || before.solution.states[slot] !== CellState.unknown)
      continue
    const stream = Math.floor(slot / per)
    const row = rowOfSlot(slot % per, n, after)
    if (row) cells.push([`${row}~${after.streams[stream]}`, Math.min(stream, 14)])
    if (cells.length > MOST) return null
  }
  return cells.length === 0 ? null : new Map(cells)
}

function rowOfSlot(offset: number, n: number, { components }: SolvedCase): string | null {
  if (offset === 0) return valueRow('flow')
  if (offset === 1 + 2 * n) return valueRow('otherFlow')
  const names = ['componentFlow', 'fraction', 'otherComponentFlow', 'otherFraction'] as const
  const past = offset > 1 + 2 * n ? offset - 2 : offset - 1
  const quantity = names[Math.floor(past / Math.max(1, n))]
  return quantity ? valueRow(quantity, components[past % n] ?? null) : null
}
