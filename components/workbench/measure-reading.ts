import { parseFormula } from '@/lib/balance/chemistry/chemical-formula'
import { absenceId, type StreamId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { partsOf } from '@/lib/book/measures'
import { type BookView, measureOfRow } from './book-view'
import type { RowPlace } from './rows'

type Why = { state: 'absent' | 'missing'; reason: string | null }
type Component = RecordOf<'component'>

const absent: Why = { state: 'absent', reason: null }
const missing = (reason: string): Why => ({ state: 'missing', reason })
const tags = (list: readonly Component[]): string => list.map(({ tag }) => tag).join(', ')

/** Why a stream has no such measure, or null where it has: nothing of it can be there, or something is not known. */
export function whyNoMeasure(view: BookView, streamId: StreamId, row: RowPlace): Why | null {
  const { state, book } = view
  const present = view.components.filter(({ id }) => !state.absence.has(absenceId(streamId, id)))
  if (present.length === 0) return absent
  if (row.quantity === 'volumeFlow') {
    if ((state.stream.get(streamId)?.density ?? null) === null)
      return missing('The density of the stream is not known: type it in the row Density.')
    return book.basis === 'mass' ? null : withoutMass(present)
  }
  const measure = measureOfRow(view, row)
  if (!measure) return null
  const among = (side: 'without' | 'group' | 'over'): Component[] => {
    const ids = new Set(partsOf(state, measure.id, side).map(({ id }) => id))
    return present.filter(({ id }) => ids.has(id))
  }
  switch (measure.quantity) {
    case 'elementMassFraction': {
      const bare = present.filter(({ formula }) => !parseFormula(formula ?? ''))
      if (bare.length > 0) return missing(`An element is counted by formulas: ${tags(bare)} has none that can be read.`)
      const { element } = measure
      return present.some(({ formula }) => parseFormula(formula ?? '')?.[element ?? ''] !== undefined) ? null : absent
    }
    case 'dryMassFraction':
    case 'dryMoleFraction': {
      const left = new Set(among('without').map(({ id }) => id))
      const dry = present.filter(({ id }) => !left.has(id))
      const own = present.filter(({ id }) => id === measure.componentId)
      if (own.length === 0) return absent
      if (dry.length === 0) return missing('Nothing of this stream is left on the dry basis.')
      return crosses(book.basis, measure.quantity) ? withoutMass([...dry, ...own]) : null
    }
    default: {
      const [group, over] = [among('group'), measure.over === 'group' ? among('over') : present]
      if (group.length === 0) return absent
      if (over.length === 0) return missing('Nothing that it is divided by can be in this stream.')
      return crosses(book.basis, measure.quantity) ? withoutMass([...group, ...over]) : null
    }
  }
}

const crosses = (basis: 'mass' | 'mole', quantity: string): boolean =>
  quantity.includes(basis === 'mass' ? 'Mole' : 'Mass')

function withoutMass(list: readonly Component[]): Why | null {
  const lacking = [...new Set(list)].filter(
    ({ molarMass, formula }) => molarMass === null && !parseFormula(formula ?? ''),
  )
  return lacking.length === 0 ? null : missing(`No molar mass or formula of ${tags(lacking)}.`)
}
