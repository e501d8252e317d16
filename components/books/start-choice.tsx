import { starters } from './starters'
import type { StarterId } from './types'

type Start = 'blank' | StarterId
type StartChoiceProps = { value: Start; onChange: (start: Start) => void }

/** Blank, or one of the invented plants to look at and to change. */
export function StartChoice({ value, onChange }: StartChoiceProps) {
  const options = [{ id: 'blank' as const, name: 'Blank', text: 'Nothing in it; type or paste your own.' }, ...starters]
  return (
    <fieldset>
      <legend className="mb-1 font-semibold">Start from</legend>
      <div className="overflow-hidden rounded-control border border-hair-2">
        {options.map(({ id, name, text }) => (
          <label
            key={id}
            className="flex cursor-pointer gap-3 border-b border-hair px-3 py-2 last:border-b-0 has-checked:bg-brook-wash has-focus-visible:outline-2 has-focus-visible:-outline-offset-2 has-focus-visible:outline-focus"
          >
            <input
              type="radio"
              name="start"
              value={id}
              checked={value === id}
              onChange={() => onChange(id)}
              className="mt-1 accent-brook outline-none"
            />
            <span>
              <span className="font-semibold">{name}</span>
              {id === 'blank' ? null : <span className="text-xs text-ink-3"> invented plant</span>}
              <span className="block text-sm text-ink-2">{text}</span>
            </span>
          </label>
        ))}
      </div>
    </fieldset>
  )
}
