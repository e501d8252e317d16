'use client'

import { useState } from 'react'
import { When } from '@/components/books/when'
import { Button } from '@/components/ui/button'
import { Tag } from '@/components/ui/tag'
import { notify } from '@/components/ui/toast'
import { useAction } from '@/components/ui/use-action'
import { AccountPart } from './account-part'
import { browserWords } from './browser-words'
import type { AccountActions, SessionRow } from './types'

type SessionsListProps = {
  sessions: readonly SessionRow[]
  actions: Pick<AccountActions, 'endSession' | 'endOtherSessions'>
}

/** Where one is signed in, with a way to end what one does not know. */
export function SessionsList({ sessions, actions }: SessionsListProps) {
  const { run, isBusy } = useAction()
  const [ending, setEnding] = useState<string | null>(null)
  const others = sessions.filter(({ isThis }) => !isThis)

  const end = ({ id, userAgent }: SessionRow) => {
    setEnding(id)
    run(
      () => actions.endSession({ session: id }).finally(() => setEnding(null)),
      () => notify(`${browserWords(userAgent)} is signed out.`),
    )
  }
  const endOthers = () => {
    setEnding('others')
    run(
      () => actions.endOtherSessions().finally(() => setEnding(null)),
      ({ ended }) => notify(ended === 1 ? 'One other place is signed out.' : `${ended} other places are signed out.`),
    )
  }

  return (
    <AccountPart
      title="Where you are signed in"
      intro="A place that you do not know? Sign it out, then change your password."
    >
      <ul aria-label="Places where you are signed in" className="border-t border-hair">
        {sessions.map((session) => (
          <li key={session.id} className="flex flex-wrap items-center gap-x-4 gap-y-1.5 border-b border-hair py-2.5">
            <div className="min-w-0 flex-1 basis-60">
              <p className="flex flex-wrap items-center gap-2 font-semibold">
                {browserWords(session.userAgent)}
                {session.isThis ? <Tag tone="brook">This one</Tag> : null}
              </p>
              <p className="text-sm text-ink-2">
                Signed in <When at={session.signedInAt} />, last seen <When at={session.seenAt} />
                {session.ipAddress ? `, from ${session.ipAddress}` : ''}
              </p>
            </div>
            {session.isThis ? null : (
              <Button size="small" busy={isBusy && ending === session.id} onClick={() => end(session)}>
                Sign out there
              </Button>
            )}
          </li>
        ))}
      </ul>
      {others.length > 0 ? (
        <Button look="danger" className="justify-self-start" busy={isBusy && ending === 'others'} onClick={endOthers}>
          Sign out everywhere else
        </Button>
      ) : null}
    </AccountPart>
  )
}
