import { parseFormulaText } from '@/lib/balance/formula/parse-formula'
import { shiftDecimal } from '../decimal-text'
import type { RecordOf } from '../kinds'
import { quoteIds } from './quote-ids'
import { type Named, Scan, Unread } from './scan'

type Rule = RecordOf<'rule'>
export type LineValue = { kind: 'number'; value: number } | { kind: 'parameter'; name: Named }

/** One line of rules as text, its names not yet looked up. null: “?”, not chosen yet. */
export type RuleLine = {
  tag: Named | null
  use: Rule['use']
  ruleKind: Rule['ruleKind']
  unit: Named | null
  stream: Named | null
  component: Named | null
  otherStream: Named | null
  otherComponent: Named | null
  reaction: Named | null
  streams: Named[]
  value: LineValue | null
  text: string | null
  /** Where a formula stands that is to be used at once, so that its names must be known; 0: none. */
  formulaAt: number
  halfWidth: number | null
  note: string | null
}

type Body = Partial<RuleLine> & Pick<RuleLine, 'ruleKind'>
type Percent = 'plain' | 'percent' | 'either'

const nothing: Omit<RuleLine, 'ruleKind'> = {
  tag: null,
  use: 'given',
  unit: null,
  stream: null,
  component: null,
  otherStream: null,
  otherComponent: null,
  reaction: null,
  streams: [],
  value: null,
  text: null,
  formulaAt: 0,
  halfWidth: null,
  note: null,
}

/**
 * Reads `[tag:] [check: | withdrawn:] rule [± half-width] [# note]`. Throws `Unread` with the column where it stops.
 * The forms of a rule are listed in `write-line.ts`, which writes what this reads.
 */
export function readLine(text: string): RuleLine {
  const scan = new Scan(text)
  const tag = readTag(scan)
  const use = prefixed(scan, 'check') ? 'check' : prefixed(scan, 'withdrawn') ? 'withdrawn' : 'given'
  const { percent, ...body } = readBody(scan)
  const halfWidth = scan.sign('±') ? readHalfWidth(scan, percent) : null
  const note = scan.sign('#') ? readNote(scan) : null
  scan.end()
  return { ...nothing, tag, use, ...body, halfWidth, note }
}

function prefixed(scan: Scan, word: 'check' | 'withdrawn'): boolean {
  const from = scan.at
  if (scan.word(word) && scan.sign(':')) return true
  scan.at = from
  return false
}

function readTag(scan: Scan): Named | null {
  if (!/^(?:"(?:[^"\\]|\\.)*"|[\p{L}\p{N}_][\p{L}\p{N}_.+/-]*)\s*:/u.test(scan.rest)) return null
  if (/^(?:check|withdrawn)\s*:/.test(scan.rest)) return null
  const tag = scan.name('The tag of a rule')
  scan.want(':', 'the tag')
  return tag
}

function readBody(scan: Scan): Body & { percent: Percent } {
  const from = scan.column
  const kind = scan.word(
    'split',
    'recovery',
    'conversion',
    'extent',
    'yield',
    'selectivity',
    'excess',
    'same',
    'formula',
  )
  switch (kind) {
    case 'split': {
      const unit = named(scan, 'of', 'A splitter', 'split')
      const stream = named(scan, 'to', 'An outlet', 'the splitter')
      return { ruleKind: kind, unit, stream, ...equals(scan) }
    }
    case 'recovery': {
      const component = named(scan, 'of', 'A component', 'recovery')
      const unit = named(scan, 'in', 'A unit', 'the component')
      const stream = named(scan, 'to', 'An outlet', 'the unit')
      return { ruleKind: kind, component, unit, stream, ...equals(scan) }
    }
    case 'conversion': {
      const component = named(scan, 'of', 'A component', 'conversion')
      return { ruleKind: kind, component, unit: named(scan, 'in', 'A unit', 'the component'), ...equals(scan) }
    }
    case 'extent':
      return { ruleKind: kind, reaction: named(scan, 'of', 'A reaction', 'extent'), ...equals(scan) }
    case 'yield':
    case 'selectivity': {
      const component = named(scan, 'of', 'A product', kind)
      const joint = kind === 'yield' ? 'from' : 'over'
      const otherComponent = named(scan, joint, 'A component', 'the product')
      const unit = named(scan, 'in', 'A unit', 'the component')
      return { ruleKind: kind, component, otherComponent, unit, ...equals(scan) }
    }
    case 'excess': {
      const component = named(scan, 'of', 'A component', 'excess')
      const otherComponent = named(scan, 'over', 'The limiting component', 'the component')
      const unit = named(scan, 'in', 'A unit', 'the component')
      const reaction = named(scan, 'by', 'A reaction', 'the unit')
      return { ruleKind: kind, component, otherComponent, unit, reaction, ...equals(scan) }
    }
    case 'same': {
      scan.wantWord('composition', 'same')
      scan.wantWord('in', 'same composition')
      const streams: Named[] = []
      do {
        const stream = scan.name('A stream')
        if (stream) streams.push(stream)
      } while (scan.sign(','))
      return { ruleKind: 'sameComposition', streams, percent: 'plain' }
    }
    case 'formula':
      return { ruleKind: kind, text: keptFormula(scan), percent: 'plain' }
    default: {
      const at = scan.at
      const ratio = readRatio(scan)
      if (ratio) return ratio
      scan.at = at
      return bareFormula(scan, from)
    }
  }
}

function named(scan: Scan, word: string, what: string, after: string): Named | null {
  scan.wantWord(word, after)
  return scan.name(what)
}

function equals(scan: Scan): { value: LineValue | null; percent: Percent } {
  scan.want('=', 'what the rule is of')
  return readValue(scan)
}

function readValue(scan: Scan): { value: LineValue | null; percent: Percent } {
  if (scan.sign('?')) return { value: null, percent: 'either' }
  const number = scan.number()
  if (number) {
    const value = number.percent ? shiftDecimal(number.value, -2) : number.value
    return { value: { kind: 'number', value }, percent: number.percent ? 'percent' : 'plain' }
  }
  const name = scan.name('A number, a percentage or a parameter')
  return { value: name && { kind: 'parameter', name }, percent: 'either' }
}

function readHalfWidth(scan: Scan, percent: Percent): number {
  const { column } = scan
  const number = scan.number()
  if (!number) throw new Unread(column, 'A half-width is wanted here, after “±”.')
  if (percent !== 'either' && (percent === 'percent') !== number.percent)
    throw new Unread(column, 'Write “%” behind both the value and its half-width, or behind neither.')
  if (!(number.value > 0)) throw new Unread(column, 'A half-width is more than 0; left out, the rule is exact.')
  return number.percent ? shiftDecimal(number.value, -2) : number.value
}

function readNote(scan: Scan): string {
  const from = scan.at
  const quoted = scan.quoted()
  if (quoted !== undefined && scan.rest === '') return quoted
  scan.at = from
  const note = scan.rest.trimEnd()
  scan.at = scan.text.length
  return note
}

/** `flow(a) = v * flow(b)` and `part(a, c) = v * part(b, d)`; undefined where the line is another. */
function readRatio(scan: Scan): (Body & { percent: Percent }) | undefined {
  try {
    const kind = scan.word('flow', 'part')
    if (!kind) return undefined
    const left = readArguments(scan, kind)
    const { value, percent } = equals(scan)
    scan.want('*', 'the value')
    if (!scan.word(kind)) return undefined
    const right = readArguments(scan, kind)
    if (scan.rest !== '' && !/^[±#]/.test(scan.rest)) return undefined
    const streams = { stream: left.stream, otherStream: right.stream, value, percent }
    if (kind === 'flow') return { ruleKind: 'flowRatio', ...streams }
    return { ruleKind: 'componentRatio', ...streams, component: left.component, otherComponent: right.component }
  } catch (error) {
    if (error instanceof Unread) return undefined
    throw error
  }
}

function readArguments(scan: Scan, kind: 'flow' | 'part') {
  scan.want('(', kind)
  const stream = scan.name('A stream')
  if (kind === 'part') scan.want(',', 'the stream')
  const component = kind === 'part' ? scan.name('A component') : null
  scan.want(')', kind === 'flow' ? 'the stream' : 'the component')
  return { stream, component }
}

/** Behind the word `formula`: taken as it stands, also where it cannot be calculated yet. */
function keptFormula(scan: Scan): string | null {
  const from = scan.at
  const quoted = scan.quoted()
  if (quoted !== undefined && (scan.rest === '' || /^[±#]/.test(scan.rest))) return quoted
  scan.at = from
  const text = rawFormula(scan)
  return text === '?' || text === '' ? null : text
}

const BEGINNINGS =
  'A rule begins with split, recovery, conversion, extent, yield, selectivity, excess, same composition or formula, or is a relation with “=”.'

/** Without that word a line must be a formula that can be read, so that a slip of the pen never becomes a rule. */
function bareFormula(scan: Scan, column: number): Body & { percent: Percent } {
  const text = quoteIds(rawFormula(scan))
  if (!text.includes('=')) throw new Unread(column, BEGINNINGS)
  if (/\d,\d/.test(text.replace(/"(?:[^"\\]|\\.)*"/g, '')))
    throw new Unread(column, 'Write the decimal sign as a point.')
  const parsed = parseFormulaText(text)
  if (!parsed.ok) throw new Unread(column, `${BEGINNINGS} As a relation it cannot be read: ${parsed.what}.`)
  return { ruleKind: 'formula', text, formulaAt: column, percent: 'plain' }
}

/** Up to the half-width, the note or the end, quotes passed over. */
function rawFormula(scan: Scan): string {
  const { rest } = scan
  const found = /^(?:"(?:[^"\\]|\\.)*"|[^"±#]|")*?(?=[±#]|$)/.exec(rest)?.[0] ?? ''
  scan.at += found.length
  return found.trim()
}
