'use client'

import Link from 'next/link'
import { useState } from 'react'
import { Button, buttonClasses } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { NewTeamDialog, type TeamActions } from './new-team-dialog'

/** For somebody with an account who is in no team: let go, or gone from the last one. */
export function NoTeam({ createTeam }: { createTeam: TeamActions['createTeam'] }) {
  const [isMaking, setMaking] = useState(false)
  return (
    <EmptyState
      level={1}
      title="You are in no team just now"
      actions={
        <>
          <Button look="main" onClick={() => setMaking(true)}>
            New team
          </Button>
          <Link href="/account" prefetch={false} className={buttonClasses()}>
            Your account
          </Link>
        </>
      }
    >
      <p>
        Your account is fine, but no team counts you as a member. Ask the owner of your team to let you in again, or
        make a team of your own.
      </p>
      {isMaking ? <NewTeamDialog createTeam={createTeam} onClose={() => setMaking(false)} /> : null}
    </EmptyState>
  )
}
