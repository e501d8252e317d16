import type { MeasureName } from '@/lib/balance/problem'
import type { Place } from '@/lib/balance/solution'
import type { LeftOut } from '@/lib/book/problem-draft'
import type { BookState } from '@/lib/book/state'
import { cautions, preliminary } from './caution'
import { assumptionsOf, type GivenLine, quantityWords } from './givens-list'
import { ruleInWords } from './rule-words'
import type { Solved } from './stream-table'
import { type StreamTable, taggedName } from './table-model'
import { type TitleBlock, titleFields } from './title-block'

/** Numbered notes under one heading; `empty` is said where there is none. */
export type NoteSection = { title: string; lines: string[]; empty: string | null }

export type NotesInput = {
  state: BookState
  solved: Solved
  table: StreamTable
  givens: readonly GivenLine[]
  leftOut: readonly LeftOut[]
  title: TitleBlock
  bookNumber: number
  engineVersion: string
}

/** What must travel with the table: caution, state, clashes, what was left out, assumptions, rules, and how it was made. */
export function notesOf(input: NotesInput): NoteSection[] {
  const { state, solved, table, givens, leftOut, title, bookNumber, engineVersion } = input
  const { problem, solution } = solved
  const { degreesOfFreedom, freeScale } = solution.summary
  const status = [
    title.issued === null ? `${preliminary}: not checked, not approved, not for construction or operation.` : '',
    statusWords[solution.status],
    degreesOfFreedom > 0
      ? `${degreesOfFreedom} more independent ${degreesOfFreedom === 1 ? 'value settles' : 'values settle'} every cell.`
      : '',
    ...freeScale.map((streams) => `The flows of ${streams.join(', ')} are known only up to one common factor.`),
  ]
  const atOdds = solution.conflicts.map(conflictInWords)
  if (solution.conflictsTruncated) atOdds.push('There are more such sets than are listed here.')
  const used = leftOut.filter(({ kind }) => kind !== 'given')
  return [
    { title: 'Caution', lines: [...cautions], empty: null },
    { title: 'Document', lines: titleFields(title).map(([label, value]) => `${label}: ${value}`), empty: null },
    { title: 'State of this table', lines: status.filter((line) => line !== ''), empty: null },
    { title: 'Givens and rules at odds', lines: atOdds, empty: 'None.' },
    {
      title: 'What the calculation says',
      lines: solution.diagnostics.map(({ severity, text }) => `${capital(severity)}: ${text}`),
      empty: 'Nothing.',
    },
    { title: 'Values to look at', lines: flagged(table), empty: 'None.' },
    {
      title: 'Left out of the calculation',
      lines: [...used, ...leftOut.filter(({ kind }) => kind === 'given')].map(({ what }) => what),
      empty: 'Nothing.',
    },
    { title: 'Assumptions', lines: assumptionsOf(state, givens), empty: 'No given is marked as an assumption.' },
    {
      title: 'Rules',
      lines: (problem.relations ?? []).map((rule) => `${rule.id}: ${ruleInWords(rule)}`),
      empty: 'None: balances and givens only.',
    },
    {
      title: 'How it was made',
      lines: [
        `Tallybrook, engine ${engineVersion}, change ${bookNumber} of the book, made ${title.made}.`,
        'All balances, givens and rules are solved together. A value is shown only where it is the same in every solution; else it is still unknown.',
        'Numbers in the cells are whole; the number format shows a few figures of them, so that shown figures may not add up in the last place.',
      ],
      empty: null,
    },
  ]
}

const statusWords = {
  solved: 'Every cell follows from what is given.',
  open: 'Some cells are still unknown: a cell with a dot is not zero.',
  atOdds: 'Some givens or rules contradict each other: see below. Values that lean on them are not shown as solved.',
  gaveUp: 'The calculation gave up; only what was settled before is shown.',
} as const

const capital = (text: string): string => `${text[0]?.toUpperCase() ?? ''}${text.slice(1)}`

const placeInWords = ({ stream, instrument, ...name }: Place): string =>
  `${measureInWords(name)} of stream ${stream}${instrument === undefined || instrument === 'main' ? '' : ` by ${instrument}`}`

/** "mass ratio of Water to Ore + Slag", "dry mass fraction of NaCl without Water". */
function measureInWords({ quantity, component, element, parts, over, without }: MeasureName): string {
  const of = component ?? element ?? parts?.join(' + ')
  const under = over ? ` to ${over.join(' + ')}` : without ? ` without ${without.join(' + ')}` : ''
  return `${quantityWords[quantity]}${of === undefined ? '' : ` of ${of}`}${under}`
}

const short = (value: number): string => String(Number(value.toPrecision(6)))

function conflictInWords(conflict: Solved['solution']['conflicts'][number]): string {
  const where =
    conflict.boundary.length > 0
      ? `Round ${conflict.boundary.join(', ')}`
      : conflict.stream === undefined
        ? 'Together'
        : `Inside stream ${conflict.stream}`
  const members = [
    ...conflict.givens.map(
      (given) =>
        `${placeInWords(given)}: ${short(given.typed)} typed, ${short(given.implied)} by the others, ${short(given.by)} too ${given.by > 0 ? 'high' : 'low'}`,
    ),
    ...conflict.relations.map(({ id, by }) => `rule ${id}: off by ${short(by)}`),
  ]
  const about = conflict.component === undefined ? '' : ` for ${conflict.component}`
  return `${where}${about} these cannot all hold. ${members.map(capital).join('; ')}.`
}

const flagWords: Partial<Record<string, string>> = {
  negative: 'is negative',
  aboveOne: 'is above 100 %',
  amplified: 'is ill-conditioned: a small change of a given moves it far',
  weak: 'is solved but weak',
  localOnly: 'was found by iteration from one start only',
  zeroFlow: 'belongs to a stream of no flow',
}

/** One line a flag and cell of the rows that the book is kept in. */
function flagged(table: StreamTable): string[] {
  const own = new Set(['flow', 'fraction', 'componentFlow'])
  const rows = table.blocks.flatMap((block) => block.rows.map((row) => ({ row, block })))
  return rows.flatMap(({ row, block }) => {
    if (!own.has(row.measure)) return []
    const what = row.component === null ? row.label : `${block.title} of ${row.label}`
    return row.cells.flatMap(({ flags }, stream) =>
      flags.map(
        (flag) =>
          `${what} in ${taggedName(table.streams[stream] ?? { tag: '', name: '' })} ${flagWords[flag] ?? flag}.`,
      ),
    )
  })
}
