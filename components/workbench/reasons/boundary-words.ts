import { type CountedBoundary, overlapSentences } from '@/lib/balance'

/** "follows" speaks of this boundary alone, with what was typed. */
export const statusWords: Record<CountedBoundary['status'], string> = {
  done: 'nothing is unknown',
  ready: 'all of it follows',
  partly: 'some of it follows',
  short: 'nothing follows yet',
}

/** What a boundary is called: its one unit, the whole process, or its units. */
export function boundaryTitle({ units }: Pick<CountedBoundary, 'units'>, nUnits: number): string {
  if (units.length === nUnits && nUnits > 1) return 'Whole process'
  return units.join(', ')
}

/** How many further values it needs beyond its independent equations. */
export const shortBy = ({ unknowns, independent }: CountedBoundary): number => Math.max(0, unknowns - independent)

/** Why count and rank differ, where they do; and that a clash is here. */
export function boundarySentences(boundary: CountedBoundary): string[] {
  const { unknowns, balances, sums, rules, independent, over, status } = boundary
  const sentences = overlapSentences(boundary.overlaps)
  const equations = balances + sums + rules
  if (equations !== independent && sentences.length === 0)
    sentences.push(`Of its ${equations} equations ${independent} are independent.`)
  if (status === 'partly' && unknowns > independent)
    sentences.push('It is short as a whole, but what follows hangs on the equations alone that hold it.')
  if (over) sentences.push('Its values clash: see At odds.')
  return sentences
}
