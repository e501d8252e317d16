import { plainDecimal, shiftDecimal } from '../decimal-text'
import { ruleStreamId } from '../ids'
import type { RecordOf } from '../kinds'
import { type BookState, inOrder } from '../state'
import { readLine } from './read-line'
import { formulaFault } from './resolve-line'
import { writtenName } from './scan'

type Rule = RecordOf<'rule'>

/** Kinds whose fraction people say in per cent. */
const inPercent: ReadonlySet<Rule['ruleKind']> = new Set(['recovery', 'conversion', 'excess'])

/**
 * A rule as one line, without its tag; `readLine` gives the same rule back. The forms, with “?” for what is not chosen yet:
 * `split of T-101 to 105 = 0.35`, `recovery of NaCl in C-103 to 107 = 98 %`, `conversion of A in R-1 = 60 %`,
 * `extent of R1 = 12`, `yield of B from A in R-1 = 0.9`, `selectivity of B over C in R-1 = 4`,
 * `excess of O2 over CH4 in R-1 by R1 = 20 %`, `flow(105) = 0.4 * flow(103)`, `part(105, A) = 2 * part(103, B)`,
 * `same composition in 101, 102`, and any other relation as a formula.
 */
export function ruleLine(state: BookState, rule: Rule): string {
  const use = rule.use === 'given' ? '' : `${rule.use}: `
  return `${use}${body(state, rule)}${tail(rule)}`
}

function body(state: BookState, rule: Rule): string {
  const unit = tagIn(state.unit, rule.unitId)
  const stream = tagIn(state.stream, rule.streamId)
  const component = tagIn(state.component, rule.componentId)
  const other = tagIn(state.component, rule.otherComponentId)
  const otherStream = tagIn(state.stream, rule.otherStreamId)
  const value = valueText(state, rule)
  switch (rule.ruleKind) {
    case 'split':
      return `split of ${unit} to ${stream} = ${value}`
    case 'recovery':
      return `recovery of ${component} in ${unit} to ${stream} = ${value}`
    case 'conversion':
      return `conversion of ${component} in ${unit} = ${value}`
    case 'extent':
      return `extent of ${tagIn(state.reaction, rule.reactionId)} = ${value}`
    case 'yield':
      return `yield of ${component} from ${other} in ${unit} = ${value}`
    case 'selectivity':
      return `selectivity of ${component} over ${other} in ${unit} = ${value}`
    case 'excess':
      return `excess of ${component} over ${other} in ${unit} by ${tagIn(state.reaction, rule.reactionId)} = ${value}`
    case 'flowRatio':
      return `flow(${stream}) = ${value} * flow(${otherStream})`
    case 'componentRatio':
      return `part(${stream}, ${component}) = ${value} * part(${otherStream}, ${other})`
    case 'sameComposition': {
      const streams = inOrder(state.stream).filter(({ id }) => state.ruleStream.has(ruleStreamId(rule.id, id)))
      return `same composition in ${streams.map(({ tag }) => writtenName(tag.trim())).join(', ') || '?'}`
    }
    case 'formula':
      return formulaText(state, rule.text)
  }
}

const tagIn = (records: ReadonlyMap<string, { tag: string }>, id: string | null): string => {
  const record = id === null ? undefined : records.get(id)
  return record ? writtenName(record.tag.trim()) : '?'
}

function valueText(state: BookState, rule: Rule): string {
  const parameter = rule.parameterId === null ? undefined : state.parameter.get(rule.parameterId)
  if (parameter) return writtenName(parameter.tag.trim(), true)
  if (rule.value === null) return '?'
  return saidInPercent(rule) ? `${plainDecimal(shiftDecimal(rule.value, 2))} %` : plainDecimal(rule.value)
}

function tail(rule: Rule): string {
  const percent = rule.parameterId === null && rule.value !== null && saidInPercent(rule)
  const { halfWidth, note } = rule
  const width =
    halfWidth === null
      ? ''
      : ` ± ${percent ? `${plainDecimal(shiftDecimal(halfWidth, 2))} %` : plainDecimal(halfWidth)}`
  return `${width}${note === null ? '' : ` # ${noteText(note)}`}`
}

/** Per cent only where it reads back as the same number. */
function saidInPercent({ ruleKind, value, halfWidth }: Rule): boolean {
  const exact = (number: number | null) => number === null || shiftDecimal(shiftDecimal(number, 2), -2) === number
  return inPercent.has(ruleKind) && exact(value) && exact(halfWidth)
}

const noteText = (note: string): string =>
  note === '' || note.startsWith('"') || note !== note.trim() || /[\r\n]/.test(note) ? JSON.stringify(note) : note

/** As it stands where that is read as the same formula, else behind the word `formula`, in quotes if need be. */
function formulaText(state: BookState, text: string | null): string {
  if (text === null) return 'formula ?'
  const isRead = (line: string): boolean => {
    try {
      // With what may follow as well: an open quote in the text would swallow it.
      return [line, `${line} ± 1 # "`].every((whole) => {
        const read = readLine(whole)
        return read.ruleKind === 'formula' && read.text === text && read.tag === null && read.use === 'given'
      })
    } catch {
      return false
    }
  }
  if (!/[\r\n]/.test(text)) {
    if (formulaFault(state, text) === null && isRead(text)) return text
    if (isRead(`formula ${text}`)) return `formula ${text}`
  }
  return `formula ${JSON.stringify(text)}`
}
