'use client'

import { EllipsisVertical, FolderOpen, LogOut, UserCheck, UserMinus, UserX } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { Menu, MenuItem, MenuRule } from '@/components/ui/menu'
import type { MemberDialog } from './member-dialogs'
import type { MemberRow } from './types'

type MemberMenuProps = { member: MemberRow; onAsk: (dialog: MemberDialog['dialog']) => void }

/** What an owner can do with somebody of the team. */
export function MemberMenu({ member, onAsk }: MemberMenuProps) {
  return (
    <Menu
      align="end"
      label={`Actions for ${member.name}`}
      trigger={
        <IconButton label={`Actions for ${member.name}`} size="small">
          <EllipsisVertical className="size-4" aria-hidden="true" />
        </IconButton>
      }
    >
      {member.projects === 'all' ? null : (
        <MenuItem icon={<FolderOpen />} onSelect={() => onAsk('projects')}>
          Choose projects…
        </MenuItem>
      )}
      {member.isYou ? (
        <MenuItem danger icon={<LogOut />} onSelect={() => onAsk('leave')}>
          Leave the team…
        </MenuItem>
      ) : (
        <>
          {member.state === 'active' ? (
            <MenuItem icon={<UserMinus />} onSelect={() => onAsk('deactivate')}>
              Deactivate…
            </MenuItem>
          ) : (
            <MenuItem icon={<UserCheck />} onSelect={() => onAsk('reactivate')}>
              Reactivate…
            </MenuItem>
          )}
          <MenuRule />
          <MenuItem danger icon={<UserX />} onSelect={() => onAsk('remove')}>
            Remove from the team…
          </MenuItem>
        </>
      )}
    </Menu>
  )
}
