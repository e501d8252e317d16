import { parseFormula } from '@/lib/balance'
import { knownBasis, trailingBasis } from './basis'
import { remember } from './remember'
import { plainDigits, plainSpaces } from './spaces'

/** What a unit text says: the unit as spelled, and a basis or an "as X" written with it. */
export type UnitRead = { unit?: string; basis?: string; as?: string }

const PERCENT =
  /^(?:(?:wt|w|mass|mol|mole|molar|vol|v|gew|ma|m|n|weight|masse|massen|volume|volumen|stoffmengen)[\s.-]*)?(?:%|‰|per ?cent|prozent|pct\.?)(?:[\s.-]*\(?(?:w\/w|v\/v|w\/v|m\/m|m\/v|n\/n|mol\/mol|kg\/kg|g\/g|by (?:mass|weight|volume|mole)|mole?|wt|vol|mass|gew|w|v|m|rel|abs)\.?\)?)?$/i
const PARTS = /^(?:v?pp[mbt]|pp[mbt][\s-]?\(?(?:[vwm]|vol|wt|mol|mass|mole|v\/v|w\/w|m\/m|mol\/mol)\)?|[vm]pm)\.?$/i
const PLACES = '(?:[²³¹]|[⁻−-][¹²³123]|\\^?[-−]?[123])?'
const ATOM =
  '(?:[GMkhdcmµμunp]?(?:g|l|L|m|mol|eq|val|S|Pa|J|W|A|V|Hz|bar|s|cal|P|St|Bq)|Nm|Sm|K|h|hr|min|d|t|a|°[CFPK]|deg ?C|°? ?Brix|°Bx|°dH|°fH|pH|NTU|FNU|FTU|EBC|cfu|CFU|KBE|MPN|atm|psi|lb|oz|gal|ton|tonne|kmol|day|year|yr|mmHg|ctL|kWh|MWh|TU|g_?TS|kgTS)'
const COUNT = '(?:\\d{1,4} ?)?'
const LABEL = '(?: ?(?:[A-Z][A-Za-z0-9]{0,7}|solution|sample|dry|wet|TS|TM|oTS|FM|OS))?'
const COMPOUND = new RegExp(
  `^${COUNT}${ATOM}${PLACES}${LABEL}(?:(?: ?[/·⋅*] ?| per )\\(?${COUNT}${ATOM}${PLACES}\\)?${LABEL})+$|^${ATOM} ${ATOM}[⁻−-][¹²³123]$`,
)
const SINGLE = new RegExp(`^${COUNT}${ATOM}${PLACES}$`)
const LOOSE = /^(?:units?|einheit|dimensionless|none|ohne)$/i

/** Whether a text spells a unit that nothing else is spelled like: "mg/L", "wt%", "ppm", "°C". */
export function isStrongUnit(text: string): boolean {
  const spelled = plainSpaces(text)
  if (spelled.length > 32 || spelled === '') return false
  return PERCENT.test(spelled) || PARTS.test(spelled) || COMPOUND.test(spelled) || /^°/.test(spelled)
}

/** Whether a text can be a unit where a unit is looked for; "K", "g" and "S" too, and two units with a slash. */
export function isUnit(text: string): boolean {
  const spelled = plainSpaces(text)
  if (spelled.length > 40 || spelled === '') return false
  if (isStrongUnit(spelled) || SINGLE.test(spelled) || /^(?:[-–—]|1)$/.test(spelled) || LOOSE.test(spelled)) return true
  const either = spelled.split(/ (?:\/|or|oder|bzw\.) /)
  return either.length === 2 && either.every((part) => isStrongUnit(part))
}

const AS =
  /(?:^|[ ,(])(?:expressed |calculated |calc\. |reported |given )?(?:as|als|berechnet als|ber\. als|angegeben als) ([A-Z][A-Za-z0-9₀-₉()]*(?:-[A-Z])?)$/

/** "as N", "als P2O5" at the end of a text: what stands before it, and the formula. */
export function trailingAs(text: string): { before: string; as: string } | undefined {
  const found = AS.exec(text)
  if (!found) return undefined
  const as = plainDigits(found[1] as string)
  if (!parseFormula(as)) return undefined
  return { before: text.slice(0, found.index).replace(/[ ,;(]+$/, ''), as }
}

/**
 * A text that should be a unit, taken apart: "mg/L as N" is unit "mg/L" as "N"; "wt% (dry)" has basis "dry".
 * @returns undefined where some of it is neither unit, basis nor "as X".
 */
export const readUnit: (text: string) => UnitRead | undefined = remember(readUnitAfresh)

function readUnitAfresh(text: string): UnitRead | undefined {
  let left = unbracket(plainSpaces(text))
  const read: UnitRead = {}
  for (let turn = 0; turn < 4 && left !== ''; turn++) {
    if (isUnit(left)) {
      if (!/^(?:[-–—]|1)$/.test(left) && !LOOSE.test(left)) read.unit = left
      return read
    }
    const as = trailingAs(left)
    if (as) {
      read.as = as.as
      left = as.before
      continue
    }
    const whole = knownBasis(left)
    if (whole) return { ...read, basis: whole }
    const basis = trailingBasis(left) ?? bracketedBasis(left) ?? shortBasis(left)
    if (basis) {
      read.basis = basis.basis
      left = unbracket(basis.before)
      continue
    }
    const [first = '', ...others] = left.split(/[,;] ?/)
    const parts = others.length > 0 ? [first, ...others].map(readUnit) : []
    return parts.length > 0 && parts.every((part) => part !== undefined)
      ? Object.assign(read, ...(parts as UnitRead[]))
      : undefined
  }
  return left === '' && (read.as !== undefined || read.basis !== undefined) ? read : undefined
}

/** Brackets round the whole taken off. */
export function unbracket(text: string): string {
  const inner = /^[[({<]([^[\](){}<>]*(?:\([^()]*\)[^[\](){}<>]*)?)[\])}>]$/.exec(text.trim())?.[1]
  return inner === undefined ? text.trim() : inner.trim()
}

function bracketedBasis(text: string): { before: string; basis: string } | undefined {
  const found = /^(.+?) ?[[(]([^()[\]]+)[)\]]$/.exec(text)
  const basis = found ? knownBasis(found[2] as string) : undefined
  return basis === undefined ? undefined : { before: (found as RegExpExecArray)[1] as string, basis }
}

/** "% TS", "%FM": a short basis word straight behind a percent sign or unit. */
function shortBasis(text: string): { before: string; basis: string } | undefined {
  const found =
    /^(.*[%‰mb\w]) ?\b(TS|TM|TR|FM|OS|DM|DS|DW|DB|AR|WB|dm|dw)$/.exec(text) ?? /^(.*[%‰]) ?(\S+)$/.exec(text)
  const basis = found ? knownBasis(found[2] as string) : undefined
  return basis === undefined ? undefined : { before: ((found as RegExpExecArray)[1] as string).trim(), basis }
}
