import { useSyncExternalStore } from 'react'
import type { DecimalSign } from '@/lib/sheet/read-number'

const never = () => () => {}

/** The decimal sign of the person's own language; the server, which cannot know it, writes a point. */
export const useDecimal = (): DecimalSign =>
  useSyncExternalStore(
    never,
    () => (new Intl.NumberFormat(navigator.language).format(0.5).includes(',') ? 'comma' : 'point'),
    () => 'point',
  )

/** True on a narrow screen, where the cell card is a sheet from below. */
export const useNarrow = (): boolean =>
  useSyncExternalStore(
    (changed) => {
      const query = window.matchMedia('(max-width: 899px)')
      query.addEventListener('change', changed)
      return () => query.removeEventListener('change', changed)
    },
    () => window.matchMedia('(max-width: 899px)').matches,
    () => false,
  )
