'use client'

import { useEffect, useMemo, useState } from 'react'
import { readEntry } from '@/lib/sheet/entry'
import { type CellKey, type Typed, typedAtFirst } from './plant'
import { type PlantView, type Solve, viewPlant } from './plant-view'

/** An entry that was not understood, and why. */
export type WrongEntry = { text: string; reason: string }

/** What was typed, what follows from it, and how to type more. `first` is the answer that came with the page. */
export function usePlant(first: PlantView) {
  const [solve, setSolve] = useState<Solve | null>(null)
  const [typed, setTyped] = useState<Typed>(typedAtFirst)
  const [wrong, setWrong] = useState<ReadonlyMap<CellKey, WrongEntry>>(new Map())
  useEffect(() => {
    let gone = false
    import('@/lib/balance').then((balance) => {
      if (!gone) setSolve(() => (problem: Parameters<Solve>[0]) => balance.solve(problem))
    })
    return () => {
      gone = true
    }
  }, [])

  const view = useMemo(() => (solve ? viewPlant(typed, solve) : first), [typed, solve, first])

  /** Takes the text of a cell: empty clears it, a number is given, anything else stays there, marked, and counts for nothing. */
  const type = (key: CellKey, text: string) => {
    const isFraction = key.startsWith('x-')
    const entry = readEntry(text, {
      measure: isFraction ? 'massFraction' : 'massFlow',
      unit: isFraction ? '%' : 'kg/h',
      decimal: 'point',
    })
    setWrong((now) => {
      const next = new Map(now)
      if (entry.ok) next.delete(key)
      else next.set(key, { text, reason: entry.reason })
      return next
    })
    setTyped((now) => {
      const next = new Map(now)
      if (entry.ok && !entry.clear) next.set(key, { value: entry.value, unit: entry.unit })
      else next.delete(key)
      return next
    })
  }

  const reset = () => {
    setTyped(typedAtFirst)
    setWrong(new Map())
  }

  return { view, typed, wrong, type, reset }
}
