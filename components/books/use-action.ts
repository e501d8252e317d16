'use client'

import { useState, useTransition } from 'react'
import { notifyProblem } from '@/components/ui/toast'
import type { AppError, Result } from '@/lib/errors'

const lost = 'The server did not answer, so it is not known whether this was done. Look at the list, then try again.'

/** A refused name says what is wrong with it ("The name is longer than 120 characters."); all else is a sentence already. */
function sentenceOf({ message, issues }: AppError): string {
  const issue = issues?.find(({ path }) => path === 'name')
  return issue ? `The name ${issue.what}.` : message
}

/** Runs a server action: busy meanwhile, a refusal as a sentence. `run` gives the value, or null when it was refused. */
export function useAction(options: { quiet?: boolean } = {}) {
  const [isBusy, startTransition] = useTransition()
  const [refusal, setRefusal] = useState<string | null>(null)

  const run = <T>(action: () => Promise<Result<T>>, done?: (value: T) => void): void => {
    setRefusal(null)
    startTransition(async () => {
      let message: string
      try {
        const result = await action()
        if (result.ok) return done?.(result.value)
        message = sentenceOf(result.error)
      } catch {
        message = lost
      }
      setRefusal(message)
      if (!options.quiet) notifyProblem(message)
    })
  }

  return { run, isBusy, refusal }
}
