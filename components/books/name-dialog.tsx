'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog, DialogActions } from '@/components/ui/dialog'
import { Field, Input } from '@/components/ui/field'
import { useAction } from '@/components/ui/use-action'
import type { Result } from '@/lib/errors'

export type NameDialogProps<T> = {
  title: string
  description?: string
  label: string
  /** What the box holds at first. */
  name: string
  verb: string
  action: (name: string) => Promise<Result<T>>
  onDone: (name: string, value: T) => void
  onClose: () => void
}

/** Asks for one name: a new project, a new name, the name of a copy. Mount it to open it. */
export function NameDialog<T>(props: NameDialogProps<T>) {
  const { title, description, label, name, verb, action, onDone, onClose } = props
  const { run, isBusy, refusal } = useAction({ quiet: true })
  const [wrong, setWrong] = useState<string | undefined>()

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const typed = String(new FormData(event.currentTarget).get('name') ?? '').trim()
    setWrong(typed === '' ? 'Type a name.' : undefined)
    if (typed === '' || isBusy) return
    run(
      () => action(typed),
      (value) => {
        onClose()
        onDone(typed, value)
      },
    )
  }

  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={title} description={description} width="narrow">
      <form onSubmit={submit} noValidate>
        <Field label={label} error={wrong ?? refusal ?? undefined}>
          {(field) => (
            <Input
              {...field}
              name="name"
              defaultValue={name}
              maxLength={200}
              autoComplete="off"
              onFocus={(event) => event.currentTarget.select()}
            />
          )}
        </Field>
        <DialogActions>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" look="main" busy={isBusy}>
            {verb}
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  )
}
