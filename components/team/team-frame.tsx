import type { ReactNode } from 'react'
import type { PersonMenuProps } from './person-menu'
import { Rail } from './rail'

/** Rail and page. A page that fills the screen takes the height `--page-height`, which leaves out the bar of a narrow screen. */
export function TeamFrame({ children, ...rail }: PersonMenuProps & { children: ReactNode }) {
  return (
    <div className="flex min-h-dvh flex-col sm:flex-row">
      <Rail {...rail} />
      <div className="min-w-0 flex-1">{children}</div>
    </div>
  )
}
