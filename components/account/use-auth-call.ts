'use client'

import { useState } from 'react'
import { type AuthFault, signFault } from '@/components/front/sign-words'
import type { FormProblem } from '@/components/ui/error-summary'

type Answer<T> = { data: T | null; error: AuthFault | null }

/** Calls a door of the sign-in service: busy meanwhile, a refusal as a sentence, for the whole form or one of its fields. */
export function useAuthCall() {
  const [isBusy, setBusy] = useState(false)
  const [problems, setProblems] = useState<FormProblem[]>([])

  /** `fieldOf`: the control that a refusal is about, by its code. Gives the data, or the refusal's code. */
  const call = async <T>(
    ask: () => Promise<Answer<T>>,
    fieldOf: Record<string, string> = {},
  ): Promise<{ ok: true; data: T | null } | { ok: false; code: string | undefined }> => {
    if (isBusy) return { ok: false, code: 'BUSY' }
    setBusy(true)
    setProblems([])
    const { data, error } = await ask().catch((): Answer<T> => ({ data: null, error: {} }))
    setBusy(false)
    if (!error) return { ok: true, data }
    const field = error.code ? fieldOf[error.code] : undefined
    setProblems([{ text: signFault(error), ...(field && { field }) }])
    return { ok: false, code: error.code }
  }

  const wrong = (field: string) => problems.find((problem) => problem.field === field)?.text
  return { call, isBusy, problems, setProblems, wrong }
}
