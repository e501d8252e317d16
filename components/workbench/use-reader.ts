import { useSyncExternalStore } from 'react'
import type { DecimalSign } from '@/lib/sheet/read-number'

const never = () => () => {}

export type DecimalChoice = DecimalSign | 'own'

/** The decimal sign that the team chose, or else of the person's own language, which the server cannot know. */
export function useDecimal(choice: DecimalChoice): DecimalSign {
  const own = useOwnDecimal()
  return choice === 'own' ? own : choice
}

const useOwnDecimal = (): DecimalSign =>
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
