import type { GridPlace } from '@/hooks/grid-model'
import { measureKey } from '@/lib/balance/measure/measure-name'
import type { Conflict, Place } from '@/lib/balance/solution'
import { type UsedRef, usedName } from '@/lib/book/edits/ways-out'
import { givenId } from '@/lib/book/ids'
import { bookUnitOf, convert } from '@/lib/book/units'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, rowOfPlace, rowStyle, rowUnit, streamIdOf } from '../book-view'
import { rowIdOf } from '../rows'
import { placeWords, sentence } from '../words'

/** A member of a set that cannot hold, with its numbers in the unit of its row. */
export type OddsMember = {
  key: string
  /** null: what stood there has been cleared since this answer. */
  ref: UsedRef | null
  /** "Total flow of 112", "Rule Q1". */
  name: string
  /** Where it stands in the table; null for a rule. */
  place: GridPlace | null
  typed: string | null
  implied: string | null
  /** Typed minus implied, with its sign. */
  by: string
  unit: string
  /** How many of the sets listed hold it: withdrawing it settles these. */
  settles: number
}

export type OddsSet = {
  /** 1 for the first, as "held back by conflict 1" names it. */
  number: number
  where: string
  /** The stream whose typed fractions do not add up, by id. */
  fractionsOf: string | null
  members: OddsMember[]
}

export type Odds = { sets: OddsSet[]; truncated: boolean }

const memberKey = (place: Place | string): string =>
  typeof place === 'string'
    ? `rule ${place}`
    : JSON.stringify([place.stream, measureKey(place), place.instrument ?? 'main'])

/** The sets of givens and rules that cannot all hold, as the newest answer lists them; those that settle most first. */
export function oddsOf(view: BookView): Odds {
  const { conflicts = [], conflictsTruncated = false } = view.solved?.solution ?? {}
  const counts = new Map<string, number>()
  for (const { givens, relations } of conflicts)
    for (const key of [...givens.map(memberKey), ...relations.map(({ id }) => memberKey(id))])
      counts.set(key, (counts.get(key) ?? 0) + 1)
  const sets = conflicts.map((conflict, index): OddsSet => {
    const members = [
      ...conflict.givens.map((given) => givenMember(view, given)),
      ...conflict.relations.map((relation) => ruleMember(view, relation)),
    ].map((member) => ({ ...member, settles: counts.get(member.key) ?? 1 }))
    const stream = conflict.code === 'fractionSum' ? streamIdOf(view, conflict.stream) : null
    return {
      number: index + 1,
      where: meetingPlace(view, conflict),
      fractionsOf: stream,
      members: members.sort((a, b) => b.settles - a.settles),
    }
  })
  return { sets, truncated: conflictsTruncated }
}

/** The members whose withdrawal alone settles most of the sets listed. */
export function bestWithdrawals({ sets }: Odds): OddsMember[] {
  const members = new Map(sets.flatMap(({ members }) => members).map((member) => [member.key, member]))
  const most = Math.max(0, ...[...members.values()].map(({ settles }) => settles))
  return [...members.values()].filter(({ settles }) => settles === most)
}

function meetingPlace(view: BookView, { boundary, stream, component, code }: Conflict): string {
  if (code === 'fractionSum') return `The typed fractions of stream ${stream} do not add up`
  const named = view.components.find(({ tag }) => tag.trim() === component)
  const of = named ? ` for ${named.name || named.tag}` : ''
  if (boundary.length > 0) return `These cannot all hold round ${boundary.join(', ')}${of}`
  return stream ? `These cannot all hold in stream ${stream}${of}` : 'These cannot all hold'
}

type Clash = Omit<OddsMember, 'settles'>

/** A place of the solver with three numbers of it, in the unit of its row. */
export function givenMember(view: BookView, given: Conflict['givens'][number]): Clash {
  const { basis, flowUnit } = view.book
  const row = rowOfPlace(view, given)
  const stream = streamIdOf(view, given.stream)
  const of = row?.componentId ?? row?.measureId ?? null
  const id = givenId(view.caseId, stream ?? '', given.quantity, of, given.instrument)
  const from = bookUnitOf(given.quantity, basis, flowUnit) ?? ''
  const { symbol, shown } = row ? rowUnit(view, row) : { symbol: from, shown: from }
  const style = row ? rowStyle(view, row) : 'flow'
  const say = (value: number, extraDigits = 0) =>
    formatNumber(convert(value, from, symbol) ?? value, style, { decimal: view.decimal, extraDigits })
  return {
    key: memberKey(given),
    ref: view.state.given.has(id) ? { kind: 'given', id } : null,
    name: sentence(placeWords(view, given)),
    place: stream === null || !row ? null : { row: rowIdOf(row), column: stream },
    typed: say(given.typed),
    implied: say(given.implied, 1),
    by: signed(say(given.by, 1), given.by),
    unit: shown,
  }
}

function ruleMember(view: BookView, relation: Conflict['relations'][number]): Clash {
  const rule = [...view.state.rule.values()].find(({ tag }) => tag.trim() === relation.id)
  const say = (value: number | undefined, extraDigits = 0) =>
    value === undefined ? null : formatNumber(value, 'fraction', { decimal: view.decimal, extraDigits })
  const ref: UsedRef | null = rule ? { kind: 'rule', id: rule.id } : null
  return {
    key: memberKey(relation.id),
    ref,
    name: sentence(ref ? usedName(view.state, ref) : `rule ${relation.id}`),
    place: null,
    typed: say(relation.typed),
    implied: say(relation.implied, 1),
    by: signed(say(relation.by, 1) ?? '', relation.by),
    unit: '',
  }
}

const signed = (text: string, value: number): string => (value > 0 ? `+${text}` : text)
