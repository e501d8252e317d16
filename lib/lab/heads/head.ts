import { knownBasis, trailingBasis } from '../cells/basis'
import { remember } from '../cells/remember'
import { plainSpaces } from '../cells/spaces'
import { isStrongUnit, readUnit, trailingAs, type UnitRead } from '../cells/unit'

/** A head taken apart: the name without its unit, basis and "as X". */
export type Head = UnitRead & { name: string }

/** Takes "P as P2O5 (g/kg, dry)" apart. Brackets that are neither unit nor basis stay in the name. */
export const parseHead: (text: string) => Readonly<Head> = remember(parseHeadAfresh)

function parseHeadAfresh(text: string): Head {
  const head: Head = {
    name: plainSpaces(text)
      .replace(/[:*]+$/, '')
      .trim(),
  }
  for (let turn = 0; turn < 6; turn++) {
    const found = lastPart(head.name)
    if (!found) break
    head.name = found.before.replace(/[ ,;:/_-]+$/, '')
    for (const key of ['unit', 'basis', 'as'] as const) head[key] ??= found.read[key]
  }
  for (const key of ['unit', 'basis', 'as'] as const) if (head[key] === undefined) delete head[key]
  return head
}

type Part = { before: string; read: UnitRead }

function lastPart(name: string): Part | undefined {
  return inBrackets(name) ?? behindComma(name) ?? asPart(name) ?? basisPart(name) ?? bareUnit(name)
}

function inBrackets(name: string): Part | undefined {
  const close = name.at(-1)
  const open = close === ')' ? '(' : close === ']' ? '[' : close === '}' ? '{' : undefined
  if (open === undefined) return undefined
  let depth = 0
  for (let at = name.length - 1; at >= 0; at--) {
    if (name[at] === close) depth++
    if (name[at] === open && --depth === 0) {
      const before = name.slice(0, at).trim()
      const inner = name.slice(at + 1, -1)
      const read = before === '' ? undefined : (readUnit(inner) ?? someOf(inner))
      return read && { before, read }
    }
  }
  return undefined
}

function someOf(inner: string): UnitRead | undefined {
  const basis = knownBasis(inner)
  return basis ? { basis } : undefined
}

function behindComma(name: string): Part | undefined {
  for (const mark of [
    /^(.+), ?([^,]+)$/,
    /^(.+) \/ (.+)$/,
    /^(.+) in (\S.*)$/,
    /^(.+?) [-–—] (\S.*)$/,
    /^(.+?)_([^_].*)$/,
  ]) {
    const found = mark.exec(name)
    if (!found) continue
    const tail = found[2] as string
    const sure = isStrongUnit(tail) || mark.source.includes(', ?')
    const read = sure ? readUnit(tail) : undefined
    const rest = read && (read.unit || read.basis || read.as) ? read : undefined
    if (rest) return { before: found[1] as string, read: rest }
  }
  return undefined
}

function asPart(name: string): Part | undefined {
  const found = trailingAs(name)
  return found && found.before !== '' ? { before: found.before, read: { as: found.as } } : undefined
}

function basisPart(name: string): Part | undefined {
  const found = trailingBasis(name)
  return found && { before: found.before, read: { basis: found.basis } }
}

/** "Na mg/L", "Moisture %", "NaCl wt % dry": a unit without brackets, where nothing else is spelled so. */
function bareUnit(name: string): Part | undefined {
  const words = name.split(' ')
  for (let count = Math.min(3, words.length - 1); count >= 1; count--) {
    const tail = words.slice(-count).join(' ')
    if (isStrongUnit(tail)) return { before: words.slice(0, -count).join(' '), read: { unit: tail } }
  }
  return undefined
}
