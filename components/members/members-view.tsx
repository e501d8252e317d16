'use client'

import { UserPlus } from 'lucide-react'
import { useState } from 'react'
import { AskDialog } from '@/components/ui/ask-dialog'
import { Button } from '@/components/ui/button'
import { notify } from '@/components/ui/toast'
import { useAction } from '@/components/ui/use-action'
import type { Role } from '@/lib/auth/permissions'
import { InvitationsTable } from './invitations-table'
import { InviteDialog } from './invite-dialog'
import { type MemberDialog, MemberDialogs } from './member-dialogs'
import { MemberMenu } from './member-menu'
import { MembersTable } from './members-table'
import { isAskedFirst } from './role-change'
import { aRole } from './role-words'
import type { InvitationRow, MemberRow, MembersActions, ProjectChoice } from './types'

export type MembersViewProps = {
  teamName: string
  members: MemberRow[]
  projects: ProjectChoice[]
  /** null: this role does not see them. */
  invitations: InvitationRow[] | null
  /** What to draw; the verbs decide again. */
  mayChange: boolean
  actions: MembersActions
}

/** Who is in a team and who is invited; for owners, with all that can be done about it. */
export function MembersView({ teamName, members, projects, invitations, mayChange, actions }: MembersViewProps) {
  const { run } = useAction()
  const [open, setOpen] = useState<MemberDialog | null>(null)
  const [isInviting, setInviting] = useState(false)
  const [revoking, setRevoking] = useState<InvitationRow | null>(null)
  const [pending, setPending] = useState<{ userId: string; role: Role } | null>(null)
  const [resending, setResending] = useState<string | null>(null)

  const giveRole = (member: MemberRow, role: Role) => {
    if (isAskedFirst(member.role, role)) return setOpen({ dialog: 'role', member, role })
    setPending({ userId: member.userId, role })
    run(
      () => actions.changeRole({ user: member.userId, role }).finally(() => setPending(null)),
      () => notify(`${member.name} is ${aRole(role)} now.`),
    )
  }
  const resend = ({ id, email }: InvitationRow) => {
    setResending(id)
    run(
      () => actions.resendInvitation({ invitation: id }).finally(() => setResending(null)),
      () => notify(`The invitation is on its way to ${email} again; the former link ends.`),
    )
  }

  return (
    <>
      <section aria-labelledby="people" className="grid gap-3">
        <header className="flex flex-wrap items-center gap-2">
          <h2 id="people" className="me-auto text-lg">
            People
          </h2>
          {invitations ? (
            <Button look="main" onClick={() => setInviting(true)}>
              <UserPlus className="size-4" aria-hidden="true" />
              Invite people
            </Button>
          ) : null}
        </header>
        {mayChange ? null : <p className="text-ink-2">Owners of the team invite people and change what they may do.</p>}
        <div className="sheet overflow-hidden">
          <MembersTable
            members={members}
            pending={pending}
            onRole={mayChange ? giveRole : null}
            memberActions={
              mayChange
                ? (member) => (
                    <MemberMenu member={member} onAsk={(dialog) => setOpen({ dialog, member } as MemberDialog)} />
                  )
                : null
            }
          />
        </div>
      </section>
      {invitations ? (
        <section aria-labelledby="invitations" className="grid gap-3">
          <h2 id="invitations" className="text-lg">
            Invited
          </h2>
          {invitations.length === 0 ? (
            <p className="text-ink-2">No invitation is open.</p>
          ) : (
            <div className="sheet overflow-hidden">
              <InvitationsTable
                invitations={invitations}
                resending={resending}
                onResend={resend}
                onRevoke={setRevoking}
              />
            </div>
          )}
        </section>
      ) : null}
      <MemberDialogs
        open={open}
        teamName={teamName}
        projects={projects}
        actions={actions}
        onClose={() => setOpen(null)}
      />
      {isInviting ? (
        <InviteDialog
          projects={projects}
          inviteMember={actions.inviteMember}
          onInvited={(sent) =>
            notify(sent.length === 1 ? `${sent[0]} is invited.` : `${sent.length} people are invited.`)
          }
          onClose={() => setInviting(false)}
        />
      ) : null}
      {revoking ? (
        <AskDialog
          title="Withdraw the invitation?"
          verb="Withdraw"
          isDanger
          action={() => actions.revokeInvitation({ invitation: revoking.id })}
          onDone={() => notify(`The invitation of ${revoking.email} is withdrawn.`)}
          onClose={() => setRevoking(null)}
        >
          <p>
            The link in the mail to <span className="wrap-anywhere">{revoking.email}</span> opens nothing any more. You
            can invite them again.
          </p>
        </AskDialog>
      ) : null}
    </>
  )
}
