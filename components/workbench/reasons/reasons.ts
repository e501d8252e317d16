import type { MarkedBoundary } from './explained'
import type { ExplainedHandle } from './use-explained'

/** What the panels and the card know of why, and what they may point at. */
export type Reasons = {
  handle: ExplainedHandle
  marked: MarkedBoundary | null
  onMark: (boundary: MarkedBoundary | null) => void
  /** The step that is walked to; null: nobody walks. */
  at: number | null
  onWalk: (step: number | null) => void
  /** Opens the workings at a step. */
  openStep: (step: number) => void
}
