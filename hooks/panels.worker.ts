/// <reference lib="webworker" />
import { PanelBook } from './panel-book'
import type { ToPanels } from './panel-questions'

declare const self: DedicatedWorkerGlobalScope

const book = new PanelBook()

self.onmessage = (event: MessageEvent<ToPanels>) => self.postMessage(book.answer(event.data))
