import { ChevronDown } from 'lucide-react'
import type { ComponentProps } from 'react'
import { classNames } from './class-names'
import { controlClasses } from './field'

type SelectProps = ComponentProps<'select'> & { wrapperClassName?: string }

/** The browser's own list of choices: keyboard, touch and screen readers know it already. */
export function Select({ className, wrapperClassName, children, ...rest }: SelectProps) {
  return (
    <span className={classNames('relative inline-grid w-full', wrapperClassName)}>
      <select className={classNames(controlClasses, 'appearance-none pe-8', className)} {...rest}>
        {children}
      </select>
      <ChevronDown
        className="pointer-events-none absolute end-2.5 top-1/2 size-4 -translate-y-1/2 text-ink-2"
        aria-hidden="true"
      />
    </span>
  )
}
