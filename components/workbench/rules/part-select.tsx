'use client'

import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'

type PartSelectProps = {
  label: string
  value: string | null
  options: readonly { id: string; tag: string; name?: string }[]
  disabled: boolean
  onChoose: (id: string | null) => void
}

/** One thing that a rule names: a unit, a stream, a component, a reaction. */
export function PartSelect({ label, value, options, disabled, onChoose }: PartSelectProps) {
  return (
    <Field label={label} className="min-w-32 text-xs">
      {(describing) => (
        <Select
          {...describing}
          className="h-8 text-sm"
          value={value ?? ''}
          disabled={disabled}
          onChange={(event) => onChoose(event.target.value || null)}
        >
          <option value="">Choose …</option>
          {options.map((option) => (
            <option key={option.id} value={option.id}>
              {option.tag}
              {option.name && option.name !== option.tag ? `, ${option.name}` : ''}
            </option>
          ))}
        </Select>
      )}
    </Field>
  )
}
