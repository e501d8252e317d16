'use client'

import { type GridPlace, NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { directionAt } from '../links-source'
import type { Reasons } from '../reasons/reasons'
import { readRow } from '../rows'
import { CardHead } from './card-parts'
import { ComponentCard } from './component-card'
import { StreamCard } from './stream-card'
import { UnitCard } from './unit-card'
import { ValueCard } from './value-card'

type CellCardProps = {
  view: BookView
  desk: Desk
  pane: 'table' | 'links'
  place: GridPlace
  reasons?: Reasons | undefined
}

/** What the card shows follows the cursor: a cell, a stream, a component, a unit or one connection. */
export function CellCard({ view, desk, pane, place, reasons }: CellCardProps) {
  const { state } = view
  const stream = state.stream.get(place.column)
  if (pane === 'links') {
    const unit = state.unit.get(place.row)
    if (!unit) return <Nothing />
    if (!stream) return <UnitCard key={unit.id} view={view} desk={desk} unit={unit} />
    const direction = directionAt(state, unit.id, stream.id)
    return (
      <>
        <CardHead
          where={`${stream.tag} · ${unit.tag}`}
          title={direction === 'in' ? 'Enters' : direction === 'out' ? 'Leaves' : 'Not connected'}
        />
        <p className="mt-1 text-sm text-ink-2">Space or a click goes from in to out to none; I and O set it at once.</p>
        <div className="mt-4 border-t border-hair pt-3">
          <UnitCard key={unit.id} view={view} desk={desk} unit={unit} />
        </div>
      </>
    )
  }
  const ref = readRow(place.row)
  if (!ref) return <Nothing />
  if (stream && ref.kind === 'value')
    return (
      <ValueCard
        key={`${place.row}~${place.column}`}
        view={view}
        desk={desk}
        stream={stream}
        row={ref}
        reasons={reasons}
      />
    )
  if (stream) return <StreamCard key={stream.id} view={view} desk={desk} stream={stream} />
  const component =
    ref.kind === 'value' && ref.componentId !== null && (place.column === NAME_COLUMN || place.column === UNIT_COLUMN)
      ? state.component.get(ref.componentId)
      : undefined
  return component ? <ComponentCard key={component.id} view={view} desk={desk} component={component} /> : <Nothing />
}

const Nothing = () => <p className="text-ink-2">Move to a cell to see where its value comes from.</p>
