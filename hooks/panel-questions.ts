import type { CountedBoundary, Explanation, Limits, MeasureNext, Place } from '@/lib/balance'
import type { Change } from '@/lib/book/change'
import type { BookRecord } from '@/lib/book/kinds'

/** What the second worker can be asked about a book, and what it answers. Streams, units and components go by their tags. */
export type Panels = {
  /** Boundaries, workings and the step of each cell. */
  explain: { question: { allBoundaries?: boolean }; answer: Explanation }
  /** The boundary round units chosen by hand; null where one of them is not in the book. */
  boundary: { question: { units: readonly string[] }; answer: CountedBoundary | null }
  /** What to measure next, best first. */
  next: { question: Record<never, never>; answer: MeasureNext[] }
  /** The least and greatest value that one unknown cell can have. */
  limits: { question: { place: Place }; answer: Limits }
}

export type PanelKind = keyof Panels
export type Question<K extends PanelKind> = Panels[K]['question']
export type Answer<K extends PanelKind> = Panels[K]['answer']
export type Asked = { [K in PanelKind]: { kind: K; question: Question<K> } }[PanelKind]

/** To the second worker. It holds the book; each message is answered once, with its `sequence`. */
export type ToPanels = {
  sequence: number
  caseId: string
  /** null: the book is still that of the last message. */
  book: { type: 'load'; records: BookRecord[] } | { type: 'change'; body: Omit<Change, 'id' | 'label'> } | null
  asked: Asked
}

export type FromPanels =
  | { type: 'answered'; sequence: number; answer: Answer<PanelKind> }
  /** The change did not fit what the worker holds: load the whole book again. */
  | { type: 'lost'; sequence: number }
  | { type: 'failed'; sequence: number; what: string }
