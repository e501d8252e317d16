'use client'

import { type ComponentProps, useState } from 'react'
import { Field, Input, TextArea } from '@/components/ui/field'

type CommitInputProps = {
  label: string
  value: string
  hint?: string
  lines?: boolean
  disabled?: boolean
  placeholder?: string
  className?: string
  inputMode?: ComponentProps<'input'>['inputMode']
  /** For a field that a press on a button has just opened. */
  autoFocus?: boolean
  /** Takes what was typed; a sentence when it cannot be taken, and then it stays in the field. */
  onCommit: (text: string) => string | null
}

/** A field that is taken on Enter or when it is left; Esc brings the kept value back. */
export function CommitInput({ label, value, hint, lines, onCommit, className, ...rest }: CommitInputProps) {
  const [draft, setDraft] = useState<string | null>(null)
  const [reason, setReason] = useState<string | null>(null)
  const commit = () => {
    if (draft === null) return
    const refused = draft === value ? null : onCommit(draft)
    setReason(refused)
    if (!refused) setDraft(null)
  }
  return (
    <Field label={label} hint={hint} error={reason ?? undefined} className={className}>
      {(describing) => {
        const shared = {
          ...rest,
          ...describing,
          value: draft ?? value,
          onBlur: commit,
          onChange: (event: { target: { value: string } }) => setDraft(event.target.value),
          onKeyDown: (event: React.KeyboardEvent) => {
            if (event.nativeEvent.isComposing) return
            if (event.key === 'Enter' && !(lines && event.shiftKey)) {
              event.preventDefault()
              commit()
            }
            if (event.key === 'Escape' && draft !== null) {
              event.stopPropagation()
              setDraft(null)
              setReason(null)
            }
          },
        }
        return lines ? <TextArea rows={2} className="min-h-14" {...shared} /> : <Input {...shared} />
      }}
    </Field>
  )
}
