'use client'

import { MenuItem, MenuRule } from '@/components/ui/menu'
import type { GridRange } from '@/hooks/grid-model'
import { NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import { moveAfter } from '@/lib/book/edits/fields'
import { setPresence } from '@/lib/book/edits/presence'
import { remove, removeComponents, removeStreams, removeUnits } from '@/lib/book/edits/remove'
import { absenceId, newId } from '@/lib/book/ids'
import { type Measure, measureTitle } from '@/lib/book/measures'
import type { BookView } from './book-view'
import type { Desk } from './desk'
import { readRow } from './rows'
import { neighbour } from './table-source'

type PlaceMenuProps = {
  pane: 'table' | 'links'
  range: GridRange
  view: BookView
  desk: Desk
}

/** What can be done with the rows and columns that are selected. */
export function PlaceMenu({ pane, range, view, desk }: PlaceMenuProps) {
  const { state } = view
  const streams = range.columns.flatMap((id) => state.stream.get(id) ?? [])
  const components =
    pane === 'table'
      ? range.rows.flatMap((id) => {
          const ref = readRow(id)
          return ref?.kind === 'value' && ref.componentId !== null ? (state.component.get(ref.componentId) ?? []) : []
        })
      : []
  const measures =
    pane === 'table'
      ? range.rows.flatMap((id) => {
          const ref = readRow(id)
          return ref?.kind === 'value' && ref.measureId !== null ? (state.measure.get(ref.measureId) ?? []) : []
        })
      : []
  const units = pane === 'links' ? range.rows.flatMap((id) => state.unit.get(id) ?? []) : []
  const inHead = range.columns.every((id) => id === NAME_COLUMN || id === UNIT_COLUMN)
  if (!view.mayEdit) return <MenuItem disabled>You can read this book; your role does not edit it</MenuItem>
  return (
    <>
      {components.length > 0 && streams.length > 0 ? (
        <PresenceItems view={view} desk={desk} streams={streams} components={components} />
      ) : null}
      {streams.length > 0 ? (
        <>
          <MoveItems
            view={view}
            desk={desk}
            kind="stream"
            list={view.streams}
            id={streams[0]?.id ?? ''}
            words={['left', 'right']}
          />
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'stream', after: streams.at(-1)?.id })}>
            Add streams after {streams.at(-1)?.tag}…
          </MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'presence', streamId: streams[0]?.id ?? null })}>
            Components of {streams[0]?.tag}…
          </MenuItem>
          <MenuItem danger onSelect={() => desk.tryRun(removeStreams(state, ids(streams), newId))}>
            Remove {streams.length === 1 ? `stream ${streams[0]?.tag}` : `${streams.length} streams`}
          </MenuItem>
        </>
      ) : null}
      {streams.length > 0 && (components.length > 0 || units.length > 0) ? <MenuRule /> : null}
      {components.length > 0 ? (
        <>
          <MoveItems
            view={view}
            desk={desk}
            kind="component"
            list={view.components}
            id={components[0]?.id ?? ''}
            words={['up', 'down']}
          />
          <MenuItem onSelect={() => desk.openDialog({ kind: 'component', id: components[0]?.id ?? '' })}>
            Tag, formula, molar mass of {components[0]?.tag}…
          </MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'component', after: components.at(-1)?.id })}>
            Add components after {components.at(-1)?.tag}…
          </MenuItem>
          <MenuItem danger onSelect={() => desk.tryRun(removeComponents(state, ids(components), newId))}>
            Remove{' '}
            {uniqueCount(components) === 1
              ? `component ${components[0]?.tag}`
              : `${uniqueCount(components)} components`}
          </MenuItem>
        </>
      ) : null}
      {measures.length > 0 ? (
        <>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'measure', id: measures[0]?.id ?? null })}>
            What the row {measureTitle(state, measures[0] as Measure)} is of…
          </MenuItem>
          <MenuItem
            danger
            onSelect={() => desk.tryRun(remove(state, 'measure', [...new Set(measures.map(({ id }) => id))], newId))}
          >
            Remove {measures.length === 1 ? 'the row' : `${measures.length} rows`}
          </MenuItem>
        </>
      ) : null}
      {units.length > 0 ? (
        <>
          <MoveItems
            view={view}
            desk={desk}
            kind="unit"
            list={view.plant}
            id={units[0]?.id ?? ''}
            words={['up', 'down']}
          />
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'unit', after: units.at(-1)?.id })}>
            Add units after {units.at(-1)?.tag}…
          </MenuItem>
          <MenuItem danger onSelect={() => desk.tryRun(removeUnits(state, ids(units), newId))}>
            Remove {units.length === 1 ? `unit ${units[0]?.tag}` : `${units.length} units`}
          </MenuItem>
        </>
      ) : null}
      {inHead && components.length === 0 && units.length === 0 ? (
        <>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'stream', after: undefined })}>
            Add streams…
          </MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'component', after: undefined })}>
            Add components…
          </MenuItem>
        </>
      ) : null}
    </>
  )
}

type Named = { id: string; tag: string }
const ids = (records: readonly Named[]): string[] => [...new Set(records.map(({ id }) => id))]
const uniqueCount = (records: readonly Named[]): number => ids(records).length

function PresenceItems({
  view,
  desk,
  streams,
  components,
}: {
  view: BookView
  desk: Desk
  streams: readonly Named[]
  components: readonly Named[]
}) {
  const { state } = view
  const pairs = streams.flatMap((stream) => components.map((component) => absenceId(stream.id, component.id)))
  const absent = pairs.filter((id) => state.absence.has(id)).length
  const set = (presence: 'present' | 'absent') =>
    desk.tryRun(setPresence(state, ids(streams), ids(components), presence, newId))
  const who = uniqueCount(components) === 1 ? components[0]?.tag : `${uniqueCount(components)} components`
  const where = streams.length === 1 ? streams[0]?.tag : `${streams.length} streams`
  return (
    <>
      {absent > 0 ? <MenuItem onSelect={() => set('present')}>{`Let ${who} be present in ${where}`}</MenuItem> : null}
      {absent < pairs.length ? (
        <MenuItem onSelect={() => set('absent')}>{`${who} cannot be in ${where}`}</MenuItem>
      ) : null}
      <MenuRule />
    </>
  )
}

type MoveItemsProps = {
  view: BookView
  desk: Desk
  kind: 'stream' | 'component' | 'unit'
  list: readonly Named[]
  id: string
  words: [string, string]
}

function MoveItems({ view, desk, kind, list, id, words }: MoveItemsProps) {
  const item = (step: -1 | 1, word: string) => {
    const after = neighbour(list, id, step)
    return (
      <MenuItem
        disabled={after === undefined}
        keys={`Alt+${step < 0 ? (kind === 'stream' ? '←' : '↑') : kind === 'stream' ? '→' : '↓'}`}
        onSelect={() => after !== undefined && desk.tryRun(moveAfter(view.state, kind, id, after, newId))}
      >
        Move {word}
      </MenuItem>
    )
  }
  return (
    <>
      {item(-1, words[0])}
      {item(1, words[1])}
    </>
  )
}
