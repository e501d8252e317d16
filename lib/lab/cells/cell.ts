import { limits } from '../limits'
import type { DecimalSign, LabResult, ResultKind } from '../model'
import { leadingNumber, settleNumber, type WrittenNumber, wholeNumber } from './number'
import { isLimitName, leadingComparison, wordKind } from './qualifier'
import { remember } from './remember'
import { plainSpaces } from './spaces'
import { readUnit, type UnitRead } from './unit'

/** A cell of results, understood as far as its decimal sign: numbers are still read both ways. */
export type ParsedCell = UnitRead & {
  kind: ResultKind
  number?: WrittenNumber
  uncertainty?: { number: WrittenNumber; relative: boolean }
  flag?: string
}

const FLAG_FIRST = /^([*†‡§#^]+) ?(?=[-+−–<>~≤≥\d.,])/
const FLAG_LAST =
  /^(.*?[^*†‡§#!^ ]) ?([*†‡§#!^]+|[¹²³⁴⁵⁶⁷⁸⁹]+\)?|\[[a-z*]\]|\([a-z*†‡§]\)|[a-z]\)|\(k ?= ?\d[.,]?\d*\)|[UJEBHRQ]|UJ|JB)$/
const PLUS_MINUS = /\+ ?\/ ?[-−–]|±|\+[-−–]/

/**
 * Reads one cell of results without deciding the decimal sign.
 * @returns undefined where it has no sensible reading; an empty text is kind "blank".
 */
export const parseCell: (text: string) => ParsedCell | undefined = remember((text) => {
  const spelled = plainSpaces(text)
  if (spelled === '') return { kind: 'blank' }
  if (spelled.length > limits.measurementLength) return undefined
  const word = wordKind(spelled)
  if (word) return { kind: word }
  return parseFlagged(spelled) ?? parseWordWithLimit(spelled)
})

function parseFlagged(spelled: string): ParsedCell | undefined {
  const whole = parseMeasurement(spelled)
  if (whole) return whole
  const first = FLAG_FIRST.exec(spelled)
  const last = FLAG_LAST.exec(spelled)
  const bare = first ? spelled.slice(first[0].length) : last?.[1]
  if (bare === undefined) return undefined
  const flag = (first ? first[1] : last?.[2]) as string
  const cell = parseMeasurement(bare) ?? wordCell(bare)
  if (!cell) return undefined
  // "U" behind a number: analysed for, not found above that number (a qualifier of United States data validation).
  return { ...cell, ...(/^UJ?$/.test(flag) && cell.kind === 'value' && { kind: 'below' as const }), flag }
}

const wordCell = (text: string): ParsedCell | undefined => {
  const kind = wordKind(text)
  return kind && { kind }
}

function parseMeasurement(spelled: string): ParsedCell | undefined {
  const comparison = leadingComparison(spelled)
  if (comparison) {
    if (comparison.kind !== 'about' && isLimitName(comparison.rest)) return { kind: comparison.kind }
    const named = /^([A-Za-z. ]+?) ?[:=(]+ ?([^()]+)\)?$/.exec(comparison.rest)
    if (named && isLimitName(named[1] as string)) return withKind(parseQuantity(named[2] as string), comparison.kind)
    return withKind(parseQuantity(comparison.rest), comparison.kind)
  }
  return parseQuantity(spelled)
}

const withKind = (cell: ParsedCell | undefined, kind: ResultKind): ParsedCell | undefined =>
  cell && cell.uncertainty === undefined ? { ...cell, kind } : kind === 'about' && cell ? { ...cell, kind } : undefined

/** "ND (<0.01)", "BDL 0.05": a word, with the limit it was measured against. */
function parseWordWithLimit(spelled: string): ParsedCell | undefined {
  const found = /^([A-Za-zÄÖÜäöü. /]+?) ?[:=]? ?[(]?([<≤]? ?\d[^()]*)[)]?$/.exec(spelled)
  const kind = found ? wordKind((found[1] as string).trim()) : undefined
  if (kind !== 'notDetected' && kind !== 'below' && kind !== 'trace') return undefined
  const limit = parseMeasurement((found as RegExpExecArray)[2] as string)
  return limit?.number && limit.uncertainty === undefined ? { ...limit, kind } : undefined
}

/** A number with uncertainty and unit: "5.2 ± 0.1 mg/L", "(5,2 ± 0,1) %", "5.2 ± 2 %", "12 %". */
function parseQuantity(spelled: string): ParsedCell | undefined {
  const bracketed = /^\(([^()]*(?:±|\+ ?\/ ?[-−–])[^()]*)\) ?(.*)$/.exec(spelled)
  if (bracketed) {
    const inner = parseQuantity((bracketed[1] as string).trim())
    const unit = unitBehind(bracketed[2] as string)
    return inner && unit && inner.unit === undefined ? { ...inner, ...unit } : undefined
  }
  const read = leadingNumber(spelled)
  if (!read) return undefined
  const rest = read.rest.trim()
  if (rest === '') return { kind: 'value', number: read.number }
  const parts = rest.split(PLUS_MINUS)
  if (parts.length > 2) return undefined
  const unit = unitBehind(parts[0] as string)
  if (!unit) return undefined
  if (parts.length === 1) return { kind: 'value', number: read.number, ...unit }
  const spread = leadingNumber((parts[1] as string).trim())
  if (!spread) return undefined
  const tail = spread.rest.trim()
  // Percent behind the uncertainty alone is relative; behind both, it is the unit of both.
  const relative = /^%(?: rel\.?)?$/.test(tail) && unit.unit === undefined
  const spreadUnit = relative ? {} : unitBehind(tail)
  if (!spreadUnit) return undefined
  if (unit.unit !== undefined && spreadUnit.unit !== undefined && unit.unit !== spreadUnit.unit) return undefined
  return {
    kind: 'value',
    number: read.number,
    uncertainty: { number: spread.number, relative },
    ...spreadUnit,
    ...unit,
  }
}

function unitBehind(text: string): UnitRead | undefined {
  const spelled = text.trim()
  if (spelled === '') return {}
  // "(a)" is a footnote's mark.
  if (/^[-–—\d]|^\(\w\)$/.test(spelled)) return undefined
  return readUnit(spelled)
}

/** The number alone of a cell in a column of uncertainties or limits, and whether it is per cent of the value. */
export function parseSpread(text: string, headUnit: string | undefined): ParsedCell['uncertainty'] {
  const spelled = plainSpaces(text).replace(/^(?:±|\+ ?\/ ?[-−–]) ?/, '')
  const percent = /^(.*?) ?%$/.exec(spelled)
  const number = wholeNumber(percent ? (percent[1] as string) : spelled)
  return number && { number, relative: percent !== null || headUnit === '%' || headUnit === 'rel%' }
}

/** The cell with numbers decided; `unclear` where one hangs on an undecided sign. */
export function settleCell(
  cell: ParsedCell,
  decimal: DecimalSign | null,
): Pick<LabResult, 'kind' | 'value' | 'limit' | 'uncertainty' | 'flag'> {
  const flag = cell.flag === undefined ? {} : { flag: cell.flag }
  if (!cell.number) return { kind: cell.kind, ...flag }
  const number = settleNumber(cell.number, decimal)
  const spread = cell.uncertainty && settleNumber(cell.uncertainty.number, decimal)
  if (number === undefined || (cell.uncertainty && spread === undefined)) return { kind: 'unclear' }
  if (cell.kind !== 'value' && cell.kind !== 'about') return { kind: cell.kind, limit: number, ...flag }
  const size = cell.uncertainty?.relative ? tidy(((spread as number) * Math.abs(number)) / 100) : spread
  return { kind: cell.kind, value: number, ...(size !== undefined && { uncertainty: Math.abs(size) }), ...flag }
}

/** 0.104 rather than 0.10400000000000001. */
const tidy = (value: number): number => Number(value.toPrecision(12))
