/**
 * Names inside the formula of a rule, found by its words alone, so that blanks and order stay as typed and a formula that
 * cannot be calculated yet is followed too. `flow(s)`, `part(s, c)`, `share(s, c)`, `massShare`, `moleShare`; any other name
 * is a parameter. Names that are no plain words stand in quotes.
 */
export type NameKind = 'stream' | 'component' | 'parameter'
type Name = { kind: NameKind; name: string; start: number; end: number }

const functions: ReadonlySet<string> = new Set(['flow', 'part', 'share', 'massShare', 'moleShare'])
const TOKEN = /"(?:[^"\\]|\\.)*"|'(?:[^'\\]|\\.)*'|\d+(?:\.\d*)?(?:[eE][-+]?\d+)?|[\p{L}_$][\p{L}\p{N}_$]*|\S/gu
const PLAIN = /^[A-Za-z_][A-Za-z0-9_]*$/

/** Every stream, component and parameter that a formula names. */
export function namesIn(text: string): { kind: NameKind; name: string }[] {
  return find(text).map(({ kind, name }) => ({ kind, name }))
}

export const isNamedIn = (text: string, kind: NameKind, name: string): boolean =>
  find(text).some((found) => found.kind === kind && found.name === name)

/** The formula with a name changed; undefined where the new one cannot stand in it (a parameter that is no plain word). */
export function renameIn(text: string, kind: NameKind, from: string, to: string): string | undefined {
  const found = find(text).filter((name) => name.kind === kind && name.name === from)
  if (found.length === 0) return text
  const plain = PLAIN.test(to) && !functions.has(to)
  if (kind === 'parameter' && !plain) return undefined
  const written = plain ? to : JSON.stringify(to)
  let result = ''
  let at = 0
  for (const { start, end } of found) {
    result += text.slice(at, start) + written
    at = end
  }
  return result + text.slice(at)
}

function find(text: string): Name[] {
  const tokens = [...text.matchAll(TOKEN)].map((match) => ({ text: match[0], start: match.index }))
  const names: Name[] = []
  let argument = -1
  let depth = 0
  for (const [index, { text: token, start }] of tokens.entries()) {
    if (token === '(') {
      if (argument < 0 && functions.has(tokens[index - 1]?.text ?? '')) argument = 0
      if (argument >= 0) depth++
    } else if (token === ')' && argument >= 0) {
      depth--
      if (depth === 0) argument = -1
    } else if (token === ',' && depth === 1) argument++
    else {
      const name = nameOf(token)
      if (name === undefined) continue
      const end = start + token.length
      if (argument === 0) names.push({ kind: 'stream', name, start, end })
      else if (argument === 1) names.push({ kind: 'component', name, start, end })
      else if (argument < 0 && !functions.has(name) && !/^["']/.test(token))
        names.push({ kind: 'parameter', name, start, end })
    }
  }
  return names
}

function nameOf(token: string): string | undefined {
  if (/^["']/.test(token)) return token.length > 1 ? token.slice(1, -1).replace(/\\(.)/g, '$1') : undefined
  return /^[\p{L}_$]/u.test(token) ? token : undefined
}
