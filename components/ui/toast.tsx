'use client'

import { useTheme } from 'next-themes'
import { Toaster as Primitive, toast } from 'sonner'

/** Where notices appear; once, in the root layout. */
export function Toaster() {
  const { resolvedTheme } = useTheme()
  return (
    <Primitive
      theme={resolvedTheme === 'dark' ? 'dark' : 'light'}
      position="bottom-right"
      closeButton
      duration={6000}
      toastOptions={{
        style: {
          fontFamily: 'var(--font-sans)',
          fontSize: '14px',
          background: 'var(--sheet)',
          color: 'var(--ink)',
          border: '1px solid var(--hair-2)',
          borderRadius: '12px',
          boxShadow: 'var(--shadow-high)',
        },
        actionButtonStyle: {
          background: 'var(--brook)',
          color: 'var(--brook-ink)',
          borderRadius: '6px',
          height: '28px',
          fontSize: '13px',
        },
      }}
    />
  )
}

type NoticeAction = { label: string; onClick: () => void }

/** A short notice that something was done, with a way back where there is one. */
export function notify(text: string, action?: NoticeAction): void {
  toast(text, action ? { action } : {})
}

/** A refusal or fault: stays twice as long. What must be mended in a form belongs beside its field instead. */
export function notifyProblem(text: string, action?: NoticeAction): void {
  toast.error(text, { duration: 12_000, ...(action ? { action } : {}) })
}
