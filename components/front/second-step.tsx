'use client'

import { type FormEvent, useState } from 'react'
import { useAuthCall } from '@/components/account/use-auth-call'
import { Button } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { authClient } from '@/lib/auth/client'
import { signFault } from './sign-words'

type SecondStepProps = {
  onDone: () => void
  /** The password has to be typed again, for the reason given. */
  onRestart: (reason: string | null) => void
}

/** After any of these no code is taken any more. */
const over = ['TOO_MANY_ATTEMPTS_REQUEST_NEW_CODE', 'ACCOUNT_TEMPORARILY_LOCKED', 'INVALID_TWO_FACTOR_COOKIE']

/** The second step of signing in: a code from the authenticator, or one of the backup codes. */
export function SecondStep({ onDone, onRestart }: SecondStepProps) {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const [isBackup, setBackup] = useState(false)

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const code = String(new FormData(event.currentTarget).get('code') ?? '').replace(/\s/g, '')
    if (code === '') return setProblems([{ field: 'code', text: 'Type the code.' }])
    const verify = isBackup ? authClient.twoFactor.verifyBackupCode : authClient.twoFactor.verifyTotp
    const answer = await call(() => verify({ code }), { INVALID_CODE: 'code', INVALID_BACKUP_CODE: 'code' })
    if (answer.ok) onDone()
    else if (answer.code && over.includes(answer.code)) onRestart(signFault({ code: answer.code }))
  }

  return (
    <form onSubmit={submit} noValidate className="sheet grid gap-4 p-5 sm:p-6">
      <ErrorSummary problems={problems} title="You are not signed in yet" />
      <Field
        key={String(isBackup)}
        id="code"
        label={isBackup ? 'Backup code' : 'Code from your authenticator'}
        hint={
          isBackup
            ? 'One of those that you kept when you set the second step up. Each works once.'
            : 'Six digits; a new one every half minute.'
        }
        error={wrong('code')}
      >
        {(field) => (
          <Input
            {...field}
            // It takes the place of the form that had the focus.
            autoFocus
            name="code"
            inputMode={isBackup ? 'text' : 'numeric'}
            autoComplete={isBackup ? 'off' : 'one-time-code'}
            autoCapitalize="none"
            spellCheck={false}
            maxLength={40}
            className="font-mono text-md"
          />
        )}
      </Field>
      <Button type="submit" look="main" size="large" busy={isBusy}>
        {isBusy ? 'Signing in' : 'Sign in'}
      </Button>
      <p className="flex flex-wrap gap-x-5 gap-y-1">
        <button
          type="button"
          className="link"
          onClick={() => {
            setProblems([])
            setBackup(!isBackup)
          }}
        >
          {isBackup ? 'Use the authenticator' : 'Use a backup code'}
        </button>
        <button type="button" className="link" onClick={() => onRestart(null)}>
          Begin again
        </button>
      </p>
    </form>
  )
}
