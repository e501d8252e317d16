'use client'

import { useRouter } from 'next/navigation'
import type { FormEvent } from 'react'
import { newPasswordProblem } from '@/components/front/sign-words'
import { Button } from '@/components/ui/button'
import { ErrorSummary, type FormProblem } from '@/components/ui/error-summary'
import { notify } from '@/components/ui/toast'
import { authClient } from '@/lib/auth/client'
import { AccountPart } from './account-part'
import { NewPasswordField } from './new-password-field'
import { PresentPasswordField } from './present-password-field'
import { useAuthCall } from './use-auth-call'

/** Changes the password, which signs one out everywhere else. */
export function PasswordForm({ email }: { email: string }) {
  const router = useRouter()
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()

  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const form = event.currentTarget
    const data = new FormData(form)
    const currentPassword = String(data.get('present-password') ?? '')
    const newPassword = String(data.get('new-password') ?? '')
    const found: FormProblem[] = []
    const weak = newPasswordProblem(newPassword)
    if (currentPassword === '') found.push({ field: 'present-password', text: 'Type your present password.' })
    if (weak) found.push({ field: 'new-password', text: weak })
    setProblems(found)
    if (found.length > 0) return
    const fields = {
      INVALID_PASSWORD: 'present-password',
      PASSWORD_TOO_SHORT: 'new-password',
      PASSWORD_TOO_LONG: 'new-password',
    }
    const change = { currentPassword, newPassword, revokeOtherSessions: true }
    const answer = await call(() => authClient.changePassword(change), fields)
    if (!answer.ok) return
    form.reset()
    notify('Your password is changed. You are signed out everywhere else.')
    router.refresh()
  }

  return (
    <AccountPart title="Password" intro="Changing it signs you out everywhere but here, and is told to you by mail.">
      <form onSubmit={submit} noValidate className="grid gap-4">
        <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Nothing was changed'} />
        {/* For password managers: whose password this is. */}
        <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
        <PresentPasswordField id="present-password" label="Present password" error={wrong('present-password')} />
        <NewPasswordField id="new-password" label="New password" error={wrong('new-password')} />
        <Button type="submit" busy={isBusy} className="justify-self-start">
          Change the password
        </Button>
      </form>
    </AccountPart>
  )
}
