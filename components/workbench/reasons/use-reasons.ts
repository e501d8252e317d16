import { type KeyboardEvent, useMemo, useState } from 'react'
import type { GridSource } from '@/hooks/grid-model'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import type { PanelKey } from '../panel-tabs'
import { type MarkedBoundary, placeOf } from './explained'
import { cappedLinks, cappedTable, walkedTable } from './marked-sources'
import type { Reasons } from './reasons'
import { crossingOf } from './step-words'
import { useExplained } from './use-explained'

type Panes = { table: GridSource; links: GridSource; wave: ReadonlyMap<string, number> | null }

type ReasonsInput = {
  view: BookView
  tell: Desk['tell']
  panes: Panes
  panel: PanelKey
  onPanel: (panel: PanelKey) => void
  /** Whether the card shows a cell that has a reason. */
  cardAsks: boolean
}

/** Why the cells have their values, what is marked in the panes, and the walk through the workings. */
export function useReasons({ view, tell, panes, panel, onPanel, cardAsks }: ReasonsInput) {
  const [chosen, setChosen] = useState<MarkedBoundary | null>(null)
  const [position, setPosition] = useState<number | null>(null)
  const isWanted = cardAsks || position !== null || panel === 'boundaries' || panel === 'workings'
  const handle = useExplained(view, isWanted)
  const { explained } = handle
  const count = explained?.explanation.workings.length ?? 0
  const at = position === null || count === 0 ? null : Math.min(position, count)
  const step = at === null ? undefined : explained?.explanation.workings[at - 1]
  const marked = useMemo(
    () => (step && explained ? { units: step.boundary, crossing: crossingOf(explained, step) } : chosen),
    [step, explained, chosen],
  )
  const { table, links, wave } = panes
  const shown = useMemo((): Panes => {
    const walked = explained && at !== null ? walkedTable(table, explained, at, tell) : table
    if (!marked) return { table: walked, links, wave }
    return { table: cappedTable(walked, view, marked), links: cappedLinks(links, view, marked), wave }
  }, [table, links, wave, explained, at, marked, view, tell])
  const ownWave = useMemo(() => {
    if (!step) return null
    const keys = step.finds.flatMap((find) => {
      const { stream, quantity } = find
      const place = stream && quantity ? placeOf(view, { ...find, stream, quantity }) : null
      return place ? [`${place.row}~${place.column}`] : []
    })
    return new Map(keys.map((key, index) => [key, Math.min(index, 14)]))
  }, [step, view])
  const reasons: Reasons = {
    handle,
    marked,
    onMark: setChosen,
    at,
    onWalk: setPosition,
    openStep: (number) => {
      setPosition(null)
      onPanel('workings')
      setTimeout(() => document.getElementById(`step-${number}`)?.focus(), 0)
    },
  }
  /** Esc leaves the walk first, then takes the mark away; what is typed into and what lies over the bench keeps its own. */
  const onKeyDownCapture = (event: KeyboardEvent): void => {
    const { target } = event
    if (event.key !== 'Escape' || (at === null && !chosen)) return
    if (!(target instanceof HTMLElement) || !event.currentTarget.contains(target)) return
    if (target.matches('input:not([type="checkbox"]), textarea, select')) return
    event.preventDefault()
    if (at !== null) setPosition(null)
    else setChosen(null)
  }
  return { reasons, panes: { ...shown, wave: ownWave ?? shown.wave }, onKeyDownCapture }
}
