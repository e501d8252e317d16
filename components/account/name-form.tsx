'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Field, Input } from '@/components/ui/field'
import { notify } from '@/components/ui/toast'
import { useAction } from '@/components/ui/use-action'
import { nameProblem } from '@/lib/auth/person-name'
import { AccountPart } from './account-part'
import type { AccountActions } from './types'

type NameFormProps = { name: string; changeName: AccountActions['changeName'] }

export function NameForm({ name, changeName }: NameFormProps) {
  const { run, isBusy, refusal } = useAction({ quiet: true })
  const [wrong, setWrong] = useState<string | undefined>()

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const typed = String(new FormData(event.currentTarget).get('name') ?? '').trim()
    const problem = nameProblem(typed)
    setWrong(problem)
    if (problem || isBusy) return
    run(
      () => changeName({ name: typed }),
      (kept) => notify(`Your name is ${kept.name} now.`),
    )
  }

  return (
    <AccountPart title="Name">
      <form onSubmit={submit} noValidate className="grid gap-3 sm:grid-cols-[1fr_auto] sm:items-end">
        <Field
          label="Your name"
          hint="It stands beside your changes, also those of before, and on tables."
          error={wrong ?? refusal ?? undefined}
        >
          {(field) => <Input {...field} name="name" autoComplete="name" defaultValue={name} />}
        </Field>
        <Button type="submit" busy={isBusy} className="justify-self-start">
          Change the name
        </Button>
      </form>
    </AccountPart>
  )
}
