'use client'

import { ThemeProvider as Provider, useTheme } from 'next-themes'
import { type ReactNode, useSyncExternalStore } from 'react'

/** Light or dark by `data-theme` on <html>: the system's unless the person chose. */
export function ThemeProvider({ children }: { children: ReactNode }) {
  return (
    <Provider
      attribute="data-theme"
      defaultTheme="system"
      enableSystem
      disableTransitionOnChange
      storageKey="tallybrook-theme"
    >
      {children}
    </Provider>
  )
}

const never = () => () => {}

/** The chosen theme and how to choose; null until the browser has taken over, since the server cannot know it. */
export function useThemeChoice(): { choice: string | null; choose: (theme: string) => void } {
  const inBrowser = useSyncExternalStore(
    never,
    () => true,
    () => false,
  )
  const { theme, setTheme } = useTheme()
  return { choice: inBrowser ? (theme ?? 'system') : null, choose: setTheme }
}

export const themeOptions = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
]
