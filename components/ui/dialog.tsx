'use client'

import { X } from 'lucide-react'
import { Dialog as Primitive } from 'radix-ui'
import type { ReactNode } from 'react'
import { IconButton } from './button'
import { classNames } from './class-names'

type DialogProps = {
  open: boolean
  onOpenChange: (open: boolean) => void
  title: ReactNode
  /** One sentence under the title; the dialog is described by it. */
  description?: ReactNode
  /** `below`: a sheet that rises from the lower edge, for narrow screens. */
  placement?: 'middle' | 'below'
  width?: 'narrow' | 'normal' | 'wide'
  children: ReactNode
}

const widths = { narrow: 'sm:max-w-md', normal: 'sm:max-w-xl', wide: 'sm:max-w-3xl' }

/** A modal dialog. On a narrow screen it always stands at the lower edge, within reach of a thumb. */
export function Dialog({
  open,
  onOpenChange,
  title,
  description,
  placement = 'middle',
  width = 'normal',
  children,
}: DialogProps) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <Primitive.Overlay className="fixed inset-0 z-40 bg-veil" />
        <Primitive.Content
          {...(description ? {} : { 'aria-describedby': undefined })}
          className={classNames(
            'fixed inset-x-0 bottom-0 z-50 flex max-h-[88dvh] flex-col overflow-hidden rounded-t-sheet border border-hair bg-sheet shadow-lifted focus:outline-none',
            placement === 'middle' &&
              'sm:inset-auto sm:top-1/2 sm:left-1/2 sm:w-[calc(100vw-3rem)] sm:-translate-x-1/2 sm:-translate-y-1/2 sm:rounded-sheet',
            placement === 'middle' && widths[width],
          )}
        >
          <header className="flex items-start gap-3 border-b border-hair px-5 pt-4 pb-3">
            <div className="min-w-0 flex-1">
              <Primitive.Title className="text-lg">{title}</Primitive.Title>
              {description ? (
                <Primitive.Description className="mt-0.5 text-ink-2">{description}</Primitive.Description>
              ) : null}
            </div>
            <Primitive.Close asChild>
              <IconButton label="Close" size="small" className="-me-1.5">
                <X className="size-4" aria-hidden="true" />
              </IconButton>
            </Primitive.Close>
          </header>
          <div className="overflow-y-auto px-5 pt-4 pb-5">{children}</div>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  )
}

/** The row of buttons that ends a dialog: what it does last, where the eye and the Tab key arrive last. */
export function DialogActions({ children }: { children: ReactNode }) {
  return (
    <div className="sticky -bottom-5 -mx-5 mt-5 -mb-5 flex flex-wrap justify-end gap-2 border-t border-hair bg-sheet px-5 pt-3 pb-4">
      {children}
    </div>
  )
}
