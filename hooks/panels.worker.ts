/// <reference lib="webworker" />
import loadHighs from 'highs'
import { type SolveLp, solveLpBy } from '@/lib/balance'
import { PanelBook } from './panel-book'
import type { FromPanels, ToPanels } from './panel-questions'

declare const self: DedicatedWorkerGlobalScope

const book = new PanelBook()

/** HiGHS is 3 MB: loaded from the application itself when limits are first asked for. */
let highs: Promise<SolveLp> | undefined
async function loadLp(): Promise<SolveLp> {
  // The bundler puts the file among the application's own and may give its path alone.
  const wasm = new URL(new URL('highs/runtime', import.meta.url).href, self.location.origin).href
  return solveLpBy(await loadHighs({ locateFile: () => wasm }))
}

self.onmessage = async ({ data }: MessageEvent<ToPanels>) => {
  const say = (message: FromPanels) => self.postMessage(message)
  if (data.asked.kind !== 'limits') return say(book.answer(data))
  highs ??= loadLp()
  const solveLp = await highs.catch(() => undefined)
  // What could not be fetched may be there the next time.
  if (!solveLp) highs = undefined
  say(book.answer(data, solveLp))
}
