'use client'

import { useState, useTransition } from 'react'
import type { AppError, Issue, Result } from '@/lib/errors'
import { notifyProblem } from './toast'

const lost: AppError = {
  code: 'unavailable',
  message: 'The server did not answer, so it is not known whether this was done. Look at the page, then try again.',
}

type Words = Record<string, string>

/** "is longer than 120 characters" of `name` -> "The name is longer than 120 characters."; a sentence stays as it is. */
export function issueSentence({ path, what }: Issue, words: Words = {}): string {
  const [first = ''] = what
  const isSentence = first !== first.toLowerCase()
  const sentence = isSentence ? what : `${words[path] ?? (path === 'name' ? 'The name' : 'This')} ${what}`
  return /[.!?]$/.test(sentence) ? sentence : `${sentence}.`
}

/** A refusal as plain sentences. `words`: what the form calls the fields, by their path. */
export function refusalSentence({ code, message, issues }: AppError, words: Words = {}): string {
  if (code !== 'badInput' || !issues || issues.length === 0) return message
  return issues.map((issue) => issueSentence(issue, words)).join(' ')
}

/** Runs a server action: busy meanwhile, a refusal as a sentence. `done` gets the value when it was not refused. */
export function useAction(options: { quiet?: boolean; words?: Words } = {}) {
  const [isBusy, startTransition] = useTransition()
  const [error, setError] = useState<AppError | null>(null)

  const run = <T>(action: () => Promise<Result<T>>, done?: (value: T) => void): void => {
    setError(null)
    startTransition(async () => {
      const result = await action().catch((): Result<T> => ({ ok: false, error: lost }))
      if (result.ok) return done?.(result.value)
      // Shown together with the end of being busy.
      startTransition(() => setError(result.error))
      if (!options.quiet) notifyProblem(refusalSentence(result.error, options.words))
    })
  }

  return { run, isBusy, error, refusal: error && refusalSentence(error, options.words) }
}
