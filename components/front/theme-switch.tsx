'use client'

import { Monitor, Moon, Sun } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { Menu, MenuChoice } from '@/components/ui/menu'
import { themeOptions, useThemeChoice } from '@/components/ui/theme'

const icons = { system: Monitor, light: Sun, dark: Moon }

/** Light, dark, or as the system says, from an icon. */
export function ThemeSwitch() {
  const { choice, choose } = useThemeChoice()
  const Icon = icons[(choice ?? 'system') as keyof typeof icons] ?? Monitor
  return (
    <Menu
      align="end"
      label="Light or dark"
      trigger={
        <IconButton label="Light or dark">
          <Icon className="size-4" aria-hidden="true" />
        </IconButton>
      }
    >
      <MenuChoice label="Light or dark" value={choice ?? 'system'} onValueChange={choose} options={themeOptions} />
    </Menu>
  )
}
