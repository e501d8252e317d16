'use client'

import type { ComponentProps } from 'react'
import { Dialog } from './dialog'

/** A panel that rises from the lower edge at every width: the cell card on a narrow screen. */
export function Sheet(props: Omit<ComponentProps<typeof Dialog>, 'placement' | 'width'>) {
  return <Dialog {...props} placement="below" />
}
