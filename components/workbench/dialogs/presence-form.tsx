'use client'

import { setPresence } from '@/lib/book/edits/presence'
import { absenceId, newId } from '@/lib/book/ids'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'

type PresenceFormProps = { view: BookView; desk: Desk; streamId: string | null }

/** A tick for each component in each stream; for one stream, a plain list. */
export function PresenceForm({ view, desk, streamId }: PresenceFormProps) {
  const { state, components } = view
  const streams = streamId === null ? view.streams : view.streams.filter(({ id }) => id === streamId)
  const isPresent = (stream: string, component: string) => !state.absence.has(absenceId(stream, component))
  const set = (stream: string, list: string[], present: boolean) =>
    desk.tryRun(setPresence(state, [stream], list, present ? 'present' : 'absent', newId))
  if (components.length === 0) return <p>There are no components yet.</p>
  return (
    <div className="max-h-[60dvh] overflow-auto">
      <table className="border-separate border-spacing-0 text-sm">
        <thead className="sticky top-0 z-10 bg-sheet">
          <tr>
            <th scope="col" className="sticky start-0 bg-sheet pe-4 text-start font-semibold">
              Stream
            </th>
            {components.map(({ id, tag, name }) => (
              <th key={id} scope="col" title={name} className="px-2 pb-1 font-semibold">
                {tag}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {streams.map((stream) => (
            <tr key={stream.id}>
              <th scope="row" className="sticky start-0 bg-sheet py-1 pe-4 text-start font-normal whitespace-nowrap">
                <strong className="font-heading font-semibold">{stream.tag}</strong>{' '}
                <span className="text-ink-2">{stream.name}</span>
              </th>
              {components.map((component) => (
                <td key={component.id} className="px-2 text-center">
                  <input
                    type="checkbox"
                    className="size-4 accent-(--brook)"
                    disabled={!view.mayEdit}
                    aria-label={`${component.tag} can be in ${stream.tag}`}
                    checked={isPresent(stream.id, component.id)}
                    onChange={(event) => set(stream.id, [component.id], event.target.checked)}
                  />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
