import type { GridPlace } from '@/hooks/grid-model'
import type { Check } from '@/lib/balance/solution'
import { listed } from '@/lib/book/edits/draft'
import { formatNumber } from '@/lib/sheet/format'
import type { BookView } from '../book-view'
import { lowered, sentence } from '../words'
import { givenMember } from './odds-sets'

export type CheckLine = {
  key: string
  agrees: boolean
  /** "The typed fractions of stream 101 add up to 1". */
  what: string
  /** "off by +0.03 wt %, allowed ± 0.02 wt %". */
  by: string
  members: { key: string; name: string; place: GridPlace | null }[]
}

/** What the balance does not need and was held against the rest, what disagrees first. */
export function checkLines(view: BookView): CheckLine[] {
  const lines = (view.solved?.solution.checks ?? []).map((check) => lineOf(view, check))
  return lines.sort((a, b) => Number(a.agrees) - Number(b.agrees))
}

function lineOf(view: BookView, check: Check): CheckLine {
  const { givens, relations, by, tolerance, agrees, code } = check
  const members = givens.map((place) => givenMember(view, { ...place, typed: 0, implied: by, by: tolerance }))
  const rules = relations.map((id) => ({ key: `rule ${id}`, name: `Rule ${id}`, place: null }))
  const all = [...members, ...rules].map(({ key, name, place }) => ({ key, name, place }))
  const several = all.length > 1
  const names = listed(
    all.map(({ name }) => lowered(name)),
    4,
  )
  // A difference has the unit of what it is of; where several things meet it is in the units of the book.
  const [only] = all.length === 1 || code === 'sum' ? members : []
  const say = (value: number) => formatNumber(value, 'flow', { decimal: view.decimal, extraDigits: 1 })
  const off = only ? (only.implied ?? '') : say(by)
  const allowed = only ? only.by.replace(/^\+/, '') : say(tolerance)
  const unit = only?.unit ? ` ${only.unit}` : ''
  return {
    key: JSON.stringify([code, givens, relations]),
    agrees,
    what: sentence(whatOf(code, names, several, givens[0]?.stream)),
    by: `off by ${by > 0 ? '+' : ''}${off}${unit}, allowed ± ${allowed}${unit}`,
    members: all,
  }
}

function whatOf(code: Check['code'], names: string, several: boolean, stream: string | undefined): string {
  switch (code) {
    case 'sum':
      return `the typed fractions of stream ${stream ?? ''} add up to 1`
    case 'redundant':
      return several ? `${names} say more than is needed` : `${names} also follows from the rest`
    case 'checkOnly':
      return `${names}, kept as a check only`
  }
}
