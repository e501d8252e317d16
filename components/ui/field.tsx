'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'
import { classNames } from './class-names'

export const controlClasses =
  'h-9 w-full rounded-control border border-edge bg-sheet px-2.5 text-ink aria-invalid:border-odds-edge aria-invalid:ring-1 aria-invalid:ring-odds-edge disabled:opacity-55'

type Describing = { id: string; 'aria-describedby': string | undefined; 'aria-invalid': true | undefined }

type FieldProps = {
  label: ReactNode
  /** Shown under the label, before the control: what is wanted, told beforehand. */
  hint?: ReactNode
  /** What is wrong, as a plain sentence. */
  error?: string | undefined
  /** Fixes the control's id, so that an error summary can link to it. */
  id?: string
  className?: string
  /** The control; give it what it is handed. */
  children: (props: Describing) => ReactNode
}

/** A label, a hint, a control and its error, tied together for assistive technology. */
export function Field({ label, hint, error, id, className, children }: FieldProps) {
  const own = useId()
  const controlId = id ?? own
  const hintId = hint ? `${controlId}-hint` : undefined
  const errorId = error ? `${controlId}-error` : undefined
  const describedBy = [hintId, errorId].filter(Boolean).join(' ') || undefined
  return (
    <div className={classNames('grid gap-1', className)}>
      <label htmlFor={controlId} className="font-semibold">
        {label}
      </label>
      {hint ? (
        <p id={hintId} className="text-sm text-ink-2">
          {hint}
        </p>
      ) : null}
      {children({ id: controlId, 'aria-describedby': describedBy, 'aria-invalid': error ? true : undefined })}
      {error ? (
        <p id={errorId} className="text-sm font-semibold text-odds-ink">
          {error}
        </p>
      ) : null}
    </div>
  )
}

export function Input({ className, ...rest }: ComponentProps<'input'>) {
  return <input className={classNames(controlClasses, className)} {...rest} />
}

export function TextArea({ className, ...rest }: ComponentProps<'textarea'>) {
  return <textarea className={classNames(controlClasses, 'h-auto min-h-20 py-2', className)} {...rest} />
}
