'use client'

import { createContext, useCallback, useContext, useEffect, useState, useSyncExternalStore } from 'react'
import type { CaseId } from '@/lib/book/ids'
import type { BookState } from '@/lib/book/state'
import type { PanelKind, Question } from './panel-questions'
import { type PanelHandle, type PanelPort, PanelsClient } from './panels-client'
import type { SolverHandle } from './solver-handle'

const startWorker = (): PanelPort => new Worker(new URL('./panels.worker.ts', import.meta.url), { type: 'module' })

/** How long the states have to stand before anything more is asked, so that nothing is asked between two digits. */
const QUIET = 120

/** The second worker, kept at the book on the screen. It works only while some part of the screen calls `usePanels`. */
export function usePanelsWorker(
  state: BookState,
  caseId: CaseId,
  { solved, stale }: SolverHandle,
  start: () => PanelPort = startWorker,
  quiet: number = QUIET,
): PanelsClient {
  const [client] = useState(() => new PanelsClient(start))
  useEffect(() => {
    client.show(state, caseId)
    if (stale || !solved) return
    if (quiet === 0) return client.settle()
    const timer = setTimeout(() => client.settle(), quiet)
    return () => clearTimeout(timer)
  }, [client, state, caseId, stale, solved, quiet])
  useEffect(() => () => client.stop(), [client])
  return client
}

/** The second worker of the workbench, for the parts drawn in it. */
export const PanelsContext = createContext<PanelsClient | null>(null)

const nothing: PanelHandle = { answer: null, stale: true, trouble: null }
const deaf = () => () => {}

/**
 * The live answer to a question about the book on the screen; null as question asks nothing. Asked again by itself when
 * the book changes, for as long as the caller is drawn.
 */
export function usePanels<K extends PanelKind>(kind: K, question: Question<K> | null): PanelHandle<K> {
  const client = useContext(PanelsContext)
  const key = question === null ? null : JSON.stringify(question)
  const read = useCallback(
    () => (client && key !== null ? client.read(kind, key) : (nothing as PanelHandle<K>)),
    [client, kind, key],
  )
  useEffect(() => {
    if (client && key !== null) return client.look(kind, JSON.parse(key), key)
  }, [client, kind, key])
  return useSyncExternalStore(client?.subscribe ?? deaf, read, read)
}
