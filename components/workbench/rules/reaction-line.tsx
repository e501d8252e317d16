'use client'

import { Trash2 } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { renameTag, setFields } from '@/lib/book/edits/fields'
import { setCoefficient, setReactionText } from '@/lib/book/edits/reactions'
import { removeReactions } from '@/lib/book/edits/remove'
import { coefficientId, newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { reactionText } from '@/lib/book/reaction-text'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { PartSelect } from './part-select'

type ReactionLineProps = { view: BookView; desk: Desk; reaction: RecordOf<'reaction'> }

/** One reaction: where it runs, and a coefficient for each component that takes part. */
export function ReactionLine({ view, desk, reaction }: ReactionLineProps) {
  const { state, mayEdit } = view
  const problem = view.leftOut.get(reaction.id)
  const coefficient = (componentId: string) =>
    state.coefficient.get(coefficientId(reaction.id, componentId))?.value ?? 0
  const coefficients = view.components.map(({ id }) => ({ componentId: id, value: coefficient(id) }))
  return (
    <li className="grid gap-2 px-4 py-2.5">
      <div className="flex flex-wrap items-end gap-2.5">
        <CommitInput
          label="Reaction"
          className="w-20 text-xs [&_input]:h-8"
          value={reaction.tag}
          disabled={!mayEdit}
          onCommit={(text) => desk.run(renameTag(state, 'reaction', reaction.id, text, newId))}
        />
        <CommitInput
          label="Name"
          className="w-44 text-xs [&_input]:h-8"
          value={reaction.name}
          disabled={!mayEdit}
          onCommit={(text) => desk.run(setFields(state, 'reaction', reaction.id, { name: text.trim() }, newId))}
        />
        <PartSelect
          label="In unit"
          value={reaction.unitId}
          options={view.plant}
          disabled={!mayEdit}
          onChoose={(unitId) => unitId && desk.tryRun(setFields(state, 'reaction', reaction.id, { unitId }, newId))}
        />
        <CommitInput
          label="Equation"
          className="min-w-72 flex-1 text-xs [&_input]:h-8 [&_input]:font-mono"
          placeholder="2 H2 + O2 -> 2 H2O"
          value={reactionText(coefficients, view.components, (value) => plainNumber(value, view.decimal))}
          disabled={!mayEdit}
          onCommit={(text) => desk.run(setReactionText(state, reaction.id, text, newId))}
        />
        {mayEdit ? (
          <IconButton
            size="small"
            label={`Remove reaction ${reaction.tag}`}
            onClick={() => desk.tryRun(removeReactions(state, [reaction.id], newId))}
          >
            <Trash2 className="size-4" aria-hidden="true" />
          </IconButton>
        ) : null}
      </div>
      <div className="flex flex-wrap gap-2">
        {view.components.map(({ id, tag }) => (
          <CommitInput
            key={id}
            label={tag}
            className="w-16 text-xs [&_input]:h-8"
            inputMode="decimal"
            value={coefficient(id) === 0 ? '' : plainNumber(coefficient(id), view.decimal)}
            disabled={!mayEdit}
            onCommit={(text) => {
              if (text.trim() === '') return desk.run(setCoefficient(state, reaction.id, id, null, newId))
              const number = readNumber(text, view.decimal)
              if (!number.ok) return number.reason
              if (number.rest !== '') return 'A coefficient is a plain number.'
              return desk.run(setCoefficient(state, reaction.id, id, number.value, newId))
            }}
          />
        ))}
      </div>
      <p className={problem ? 'text-sm text-odds-ink' : 'text-sm text-ink-3'}>
        {problem ?? 'Negative: consumed. Positive: formed. Empty: takes no part.'}
      </p>
    </li>
  )
}
