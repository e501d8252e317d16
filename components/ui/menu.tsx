'use client'

import { Check } from 'lucide-react'
import { DropdownMenu as Primitive } from 'radix-ui'
import type { ComponentProps, ReactNode } from 'react'
import { classNames } from './class-names'

const itemClasses =
  'flex min-h-8 items-center gap-2.5 rounded-md px-2.5 py-1.5 text-base text-ink outline-none select-none data-disabled:text-ink-3 data-highlighted:bg-brook-wash'

type MenuProps = {
  /** The button that opens it; it must take a ref and props (Button and IconButton do). */
  trigger: ReactNode
  children: ReactNode
  align?: 'start' | 'center' | 'end'
  side?: 'top' | 'right' | 'bottom' | 'left'
  label?: string
  /** Where the focus goes when the menu shuts; prevent the event's default to keep it where an action put it. */
  onCloseAutoFocus?: (event: Event) => void
}

/** A menu of actions: arrows, Home, End, first letters, Esc. */
export function Menu({ trigger, children, align = 'start', side = 'bottom', label, onCloseAutoFocus }: MenuProps) {
  return (
    <Primitive.Root modal={false}>
      <Primitive.Trigger asChild>{trigger}</Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          align={align}
          side={side}
          sideOffset={6}
          collisionPadding={8}
          aria-label={label}
          {...(onCloseAutoFocus ? { onCloseAutoFocus } : {})}
          className="z-50 max-h-(--radix-dropdown-menu-content-available-height) min-w-48 overflow-y-auto rounded-sheet border border-hair bg-sheet p-1.5 shadow-lifted"
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  )
}

type MenuItemProps = ComponentProps<typeof Primitive.Item> & { icon?: ReactNode; danger?: boolean; keys?: string }

export function MenuItem({ icon, danger, keys, className, children, asChild, ...rest }: MenuItemProps) {
  if (asChild)
    return (
      <Primitive.Item asChild className={classNames(itemClasses, className)} {...rest}>
        {children}
      </Primitive.Item>
    )
  return (
    <Primitive.Item className={classNames(itemClasses, danger && 'text-odds-ink', className)} {...rest}>
      {icon ? (
        <span className="text-ink-2 [&>svg]:size-4" aria-hidden="true">
          {icon}
        </span>
      ) : null}
      <span className="flex-1">{children}</span>
      {keys ? <kbd className="font-mono text-2xs text-ink-3">{keys}</kbd> : null}
    </Primitive.Item>
  )
}

export function MenuLabel({ children }: { children: ReactNode }) {
  return <Primitive.Label className="px-2.5 pt-2 pb-1 text-xs text-ink-3">{children}</Primitive.Label>
}

export function MenuRule() {
  return <Primitive.Separator className="mx-1 my-1.5 h-px bg-hair" />
}

type MenuChoiceProps = {
  value: string
  onValueChange: (value: string) => void
  options: { value: string; label: ReactNode; icon?: ReactNode }[]
  label: string
  /** Keep the menu open after choosing, where the choice is seen at once. */
  stay?: boolean
}

/** One of several inside a menu, the chosen one ticked. */
export function MenuChoice({ value, onValueChange, options, label, stay }: MenuChoiceProps) {
  return (
    <Primitive.RadioGroup value={value} onValueChange={onValueChange} aria-label={label}>
      {options.map((option) => (
        <Primitive.RadioItem
          key={option.value}
          value={option.value}
          className={itemClasses}
          onSelect={stay ? (event) => event.preventDefault() : undefined}
        >
          {option.icon ? (
            <span className="text-ink-2 [&>svg]:size-4" aria-hidden="true">
              {option.icon}
            </span>
          ) : null}
          <span className="flex-1">{option.label}</span>
          <Primitive.ItemIndicator>
            <Check className="size-4 text-brook" aria-hidden="true" />
          </Primitive.ItemIndicator>
        </Primitive.RadioItem>
      ))}
    </Primitive.RadioGroup>
  )
}
