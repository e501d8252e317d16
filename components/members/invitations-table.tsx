'use client'

import { Button } from '@/components/ui/button'
import { Tag } from '@/components/ui/tag'
import { Day } from './day'
import { listed, roleName } from './role-words'
import type { InvitationRow } from './types'

type InvitationsTableProps = {
  invitations: readonly InvitationRow[]
  /** Id of the one whose mail is being sent again. */
  resending: string | null
  onResend: (invitation: InvitationRow) => void
  onRevoke: (invitation: InvitationRow) => void
}

/** The invitations that nobody has accepted yet. */
export function InvitationsTable({ invitations, resending, onResend, onRevoke }: InvitationsTableProps) {
  return (
    <ul aria-label="Open invitations">
      {invitations.map((invitation) => (
        <li
          key={invitation.id}
          className="flex flex-wrap items-center gap-x-4 gap-y-2 border-b border-hair px-3 py-2.5 last:border-b-0"
        >
          <div className="min-w-0 flex-1 basis-64">
            <p className="font-semibold wrap-anywhere">{invitation.email}</p>
            <p className="text-sm wrap-anywhere text-ink-2">
              {roleName(invitation.role)}
              {invitation.projects.length > 0 ? `, ${listed(invitation.projects.map(({ name }) => name))}` : ''}
            </p>
          </div>
          <p className="basis-56 text-sm text-ink-2">
            {invitation.hasExpired ? (
              <>
                <Tag tone="absent">Has run out</Tag> on <Day at={invitation.expiresAt} />
              </>
            ) : (
              <>
                Stands until <Day at={invitation.expiresAt} />
              </>
            )}
            <span className="block">Sent by {invitation.inviter}</span>
          </p>
          <div className="flex gap-2">
            <Button
              size="small"
              busy={resending === invitation.id}
              onClick={() => onResend(invitation)}
              aria-label={`Send again: the invitation of ${invitation.email}`}
            >
              Send again
            </Button>
            <Button
              size="small"
              look="danger"
              onClick={() => onRevoke(invitation)}
              aria-label={`Withdraw the invitation of ${invitation.email}`}
            >
              Withdraw
            </Button>
          </div>
        </li>
      ))}
    </ul>
  )
}
