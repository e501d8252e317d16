'use client'

import { Download, Plus, Redo2, Undo2 } from 'lucide-react'
import Link from 'next/link'
import type { ReactNode } from 'react'
import { Button, buttonClasses, IconButton } from '@/components/ui/button'
import { Menu, MenuItem, MenuRule } from '@/components/ui/menu'
import type { BookHandle } from '@/hooks/book-handle'
import { setBook } from '@/lib/book/edits/fields'
import { newId } from '@/lib/book/ids'
import type { BookView } from './book-view'
import type { Desk } from './desk'
import { RenameInPlace } from './rename-in-place'
import { SaveState } from './save-state'

type BenchHeaderProps = {
  book: BookHandle
  view: BookView
  desk: Desk
  crumb: { label: string; href: string } | null
  /** What stands where the book is kept: "All changes kept". */
  kept: string
  downloadHref: string | null
  children?: ReactNode
}

/** Where one is, what the book is called, whether it is kept, and the ways out. */
export function BenchHeader({ book, view, desk, crumb, kept, downloadHref, children }: BenchHeaderProps) {
  const { history } = book
  const caseName = view.state.case.get(view.caseId)?.name ?? ''
  const undoWords = history.undoLabel ? `Undo: ${history.undoLabel}` : 'Nothing to undo'
  const redoWords = history.redoLabel ? `Redo: ${history.redoLabel}` : 'Nothing to redo'
  return (
    <header className="flex flex-wrap items-center gap-x-3 gap-y-1.5">
      {crumb ? (
        <p className="text-ink-2 max-md:hidden">
          <Link href={crumb.href} className="hover:underline">
            {crumb.label}
          </Link>
          <span className="ms-3 text-hair-2" aria-hidden="true">
            /
          </span>
        </p>
      ) : null}
      <RenameInPlace
        value={view.book.name}
        label="Name of the book"
        mayEdit={view.mayEdit}
        onRename={(name) => desk.run(setBook(view.state, { name }, newId))}
      />
      {caseName ? (
        <span className="rounded-md border border-hair-2 px-2 py-0.5 text-xs text-ink-2">{caseName}</span>
      ) : null}
      <span className="flex-1" />
      <SaveState save={book.save} kept={kept} />
      {view.mayEdit ? (
        <span className="flex items-center gap-0.5">
          <IconButton label={undoWords} disabled={!history.undoLabel} onClick={history.undo}>
            <Undo2 className="size-4" aria-hidden="true" />
          </IconButton>
          <IconButton label={redoWords} disabled={!history.redoLabel} onClick={history.redo}>
            <Redo2 className="size-4" aria-hidden="true" />
          </IconButton>
        </span>
      ) : null}
      {view.mayEdit ? (
        <Menu
          align="end"
          trigger={
            <Button>
              <Plus className="size-4" aria-hidden="true" /> Add
            </Button>
          }
        >
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'stream', after: undefined })}>
            Streams…
          </MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'component', after: undefined })}>
            Components…
          </MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'add', what: 'unit', after: undefined })}>Units…</MenuItem>
          <MenuItem onSelect={() => desk.openDialog({ kind: 'measure', id: null })}>
            A row: dry basis, element or ratio…
          </MenuItem>
          <MenuRule />
          <MenuItem onSelect={() => desk.openDialog({ kind: 'presence', streamId: null })}>
            Which components can be where…
          </MenuItem>
        </Menu>
      ) : null}
      {downloadHref ? (
        <a href={downloadHref} download className={buttonClasses('main')}>
          <Download className="size-4" aria-hidden="true" /> <span className="max-sm:sr-only">Download .xlsx</span>
        </a>
      ) : null}
      {children}
    </header>
  )
}
