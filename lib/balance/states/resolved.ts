import type { Pending } from '../pending/pending'
import type { TurnedRow } from '../pending/turned-row'
import type { Knowledge } from './knowledge'
import type { Blur } from './random-change'

/** Rows that were added in one round, with the knowledge that they rest on. */
export type Round = { knowledge: Knowledge; firstRow: number }

export type Resolved = {
  knowledge: Knowledge
  /** Rules that could not be turned into rows. */
  left: Pending[]
  /** Earlier rounds, for tracing what an added row rests on. */
  rounds: Round[]
  /** Store row -> forms that an added row rests on. */
  restsOn: Map<number, TurnedRow['restsOn']>
  /** How blurred each added row is by what it rests on. */
  blur: Blur
}
