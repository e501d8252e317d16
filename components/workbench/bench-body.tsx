'use client'

import { ChevronUp, Plus } from 'lucide-react'
import { useState } from 'react'
import { Group, Panel, Separator } from 'react-resizable-panels'
import { GridPane } from '@/components/grid/grid-pane'
import { GridSheet } from '@/components/grid/grid-sheet'
import { Button } from '@/components/ui/button'
import { Sheet } from '@/components/ui/sheet'
import type { EditHistory } from '@/hooks/book-handle'
import type { GridPlace, GridSource } from '@/hooks/grid-model'
import type { GridCursor } from '@/hooks/use-grid-cursor'
import type { BookView } from './book-view'
import { CellCard } from './card/cell-card'
import type { Desk } from './desk'
import { NextPanel } from './next/next-panel'
import { NotesPanel, noteLines } from './notes-panel'
import { ChecksPanel } from './odds/checks-panel'
import { OddsPanel } from './odds/odds-panel'
import { type PanelKey, PanelTabs } from './panel-tabs'
import { BoundariesPanel } from './reasons/boundaries-panel'
import { ClosurePanel } from './reasons/closure-panel'
import { MarkNote } from './reasons/mark-note'
import { useReasons } from './reasons/use-reasons'
import { WorkingsPanel } from './reasons/workings-panel'
import { readRow } from './rows'
import type { RulesDraft } from './rules/rules-as-text'
import { RulesPanel } from './rules/rules-panel'
import { useNarrow } from './use-reader'

type BenchBodyProps = {
  view: BookView
  desk: Desk
  history: EditHistory
  table: GridSource
  links: GridSource
  tableCursor: GridCursor
  linksCursor: GridCursor
  streamIds: readonly string[]
  wave: ReadonlyMap<string, number> | null
  panel: PanelKey
  onPanel: (panel: PanelKey) => void
  onPane: (pane: 'table' | 'links') => void
  shown: { pane: 'table' | 'links'; place: GridPlace }
  onStream: (streamId: string) => void
  /** Per cent that a closure may be off. */
  closureLimit: number
}

/** The sheet with its two panes, and the cell card beside it or, on a narrow screen, under it. */
export function BenchBody(props: BenchBodyProps) {
  const { view, desk, history, panel, shown } = props
  const narrow = useNarrow()
  const [cardOpen, setCardOpen] = useState(false)
  const [rulesDraft, setRulesDraft] = useState<RulesDraft>({ asText: false, typed: null })
  const cardIsOpen = !narrow || cardOpen
  const { reasons, panes, onKeyDownCapture } = useReasons({
    view,
    tell: desk.tell,
    panes: { table: props.table, links: props.links, wave: props.wave },
    panel,
    onPanel: props.onPanel,
    cardAsks: cardIsOpen && shown.pane === 'table' && readRow(shown.place.row)?.kind === 'value',
  })
  const card = <CellCard view={view} desk={desk} pane={shown.pane} place={shown.place} reasons={reasons} />
  const shared = { undo: history.undo, redo: history.redo }
  return (
    <div
      onKeyDownCapture={onKeyDownCapture}
      className="flex min-h-0 flex-1 gap-3.5 max-[899px]:flex-col max-[899px]:gap-2"
    >
      <section className="sheet min-h-0 min-w-0 flex-1 overflow-hidden" aria-label="Sheet">
        <GridSheet streamIds={props.streamIds}>
          {(columns, scroll) => (
            <Group orientation="vertical" className="h-full">
              <Panel id="table" defaultSize="66" minSize="160px">
                <div data-region="table" className="h-full">
                  {props.streamIds.length === 0 ? (
                    <EmptyTable view={view} desk={desk} />
                  ) : (
                    <GridPane
                      {...shared}
                      id="grid-table"
                      source={panes.table}
                      columns={columns}
                      scroll={scroll}
                      cursor={props.tableCursor}
                      onEnter={() => props.onPane('table')}
                      wave={panes.wave}
                    />
                  )}
                </div>
              </Panel>
              <Separator
                aria-label="Height of the stream table"
                className="h-1.5 flex-none cursor-row-resize border-y border-hair bg-rail hover:bg-brook-wash focus-visible:bg-brook"
              />
              <Panel id="panel" minSize="38px">
                <div data-region="panel" className="flex h-full flex-col">
                  <PanelTabs
                    chosen={panel}
                    counts={{
                      connections: view.plant.length,
                      rules: view.state.rule.size + view.state.reaction.size,
                      next: 0,
                      odds: view.solved?.solution.conflicts.length ?? 0,
                      checks: view.solved?.solution.checks?.length ?? 0,
                      notes: noteLines(view).length,
                    }}
                    onChoose={props.onPanel}
                  >
                    <MarkNote reasons={reasons} />
                    {view.mayEdit && panel === 'connections' ? (
                      <Button
                        size="small"
                        look="quiet"
                        className="ms-2"
                        onClick={() => desk.openDialog({ kind: 'add', what: 'unit', after: undefined })}
                      >
                        <Plus className="size-3.5" aria-hidden="true" /> Units
                      </Button>
                    ) : null}
                  </PanelTabs>
                  <div
                    id={`panel-${panel}`}
                    role="tabpanel"
                    aria-labelledby={`tab-${panel}`}
                    className={panel === 'connections' ? 'min-h-0 flex-1' : 'min-h-0 flex-1 overflow-y-auto'}
                  >
                    {panel === 'rules' ? (
                      <RulesPanel view={view} desk={desk} draft={rulesDraft} onDraft={setRulesDraft} />
                    ) : null}
                    {panel === 'next' ? <NextPanel view={view} desk={desk} /> : null}
                    {panel === 'boundaries' ? (
                      <BoundariesPanel
                        view={view}
                        handle={reasons.handle}
                        marked={reasons.marked}
                        onMark={reasons.onMark}
                      />
                    ) : null}
                    {panel === 'workings' ? (
                      <WorkingsPanel
                        view={view}
                        desk={desk}
                        handle={reasons.handle}
                        at={reasons.at}
                        onWalk={reasons.onWalk}
                      />
                    ) : null}
                    {panel === 'closure' ? <ClosurePanel view={view} limit={props.closureLimit} /> : null}
                    {panel === 'checks' ? <ChecksPanel view={view} desk={desk} /> : null}
                    {panel === 'odds' ? <OddsPanel view={view} desk={desk} /> : null}
                    {panel === 'notes' ? <NotesPanel view={view} onStream={props.onStream} /> : null}
                    {panel === 'connections' && view.plant.length > 0 ? (
                      <GridPane
                        {...shared}
                        id="grid-links"
                        source={panes.links}
                        columns={columns}
                        scroll={scroll}
                        cursor={props.linksCursor}
                        onEnter={() => props.onPane('links')}
                        wave={null}
                      />
                    ) : null}
                    {panel === 'connections' && view.plant.length === 0 ? (
                      <p className="px-4 py-3 text-ink-2">
                        No units yet. A unit takes streams in and gives streams out; its balances are what lets one
                        value follow from others.
                      </p>
                    ) : null}
                  </div>
                </div>
              </Panel>
            </Group>
          )}
        </GridSheet>
      </section>
      {narrow ? (
        <>
          <Button className="flex-none justify-between" onClick={() => setCardOpen(true)}>
            <span className="truncate leading-normal">
              {(shown.pane === 'table' ? props.table : props.links).view(shown.place).label}
            </span>
            <ChevronUp className="size-4" aria-hidden="true" />
          </Button>
          <Sheet open={cardOpen} onOpenChange={setCardOpen} title="Cell">
            {card}
          </Sheet>
        </>
      ) : (
        <aside
          data-region="card"
          aria-label="Cell card"
          className="sheet w-[300px] flex-none overflow-y-auto px-4.5 py-4"
        >
          {card}
        </aside>
      )}
    </div>
  )
}

function EmptyTable({ view, desk }: { view: BookView; desk: Desk }) {
  if (!view.mayEdit) return <p className="p-6 text-ink-2">No streams yet.</p>
  return (
    <div className="grid h-full place-content-center gap-3 p-6 text-center">
      <p className="max-w-md text-ink-2">
        Streams stand across, components down. Paste a list with one on each line, or type the first few.
      </p>
      <div className="flex justify-center gap-2">
        <Button look="main" onClick={() => desk.openDialog({ kind: 'add', what: 'stream', after: undefined })}>
          Add streams…
        </Button>
        <Button onClick={() => desk.openDialog({ kind: 'add', what: 'component', after: undefined })}>
          Add components…
        </Button>
        <Button onClick={() => desk.openDialog({ kind: 'add', what: 'unit', after: undefined })}>Add units…</Button>
      </div>
    </div>
  )
}
