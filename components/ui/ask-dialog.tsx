'use client'

import type { ReactNode } from 'react'
import type { Result } from '@/lib/errors'
import { Button } from './button'
import { Dialog, DialogActions } from './dialog'
import { ErrorSummary } from './error-summary'
import { useAction } from './use-action'

type AskDialogProps = {
  title: string
  /** What it does and what stays, before it is done. */
  children: ReactNode
  /** What the button that does it says. */
  verb: string
  isDanger?: boolean
  action: () => Promise<Result<unknown>>
  onDone: () => void
  onClose: () => void
}

/** A plain question before something is done; a refusal is told in it. Mount it to open it. */
export function AskDialog({ title, children, verb, isDanger, action, onDone, onClose }: AskDialogProps) {
  const { run, isBusy, refusal } = useAction({ quiet: true })
  const act = () =>
    run(action, () => {
      onClose()
      onDone()
    })
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={title} width="narrow">
      <div className="grid gap-3">
        {children}
        <ErrorSummary problems={refusal ? [{ text: refusal }] : []} title="This was not done" />
      </div>
      <DialogActions>
        <Button onClick={onClose}>Cancel</Button>
        <Button look={isDanger ? 'danger' : 'main'} busy={isBusy} onClick={act}>
          {verb}
        </Button>
      </DialogActions>
    </Dialog>
  )
}
