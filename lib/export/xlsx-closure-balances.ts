import type { Row } from 'exceljs'
import type { ClosureGroup, ClosureLine, ElementLine } from './closure'
import { numberFormat } from './number-format'
import { componentLabel, rowKey } from './table-model'
import { type Live, nextRow, putLive, putNumber, putText } from './xlsx-cells'
import {
  at,
  type ClosureSheet,
  columns,
  limitCell,
  putAmount,
  putBand,
  putPercent,
  rounding,
  spare,
  throughputCell,
} from './xlsx-closure-sheet'
import { type Amount, gather, nothing, type Ref, sumOf, unknownIn, unknownText, whole } from './xlsx-formulas'
import * as style from './xlsx-styles'

/** One balance, ready to be written: in, out, formed, gain of what is held, and how many values it still lacks. */
type Balance = { into: Amount; out: Amount; formed: Amount; gain: number | null; unknown: Live; isCheck: boolean }

/** What a component line leaves for the lines of elements under it. */
type Sides = { into: Ref; out: Ref; gain: number | null }

export function putGroup(context: ClosureSheet, group: ClosureGroup): void {
  putBand(context.sheet, group.title)
  if (group.open !== null) {
    putText(nextRow(context.sheet).getCell(columns.place), `Not balanced: ${group.open}.`, style.rowLabel)
    return
  }
  const sides = group.lines.map((line) => putLine(context, group, line))
  for (const element of group.elements) putElement(context, group, element, sides)
}

function labelled(context: ClosureSheet, place: string, what: string, unit: string, strong = false): Row {
  const row = nextRow(context.sheet)
  putText(row.getCell(columns.place), place, strong ? style.rowLabelStrong : style.rowLabel)
  putText(row.getCell(columns.component), what, strong ? style.rowLabelStrong : style.rowLabel)
  putText(row.getCell(columns.unit), unit, style.rowUnit)
  return row
}

function putLine(context: ClosureSheet, group: ClosureGroup, line: ClosureLine): Sides {
  const { sheet, table, closure, places } = context
  const total = line.component === null
  const what = line.component === null ? 'Total' : componentLabel(table.components[line.component])
  const row = labelled(context, group.title, what, table.flowUnit, total)
  const key = line.component === null ? rowKey('flow', null) : rowKey('componentFlow', line.component)
  const refs = (streams: readonly number[]): Ref[] =>
    streams.map((stream) => ({ at: places.ref(key, stream), value: places.cell(key, stream).value }))
  const into = gather(sheet, row.number, spare.in, refs(line.inlets))
  const out = gather(sheet, row.number, spare.out, refs(line.outlets))
  const formed = gather(
    sheet,
    row.number,
    spare.formed,
    line.formed.map((index) => context.formations[index] as Ref),
  )
  // An extent counts once, although a total leans on it for several components.
  const reactions = [...new Set(line.formed.map((index) => closure.formations[index]?.reaction as number))]
  const extents = reactions.map((reaction) => context.extents[reaction] as Ref)
  const size = line.inlets.length + line.outlets.length + extents.length
  const counted = [
    into.count,
    out.count,
    ...(extents.length > 0 ? [`COUNT(${extents.map((e) => e.at).join(',')})`] : []),
  ]
  const unknown = {
    formula: `${size}-${counted.join('-')}`,
    result: unknownIn([...into.refs, ...out.refs, ...extents]),
  }
  const gain = line.gain === 'notSplit' ? null : line.gain
  const isCheck = !group.byElements || (total && table.basis === 'mass')
  const amounts = { into: whole(into), out: whole(out) }
  const made = isCheck ? whole(formed) : byDifference(row.number, amounts.into, amounts.out, gain)
  putBalance(context, row, { ...amounts, formed: made, gain, unknown, isCheck })
  return {
    into: { at: at('in', row.number), value: amounts.into.value },
    out: { at: at('out', row.number), value: amounts.out.value },
    gain,
  }
}

/** Where elements are balanced, what became of a component is known only from what enters and leaves. */
function byDifference(row: number, into: Amount, out: Amount, gain: number | null): Amount {
  const [i, o, g] = [at('in', row), at('out', row), at('gain', row)]
  const value = into.value === null || out.value === null || gain === null ? null : out.value - into.value + gain
  return { formula: `IF(COUNT(${i},${o},${g})=3,${o}-${i}+${g},"${unknownText}")`, value }
}

function putElement(context: ClosureSheet, group: ClosureGroup, { element, parts }: ElementLine, sides: Sides[]): void {
  const row = labelled(context, group.title, `Element ${element}`, context.closure.extentUnit)
  const side = (name: 'into' | 'out'): Amount => {
    const terms = parts.map(({ line, content }) => {
      const flow = sides[line]?.[name] as Ref
      const atoms = context.contents[content] as Ref
      return {
        flow,
        text: `${atoms.at}*${flow.at}`,
        value: flow.value === null ? null : flow.value * (atoms.value ?? 0),
      }
    })
    const flows = terms.map(({ flow }) => flow.at).join(',')
    const sum = terms.map(({ text }) => text).join('+')
    const value = sumOf(terms.map(({ text, value }) => ({ at: text, value })))
    return { formula: `IF(COUNT(${flows})=${terms.length},${sum},"${unknownText}")`, value }
  }
  const cells = parts.flatMap(({ line }) => [sides[line]?.into as Ref, sides[line]?.out as Ref])
  const gain = sumOf(
    parts.map(({ line, content }) => {
      const held = sides[line]?.gain ?? null
      return { at: '', value: held === null ? null : held * (context.contents[content]?.value ?? 0) }
    }),
  )
  const unknown = {
    formula: `${cells.length}-COUNT(${cells.map((cell) => cell.at).join(',')})`,
    result: unknownIn(cells),
  }
  putBalance(context, row, { into: side('into'), out: side('out'), formed: nothing, gain, unknown, isCheck: true })
}

/** The columns from In on. Nothing unknown is ever taken for zero: the formulas count the numbers first. */
function putBalance(context: ClosureSheet, row: Row, balance: Balance): void {
  const { into, out, formed, gain, unknown, isCheck } = balance
  putAmount(context, row, 'in', into)
  putAmount(context, row, 'out', out)
  putAmount(context, row, 'formed', formed)
  if (gain === null) putText(row.getCell(columns.gain), 'not split', style.figure)
  else putNumber(row.getCell(columns.gain), gain, numberFormat(gain, 6), style.figure)
  putLive(row.getCell(columns.unknown), unknown, '0', style.figure)
  const [i, o, f, g, u] = (['in', 'out', 'formed', 'gain', 'unknown'] as const).map((name) => at(name, row.number))
  const known = into.value !== null && out.value !== null && formed.value !== null && gain !== null
  const difference = known ? (into.value ?? 0) - (out.value ?? 0) + (formed.value ?? 0) - gain : null
  const openText = unknown.result === 0 ? 'not checked' : `not closed: ${unknown.result} unknown`
  const open = `IF(${u}>0,"not closed: "&${u}&" unknown","not checked")`
  const formula = `IF(COUNT(${i},${o},${f},${g})=4,${i}-${o}+${f}-${g},${open})`
  const cell = row.getCell(columns.difference)
  putLive(cell, { formula, result: difference ?? openText }, context.differenceFormat, style.figure)
  putPercent(row, difference, into.value)
  const finding = findingOf(context, row.number, difference, into.value, out.value, openText, isCheck)
  putLive(row.getCell(columns.finding), finding, null, style.rowLabelIndented)
}

function findingOf(
  { throughput, limit }: ClosureSheet,
  row: number,
  difference: number | null,
  into: number | null,
  out: number | null,
  openText: string,
  isCheck: boolean,
): Live {
  const [d, i, o] = [at('difference', row), at('in', row), at('out', row)]
  const closed = isCheck ? 'closed' : 'by difference, no check'
  const allowed = `MAX(${limitCell}/100*MAX(ABS(${i}),ABS(${o})),${rounding}*${throughputCell})`
  const formula = `IF(ISNUMBER(${d}),IF(ABS(${d})<=${allowed},"${closed}","does not close"),${d})`
  if (difference === null) return { formula, result: openText }
  const most = Math.max((limit / 100) * Math.max(Math.abs(into ?? 0), Math.abs(out ?? 0)), rounding * throughput)
  return { formula, result: Math.abs(difference) <= most ? closed : 'does not close' }
}
