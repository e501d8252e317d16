'use client'

import Link from 'next/link'
import { useState } from 'react'
import { Button, buttonClasses } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { useAction } from '@/components/ui/use-action'
import { authClient } from '@/lib/auth/client'
import type { InvitationLook } from '@/lib/data/invitation/look-invitation'
import { Day } from './day'
import { JoinForm } from './join-form'
import { aRole, listed, roleSentence } from './role-words'
import type { InvitationActions } from './types'

type InvitationSheetProps = { look: InvitationLook; token: string; actions: InvitationActions }

/** What an invitation is for, and the way in for who looks at it: with an account, without one, or with another one. */
export function InvitationSheet({ look, token, actions }: InvitationSheetProps) {
  const { role, projects, email, expiresAt } = look
  return (
    <div className="grid gap-4">
      <section aria-label="The invitation" className="sheet grid gap-2 p-5 sm:p-6">
        <p>
          You are asked to come in as <strong>{aRole(role)}</strong>. {roleSentence(role)}
        </p>
        {projects.length > 0 ? (
          <p>
            {projects.length === 1 ? 'Project' : 'Projects'}: <strong>{listed(projects)}</strong>.
          </p>
        ) : null}
        <p className="text-ink-2">
          It is for <span className="wrap-anywhere">{email}</span> and stands until <Day at={expiresAt} />.
        </p>
      </section>
      <WayIn look={look} token={token} actions={actions} />
    </div>
  )
}

function WayIn({ look, token, actions }: InvitationSheetProps) {
  if (look.you.kind === 'invited') return <Accept team={look.team} token={token} accept={actions.acceptInvitation} />
  if (look.you.kind === 'somebodyElse') return <WrongAccount mine={look.you.email} invited={look.email} />
  if (!look.hasAccount) return <JoinForm email={look.email} token={token} join={actions.signUpAndAccept} />
  const here = `/invitation?token=${encodeURIComponent(token)}`
  return (
    <div className="sheet grid justify-items-start gap-3 p-5 sm:p-6">
      <p>There is an account with this address. Sign in with it, and you come back here to accept.</p>
      <Link href={`/sign-in?next=${encodeURIComponent(here)}`} className={buttonClasses('main', 'large')}>
        Sign in to accept
      </Link>
    </div>
  )
}

function Accept({
  team,
  token,
  accept,
}: {
  team: string
  token: string
  accept: InvitationActions['acceptInvitation']
}) {
  const { run, isBusy, refusal } = useAction({ quiet: true })
  return (
    <div className="sheet grid gap-3 p-5 sm:p-6">
      <ErrorSummary problems={refusal ? [{ text: refusal }] : []} title="You are not in the team" />
      <Button
        look="main"
        size="large"
        busy={isBusy}
        onClick={() =>
          run(
            () => accept({ token }),
            (joined) => window.location.assign(`/${joined.team}/books`),
          )
        }
      >
        Join {team}
      </Button>
    </div>
  )
}

/** The invitation is for another address than that of the account in this browser. */
function WrongAccount({ mine, invited }: { mine: string; invited: string }) {
  const [state, setState] = useState<'waiting' | 'busy' | 'failed'>('waiting')
  const signOut = async () => {
    setState('busy')
    const failed = await authClient.signOut().then(
      ({ error }) => error !== null,
      () => true,
    )
    if (failed) setState('failed')
    // The same link, looked at anew by nobody who is signed in.
    else window.location.reload()
  }
  return (
    <div className="sheet grid justify-items-start gap-3 p-5 sm:p-6">
      <p>
        You are signed in as <strong className="wrap-anywhere">{mine}</strong>, and this invitation is for{' '}
        <strong className="wrap-anywhere">{invited}</strong>. Sign out to accept it with that address, or ask whoever
        sent it to invite <span className="wrap-anywhere">{mine}</span> instead.
      </p>
      {state === 'failed' ? (
        <p role="alert" className="text-odds-ink">
          You are still signed in: the server did not answer. Try again.
        </p>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button look="main" busy={state === 'busy'} onClick={() => void signOut()}>
          Sign out and go on
        </Button>
        <Link href="/home" prefetch={false} className={buttonClasses('quiet')}>
          Stay signed in
        </Link>
      </div>
    </div>
  )
}
