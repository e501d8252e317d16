import { sameUse, type Use } from '../workings/step'

/**
 * Why an equation of a boundary adds nothing: it holds no unknown (`known`), it repeats because streams have one
 * composition (`composition`: a splitter's balances are multiples of each other), or it follows from other equations.
 */
export type Overlap = { reason: 'known' | 'composition' | 'follows'; equation: Use; from: Use[] }

export function overlapOf(equation: Use, from: readonly Use[]): Overlap {
  if (from.length === 0) return { reason: 'known', equation, from: [] }
  const others = [...new Map(from.map((use) => [sameUse(use), use])).values()]
  const byComposition =
    equation.equation === 'composition' ||
    others.some((use) => use.equation === 'composition' || (use.equation === 'rule' && use.component !== undefined))
  return { reason: byComposition ? 'composition' : 'follows', equation, from: others }
}

const list = (names: readonly string[]): string =>
  names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`

const namesOf = (overlaps: readonly Overlap[]): string[] => [
  ...new Set(overlaps.map(({ equation }) => equationName(equation))),
]

/** What a person calls an equation. */
export function equationName({ equation, component, element, stream, quantity, parts, id }: Use): string {
  switch (equation) {
    case 'balance':
      return `the ${component ?? element} balance${id === undefined ? '' : ` of ${id}`}`
    case 'total':
      return `the total balance${id === undefined ? '' : ` of ${id}`}`
    case 'sum':
      return `the sum of stream ${stream}`
    case 'given': {
      const of = component ?? element ?? parts?.join(' + ')
      return `the typed ${quantity} of stream ${stream}${of === undefined ? '' : ` (${of})`}`
    }
    case 'rule':
      return `rule ${id}${component === undefined ? '' : ` for ${component}`}`
    case 'composition':
      return `the equal composition of ${id}${component === undefined ? '' : ` in ${component}`}`
  }
}

/** Sentences that say why a boundary has fewer independent equations than it counts; none where it has not. */
export function overlapSentences(overlaps: readonly Overlap[]): string[] {
  const of = (reason: Overlap['reason']): Overlap[] => overlaps.filter((overlap) => overlap.reason === reason)
  const sentences: string[] = []
  const [known, composition, follows] = [of('known'), of('composition'), of('follows')]
  const verb = (names: readonly string[], one: string, many: string): string => (names.length === 1 ? one : many)
  const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)
  if (known.length > 0) {
    const names = namesOf(known)
    sentences.push(
      capital(
        `${list(names)} ${verb(names, 'holds', 'hold')} nothing unknown, so ${verb(names, 'it adds', 'they add')} nothing.`,
      ),
    )
  }
  if (composition.length > 0) {
    const names = namesOf(composition)
    sentences.push(
      capital(
        `${list(names)} ${verb(names, 'repeats', 'repeat')} the others, because the streams have one composition.`,
      ),
    )
  }
  for (const { equation, from } of follows)
    sentences.push(capital(`${equationName(equation)} follows from ${list(from.map(equationName))}.`))
  return sentences
}
