'use client'

import { useEffect, useState, useSyncExternalStore } from 'react'
import type { CaseId } from '@/lib/book/ids'
import type { BookState } from '@/lib/book/state'
import { SolverClient } from './solver-client'
import type { SolverHandle } from './solver-handle'

const startWorker = () => new Worker(new URL('./solver.worker.ts', import.meta.url), { type: 'module' })

/** The live answer for one operating case: the newest state wins, the last answer stays while a newer is on its way. */
export function useSolver(state: BookState, caseId: CaseId): SolverHandle {
  const [client] = useState(() => new SolverClient(startWorker))
  const handle = useSyncExternalStore(client.subscribe, client.getSnapshot, client.getSnapshot)
  useEffect(() => client.ask(state, caseId), [client, state, caseId])
  useEffect(() => () => client.stop(), [client])
  return handle
}
