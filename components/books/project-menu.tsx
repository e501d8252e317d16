'use client'

import { EllipsisVertical, Pencil, Plus } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { Menu, MenuItem } from '@/components/ui/menu'
import type { ProjectRow } from './types'

type ProjectMenuProps = {
  project: ProjectRow
  /** null: this person may not. */
  onNewBook: (() => void) | null
  onRename: (() => void) | null
}

export function ProjectMenu({ project, onNewBook, onRename }: ProjectMenuProps) {
  if (!onNewBook && !onRename) return null
  return (
    <Menu
      align="end"
      label={`Actions for project ${project.name}`}
      trigger={
        <IconButton label={`Actions for project ${project.name}`} size="small">
          <EllipsisVertical className="size-4" aria-hidden="true" />
        </IconButton>
      }
    >
      {onNewBook ? (
        <MenuItem icon={<Plus />} onSelect={onNewBook}>
          New book here
        </MenuItem>
      ) : null}
      {onRename ? (
        <MenuItem icon={<Pencil />} onSelect={onRename}>
          Rename project
        </MenuItem>
      ) : null}
    </Menu>
  )
}
