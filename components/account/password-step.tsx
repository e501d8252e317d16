'use client'

import type { FormEvent } from 'react'
import { Button } from '@/components/ui/button'
import { ErrorSummary } from '@/components/ui/error-summary'
import { PresentPasswordField } from './present-password-field'
import { useAuthCall } from './use-auth-call'

type Answer<T> = Awaited<ReturnType<Parameters<ReturnType<typeof useAuthCall>['call']>[0]>> & { data: T | null }
type PasswordStepProps<T> = {
  text: string
  verb: string
  isDanger?: boolean
  ask: (password: string) => Promise<Answer<T>>
  onDone: (data: T | null) => void
  onCancel: () => void
}

/** Asks for the password before something about the second step is done. */
export function PasswordStep<T>({ text, verb, isDanger, ask, onDone, onCancel }: PasswordStepProps<T>) {
  const { call, isBusy, problems, setProblems, wrong } = useAuthCall()
  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const password = String(new FormData(event.currentTarget).get('factor-password') ?? '')
    if (password === '') return setProblems([{ field: 'factor-password', text: 'Type your password.' }])
    const answer = await call(() => ask(password), { INVALID_PASSWORD: 'factor-password' })
    if (answer.ok) onDone(answer.data)
  }
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <p>{text}</p>
      <ErrorSummary problems={problems} title={problems.some((p) => p.field) ? undefined : 'Nothing was changed'} />
      <PresentPasswordField id="factor-password" error={wrong('factor-password')} />
      <div className="flex flex-wrap gap-2">
        <Button type="submit" look={isDanger ? 'danger' : 'main'} busy={isBusy}>
          {verb}
        </Button>
        <Button look="quiet" onClick={onCancel}>
          Cancel
        </Button>
      </div>
    </form>
  )
}
