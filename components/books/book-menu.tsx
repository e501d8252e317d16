'use client'

import { Archive, ArchiveRestore, Copy, EllipsisVertical } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { Menu, MenuItem } from '@/components/ui/menu'
import type { BookRow } from './types'

type BookMenuProps = {
  book: BookRow
  mayDuplicate: boolean
  mayArchive: boolean
  onDuplicate: () => void
  onArchive: () => void
  onRestore: () => void
}

/** What can be done with a book from the list. Nothing is drawn for somebody who may do none of it. */
export function BookMenu({ book, mayDuplicate, mayArchive, onDuplicate, onArchive, onRestore }: BookMenuProps) {
  const isArchived = book.archivedAt !== null
  if (!mayArchive && (isArchived || !mayDuplicate)) return null
  return (
    <Menu
      align="end"
      label={`Actions for ${book.name}`}
      trigger={
        <IconButton label={`Actions for ${book.name}`} size="small">
          <EllipsisVertical className="size-4" aria-hidden="true" />
        </IconButton>
      }
    >
      {isArchived ? (
        <MenuItem icon={<ArchiveRestore />} onSelect={onRestore}>
          Restore
        </MenuItem>
      ) : (
        <>
          {mayDuplicate ? (
            <MenuItem icon={<Copy />} onSelect={onDuplicate}>
              Duplicate
            </MenuItem>
          ) : null}
          {mayArchive ? (
            <MenuItem icon={<Archive />} onSelect={onArchive}>
              Archive
            </MenuItem>
          ) : null}
        </>
      )}
    </Menu>
  )
}
