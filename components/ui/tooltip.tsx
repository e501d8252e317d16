'use client'

import { Tooltip as Primitive } from 'radix-ui'
import type { ReactNode } from 'react'

type TooltipProps = { text: ReactNode; children: ReactNode; side?: 'top' | 'right' | 'bottom' | 'left' }

/** A hint beside what has the pointer or the focus. It repeats or explains; nothing may depend on it alone. */
export function Tooltip({ text, children, side = 'top' }: TooltipProps) {
  return (
    <Primitive.Provider delayDuration={350}>
      <Primitive.Root>
        <Primitive.Trigger asChild>{children}</Primitive.Trigger>
        <Primitive.Portal>
          <Primitive.Content
            side={side}
            sideOffset={6}
            collisionPadding={8}
            className="z-50 max-w-72 rounded-control bg-ink px-2.5 py-1.5 text-sm text-paper shadow-sheet"
          >
            {text}
          </Primitive.Content>
        </Primitive.Portal>
      </Primitive.Root>
    </Primitive.Provider>
  )
}
