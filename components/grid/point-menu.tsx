'use client'

import { DropdownMenu as Primitive } from 'radix-ui'
import type { ReactNode } from 'react'

type PointMenuProps = {
  /** A point of the window; null: shut. */
  at: { x: number; y: number } | null
  label: string
  onShut: () => void
  children: ReactNode
}

/** A menu that opens at a point: the pointer, or the cell that had the keyboard. */
export function PointMenu({ at, label, onShut, children }: PointMenuProps) {
  return (
    <Primitive.Root open={at !== null} onOpenChange={(open) => open || onShut()} modal={false}>
      <Primitive.Trigger asChild>
        <span
          aria-hidden="true"
          className="pointer-events-none fixed size-0"
          style={{ left: at?.x ?? 0, top: at?.y ?? 0 }}
        />
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          align="start"
          sideOffset={4}
          collisionPadding={8}
          aria-label={label}
          onCloseAutoFocus={(event) => event.preventDefault()}
          className="z-50 max-h-(--radix-dropdown-menu-content-available-height) min-w-52 overflow-y-auto rounded-sheet border border-hair bg-sheet p-1.5 shadow-lifted"
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  )
}
