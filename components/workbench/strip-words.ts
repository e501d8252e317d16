import type { MeasureNext } from '@/lib/balance'
import { CellFlag } from '@/lib/balance/solution'
import { counted, listed } from '@/lib/book/edits/draft'
import type { BookView } from './book-view'
import { placeWords, sentence } from './words'

export type StripWords = { lead: string; rest: string; trouble: boolean }

const verb = (count: number, one: string, many: string): string => (count === 1 ? one : many)

/**
 * How far the table is and what closes it, in a sentence or two. `next` is what to measure next, best first; null while
 * it is not known: then nothing is claimed.
 */
export function stripWords(view: BookView, next: readonly MeasureNext[] | null): StripWords {
  const { solved, streams, components } = view
  const say = (lead: string, rest = '', trouble = false): StripWords => ({ lead, rest, trouble })
  if (streams.length === 0 || components.length === 0) {
    const wanted = [streams.length === 0 && 'streams', components.length === 0 && 'components'].filter(Boolean)
    return say(`Start by adding ${wanted.join(' and ')}:`, 'type them, or paste a list with one on each line.')
  }
  if (!solved) return say('Working out what follows …')
  const { summary, status, conflicts, flags, roots } = solved.solution
  const { given, solvable, unknown, freeScale } = summary
  if (status === 'gaveUp') return say('The solver gave up on this table.', 'See the notes for the reason.', true)
  if (status === 'atOdds' || summary.atOdds > 0) {
    const [clash] = conflicts
    const members = clash
      ? [...clash.givens.map((place) => placeWords(view, place)), ...clash.relations.map(({ id }) => `rule ${id}`)]
      : []
    const which = members.length > 0 ? `${listed(members, 6)} cannot all hold.` : 'Some givens cannot all hold.'
    return say(sentence(which), 'Correct one, withdraw it, or keep it as a check only.', true)
  }
  const solutions = Math.max(0, ...(roots?.cells ?? []).map(({ values }) => values.length))
  const several =
    solutions > 1
      ? ` ${solutions} solutions fit what is given: a cell that differs between them lists its values on its card.`
      : ''
  const follow = `${counted(solvable, 'cell')} ${verb(solvable, 'follows', 'follow')}`
  const from = `from ${given} given.`
  const negative = flags.reduce((sum, bits) => sum + (bits & CellFlag.negative ? 1 : 0), 0)
  const doubt =
    negative > 0
      ? ` ${counted(negative, 'result')} ${verb(negative, 'is', 'are')} negative: a given or a connection is wrong.`
      : ''
  if (unknown === 0) return say(follow, `${from} Nothing is still unknown: the table closes.${doubt}`, negative > 0)
  const rest = `${from} ${unknown} ${verb(unknown, 'is', 'are')} still unknown${closing(next)}.`
  const [block] = freeScale
  const scale = block
    ? ` No flow is typed among ${listed(block, 4)}: their flows are known only up to a common factor, so type one of them to set the basis.`
    : ''
  return say(follow, `${rest}${several}${scale}${doubt}`, negative > 0)
}

/** "; 2 more values close the table", or how far what can be measured leads. */
function closing(next: readonly MeasureNext[] | null): string {
  if (!next) return ''
  const [best] = next
  if (!best) return '; nothing was found that could be measured to settle more'
  const { length } = best.set
  if (best.leaves === 0) return `; ${counted(length, 'more value')} ${verb(length, 'closes', 'close')} the table`
  return `; what can be measured leaves ${best.leaves} of them unknown`
}
