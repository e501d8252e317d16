import { absenceId, type ComponentId, type StreamId } from '../ids'
import type { BookRecord } from '../kinds'
import type { BookState } from '../state'
import { counted, type Edit, edit, listed, type MakeId, refuse } from './draft'

/**
 * Says whether components can be in streams, every pair of the two lists. What is typed on a pair that becomes absent goes
 * along in the same change, and its label says so.
 */
export function setPresence(
  state: BookState,
  streams: readonly StreamId[],
  components: readonly ComponentId[],
  presence: 'present' | 'absent',
  makeId: MakeId,
): Edit {
  if (streams.some((id) => !state.stream.has(id))) return refuse('This stream is no longer in the book.')
  if (components.some((id) => !state.component.has(id))) return refuse('This component is no longer in the book.')
  const create: BookRecord[] = []
  const remove: BookRecord[] = []
  const madeAbsent = new Set<string>()
  for (const streamId of new Set(streams))
    for (const componentId of new Set(components)) {
      const id = absenceId(streamId, componentId)
      const absence = state.absence.get(id)
      if (presence === 'present' && absence) remove.push(absence)
      if (presence === 'absent' && !absence) {
        create.push({ kind: 'absence', id, streamId, componentId })
        madeAbsent.add(id)
      }
    }
  const givens =
    madeAbsent.size === 0
      ? []
      : [...state.given.values()].filter(
          ({ streamId, componentId }) => componentId !== null && madeAbsent.has(absenceId(streamId, componentId)),
        )
  const tags = (map: BookState['stream'] | BookState['component'], ids: readonly string[]): string =>
    listed(ids.map((id) => map.get(id)?.tag ?? ''))
  const where = `${tags(state.component, components)} in ${tags(state.stream, streams)}`
  const along = givens.length > 0 ? `, with ${counted(givens.length, 'given')} removed` : ''
  return edit(state, makeId, `${where}: ${presence === 'absent' ? 'cannot be present' : 'can be present'}${along}`, {
    create,
    remove: [...remove, ...givens],
  })
}
