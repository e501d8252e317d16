'use client'

import type { FormEvent } from 'react'
import { Button } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { Field, Input } from '@/components/ui/field'
import { authClient } from '@/lib/auth/client'
import { QrCode } from './qr-code'
import { useAuthCall } from './use-auth-call'

type ScanStepProps = { uri: string; onDone: () => void; onCancel: () => void }

/** "ABCD EFGH …", to be typed by hand. */
const inGroups = (secret: string) => secret.replace(/(.{4})(?=.)/g, '$1 ')

/** Shows the secret to an authenticator, and asks for a first code: only then is the second step asked for. */
export function ScanStep({ uri, onDone, onCancel }: ScanStepProps) {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const secret = new URL(uri).searchParams.get('secret') ?? ''

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const code = String(new FormData(event.currentTarget).get('first-code') ?? '').replace(/\s/g, '')
    if (!/^\d{6}$/.test(code)) return setProblems([{ field: 'first-code', text: 'Type the six digits.' }])
    const answer = await call(() => authClient.twoFactor.verifyTotp({ code }), { INVALID_CODE: 'first-code' })
    if (answer.ok) onDone()
  }

  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <div className="flex flex-wrap gap-5">
        <QrCode text={uri} label="QR code for your authenticator; the same key stands beside it as text" />
        <div className="grid min-w-0 flex-1 basis-56 content-start gap-2">
          <p>Let your authenticator scan this, or type the key into it by hand:</p>
          <p className="rounded-control border border-hair-2 bg-paper px-3 py-2 font-mono wrap-anywhere select-all">
            {inGroups(secret)}
          </p>
          <p className="text-sm text-ink-2">Six digits, a new code every 30 seconds. Do not show it to anybody.</p>
        </div>
      </div>
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Not turned on yet'} />
      <Field id="first-code" label="The code that it shows now" error={wrong('first-code')}>
        {(field) => (
          <Input
            {...field}
            name="first-code"
            inputMode="numeric"
            autoComplete="one-time-code"
            maxLength={10}
            className="max-w-40 font-mono text-md"
          />
        )}
      </Field>
      <div className="flex flex-wrap gap-2">
        <Button type="submit" look="main" busy={isBusy}>
          Turn it on
        </Button>
        <Button look="quiet" onClick={onCancel}>
          Cancel
        </Button>
      </div>
    </form>
  )
}
