'use client'

import { type KeyboardEvent, useEffect, useMemo, useRef, useState } from 'react'
import { cellId } from '@/components/grid/grid-row'
import { PointMenu } from '@/components/grid/point-menu'
import { Caution } from '@/components/ui/caution'
import { notify, notifyProblem } from '@/components/ui/toast'
import type { BookHandle } from '@/hooks/book-handle'
import { type GridEdit, type GridPlace, NAME_COLUMN, UNIT_COLUMN } from '@/hooks/grid-model'
import type { PanelsClient } from '@/hooks/panels-client'
import type { SolverHandle } from '@/hooks/solver-handle'
import { useGridCursor } from '@/hooks/use-grid-cursor'
import { PanelsContext } from '@/hooks/use-panels'
import { inOrder } from '@/lib/book/state'
import { BenchBody } from './bench-body'
import { BenchHeader } from './bench-header'
import { bookView, type Digits } from './book-view'
import { type Desk, type DialogRequest, type Offer, runner } from './desk'
import { BenchDialogs } from './dialogs/bench-dialogs'
import { linksRows, linksSource } from './links-source'
import { OfferNote } from './offer-note'
import { Legend, type PanelKey } from './panel-tabs'
import { PlaceMenu } from './place-menu'
import { backToCell, goToNextRegion } from './regions'
import { type SectionKey, sectionOf, valueRow } from './rows'
import { SaveTrouble } from './save-state'
import { noneWords, seekCell, seekKeys } from './seek-cell'
import { Strip } from './strip'
import { tableRows } from './table-cells'
import { tableSource } from './table-source'
import { type DecimalChoice, useDecimal } from './use-reader'
import { useWave } from './use-wave'

export type WorkbenchProps = {
  book: BookHandle
  solver: SolverHandle
  /** The second worker, for what somebody looks at. */
  panels: PanelsClient
  caseId: string
  crumb?: { label: string; href: string } | null
  /** What is said while nothing waits to be sent. */
  kept?: string
  /** Why it cannot be edited, in words, where it cannot. */
  readOnly?: string
  /** The decimal sign that the team has chosen; left out: that of the person's own language. */
  decimal?: DecimalChoice
  /** Significant digits that the team has chosen. Keep the same object from one drawing to the next. */
  digits?: Digits
  /** Per cent that a closure may be off before it is marked. */
  closureLimit?: number
  downloadHref?: string | null
  headerEnd?: React.ReactNode
}

const startOpen: ReadonlySet<SectionKey> = new Set(['fraction', 'componentFlow', 'measures'])

/** One book at work: header, strip, sheet, panels and cell card, over any handle of a book. */
export function Workbench({ book, solver, caseId, crumb = null, kept = 'All changes kept', ...props }: WorkbenchProps) {
  const decimal = useDecimal(props.decimal ?? 'own')
  const { digits } = props
  const [open, setOpen] = useState(startOpen)
  const [panel, setPanel] = useState<PanelKey>('connections')
  const [pane, setPane] = useState<'table' | 'links'>('table')
  const [offer, setOffer] = useState<Offer | null>(null)
  const [menu, setMenu] = useState<Parameters<Desk['openMenu']>[0] | null>(null)
  const [dialog, setDialog] = useState<DialogRequest | null>(null)
  const [wanted, setWanted] = useState<{ pane: 'table' | 'links'; place: GridPlace } | null>(null)
  const root = useRef<HTMLDivElement>(null)

  const view = useMemo(
    () => bookView(book.state, caseId, solver.solved, book.mayEdit, decimal, digits),
    [book.state, caseId, solver.solved, book.mayEdit, decimal, digits],
  )
  const desk = useMemo((): Desk => {
    const run = runner(book.edit)
    return {
      run,
      tryRun: (edit) => {
        const refused = run(edit)
        if (refused) notifyProblem(refused)
        return refused === null
      },
      tell: notifyProblem,
      offer: setOffer,
      openMenu: setMenu,
      openDialog: setDialog,
      openPanel: (key) => {
        setPanel(key)
        setTimeout(() => document.getElementById(`tab-${key}`)?.focus(), 0)
      },
      show: (inPane, place) => {
        const section = sectionOf(place.row)
        if (section) setOpen((was) => (was.has(section) ? was : new Set([...was, section])))
        setWanted({ pane: inPane, place })
      },
    }
  }, [book.edit])

  const rows = useMemo(() => tableRows(view, open), [view, open])
  const unitRows = useMemo(() => linksRows(view), [view])
  const streamIds = useStable(view.streams.map(({ id }) => id))
  const columnIds = useMemo(() => [NAME_COLUMN, UNIT_COLUMN, ...streamIds], [streamIds])
  const firstStream = inOrder(book.state.stream)[0]?.id ?? NAME_COLUMN
  const tableCursor = useGridCursor(
    rows,
    columnIds,
    () => ({ row: valueRow('flow'), column: firstStream }),
    sayNotTaken,
  )
  const unitStart = () => ({ row: unitRows[0]?.id ?? '', column: firstStream })
  const linksCursor = useGridCursor(unitRows, columnIds, unitStart, sayNotTaken)
  const table = useMemo(
    () =>
      tableSource({
        view,
        rows,
        desk,
        toggle: (section) =>
          setOpen((was) => {
            const next = new Set(was)
            if (!next.delete(section)) next.add(section)
            return next
          }),
      }),
    [view, rows, desk],
  )
  const links = useMemo(() => linksSource(view, unitRows, desk), [view, unitRows, desk])
  const wave = useWave(solver.solved)
  const cursor = pane === 'links' && panel === 'connections' && unitRows.length > 0 ? linksCursor : tableCursor
  const shownPane = cursor === linksCursor ? 'links' : 'table'
  // What was just added is on the screen one drawing later: only then can the cursor go there.
  const selectIn = { table: tableCursor.select, links: linksCursor.select }
  const select = wanted ? selectIn[wanted.pane] : null
  useEffect(() => {
    if (!wanted || !select) return
    select(wanted.place)
    setPane(wanted.pane)
    if (wanted.pane === 'links') setPanel('connections')
    setWanted(null)
    backToCell(wanted.pane, true)
  }, [wanted, select])

  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'F6' && root.current && goToNextRegion(root.current, event.shiftKey)) event.preventDefault()
    const sought = event.ctrlKey || event.metaKey || event.altKey ? undefined : seekKeys[event.key]
    if (sought) {
      const place = seekCell(view, open, tableCursor.selection.active, sought, event.shiftKey)
      if (place) desk.show('table', place)
      else notify(noneWords[sought])
      event.preventDefault()
    }
    const isTyping = event.target instanceof HTMLInputElement || event.target instanceof HTMLTextAreaElement
    if (event.defaultPrevented || isTyping || !(event.ctrlKey || event.metaKey)) return
    const key = event.key.toLowerCase()
    if (key !== 'z' && key !== 'y') return
    if (key === 'y' || event.shiftKey) book.history.redo()
    else book.history.undo()
    event.preventDefault()
  }
  return (
    <PanelsContext value={props.panels}>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: F6 goes round the parts from wherever the focus is */}
      <div
        ref={root}
        onKeyDown={onKeyDown}
        className="flex h-(--page-height) min-h-96 flex-col gap-2.5 px-5 pt-3 pb-2 max-sm:gap-2 max-sm:px-2.5 max-sm:pt-2"
      >
        <BenchHeader
          book={book}
          view={view}
          desk={desk}
          crumb={crumb}
          kept={kept}
          downloadHref={props.downloadHref ?? null}
        >
          {props.headerEnd}
        </BenchHeader>
        {props.readOnly ? <p className="text-sm text-ink-2">{props.readOnly}</p> : null}
        <SaveTrouble save={book.save} state={book.state} />
        <Strip
          view={view}
          stale={solver.stale && solver.solved !== null}
          trouble={solver.trouble}
          onPanel={desk.openPanel}
        />
        <BenchBody
          view={view}
          desk={desk}
          history={book.history}
          table={table}
          links={links}
          tableCursor={tableCursor}
          linksCursor={linksCursor}
          streamIds={streamIds}
          wave={wave}
          panel={panel}
          onPanel={setPanel}
          onPane={setPane}
          shown={{ pane: shownPane, place: cursor.selection.active }}
          onStream={(streamId) => desk.show('table', { row: 'tag', column: streamId })}
          closureLimit={props.closureLimit ?? 0.1}
        />
        <footer className="flex items-baseline justify-between gap-6">
          <Caution />
          <Legend />
        </footer>
        {offer ? (
          <OfferNote
            offer={offer}
            cellId={cellId(`grid-${offer.pane}`, offer.place.row, offer.place.column)}
            onDone={() => setOffer(null)}
          />
        ) : null}
        <PointMenu
          at={menu?.at ?? null}
          label="Rows and columns"
          onShut={() => {
            setMenu(null)
            backToCell(shownPane)
          }}
        >
          {menu ? (
            <PlaceMenu
              pane={menu.pane}
              range={(menu.pane === 'table' ? tableCursor : linksCursor).range}
              view={view}
              desk={desk}
            />
          ) : null}
        </PointMenu>
        <BenchDialogs
          request={dialog}
          view={view}
          desk={desk}
          onShut={() => {
            setDialog(null)
            backToCell(shownPane)
          }}
        />
      </div>
    </PanelsContext>
  )
}

/** A refused entry gives way to the next one: it is named, so that it can be typed again. */
const sayNotTaken = ({ draft, reason }: GridEdit) => notifyProblem(`“${draft}” was not taken. ${reason ?? ''}`)

/** The same list for as long as its ids are the same, so that columns are not made anew on every edit. */
function useStable(ids: string[]): readonly string[] {
  const [kept, setKept] = useState<readonly string[]>(ids)
  if (kept.length === ids.length && kept.every((id, index) => id === ids[index])) return kept
  setKept(ids)
  return ids
}
