'use client'

import { Eye, EyeOff } from 'lucide-react'
import { type ComponentProps, useState } from 'react'
import { IconButton } from '@/components/ui/button'
import { Input } from '@/components/ui/field'

/** A password box that can be read back: typing blind is the commonest reason for a refusal. */
export function PasswordInput(props: Omit<ComponentProps<'input'>, 'type'>) {
  const [isShown, setShown] = useState(false)
  const Icon = isShown ? EyeOff : Eye
  return (
    <div className="relative">
      <Input
        {...props}
        type={isShown ? 'text' : 'password'}
        className="pe-11"
        autoCapitalize="none"
        spellCheck={false}
      />
      <IconButton
        label={isShown ? 'Hide the password' : 'Show the password'}
        size="small"
        className="absolute end-1 top-1"
        onClick={() => setShown(!isShown)}
      >
        <Icon className="size-4" aria-hidden="true" />
      </IconButton>
    </div>
  )
}
