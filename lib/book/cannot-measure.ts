import type { Cannot } from '@/lib/balance'
import { type Edit, edit, type MakeId, refuse, updateOf } from './edits/draft'
import type { RecordOf } from './kinds'
import { type BookState, inOrder } from './state'

/** What may be wanting at a stream: its flow, or an analysis of it. */
export type Reach = 'flow' | 'analysis'

type Stream = Pick<RecordOf<'stream'>, 'cannotMeasure'>

export const isOutOfReach = ({ cannotMeasure }: Stream, reach: Reach): boolean =>
  cannotMeasure === reach || cannotMeasure === 'both'

/** The marks of a book, as the solver takes them: streams by tag. */
export function cannotOf(state: BookState): Cannot {
  const streams = inOrder(state.stream)
  const tags = (reach: Reach) => streams.filter((one) => isOutOfReach(one, reach)).map(({ tag }) => tag.trim())
  return { flows: tags('flow'), analyses: tags('analysis') }
}

/** Marks that a stream's flow cannot be measured, or that it cannot be analysed, or takes the mark away. */
export function setOutOfReach(state: BookState, streamId: string, reach: Reach, isOut: boolean, makeId: MakeId): Edit {
  const stream = state.stream.get(streamId)
  if (!stream) return refuse('This stream is no longer in the book.')
  const out = new Set((['flow', 'analysis'] as const).filter((one) => isOutOfReach(stream, one)))
  if (isOut) out.add(reach)
  else out.delete(reach)
  const [one = null] = out
  const can = isOut ? 'cannot' : 'can'
  const label = reach === 'flow' ? `Flow of ${stream.tag} ${can} be measured` : `${stream.tag} ${can} be analysed`
  return edit(state, makeId, label, { update: [updateOf(stream, { cannotMeasure: out.size > 1 ? 'both' : one })] })
}
