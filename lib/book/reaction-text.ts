import { atomicWeights } from '@/lib/balance/chemistry/atomic-weights'
import { type Atoms, parseFormula } from '@/lib/balance/chemistry/chemical-formula'
import { elementGaps } from '@/lib/balance/chemistry/reaction-balance'
import type { RecordOf } from './kinds'

type Component = Pick<RecordOf<'component'>, 'id' | 'tag' | 'name' | 'formula'>
export type ReactionText =
  | { ok: true; coefficients: { componentId: string; value: number }[] }
  | { ok: false; what: string }

const ARROW = /<=>|⇌|-+>|=+>|→|⟶|=/g
/** "2", "0.5", "1/2", "3,5" before a name; the name itself may begin with a digit only without a blank between. */
const LEAD = /^(\d+(?:[.,]\d+)?)(?:\s*\/\s*(\d+(?:[.,]\d+)?))?\s*[·*]?\s*(?=\S)/

/**
 * Reads "2 H2 + O2 -> 2 H2O" against the components of a book: tags first, then formulas, then names; "=" and "→" part
 * the sides too. Coefficients are negative for what is consumed. Refused with a sentence where it cannot be read, names
 * what is no component, or does not balance element by element where every formula is known.
 */
export function readReaction(text: string, components: readonly Component[]): ReactionText {
  const refuse = (what: string): ReactionText => ({ ok: false, what })
  const arrows = [...text.matchAll(ARROW)]
  if (arrows.length !== 1) return refuse('Write what is consumed, one arrow, and what is formed: 2 H2 + O2 -> 2 H2O.')
  const [arrow] = arrows
  const at = arrow?.index ?? 0
  const sums = new Map<string, number>()
  const sides: [string, number][] = [
    [text.slice(0, at), -1],
    [text.slice(at + (arrow?.[0].length ?? 0)), 1],
  ]
  for (const [side, sign] of sides) {
    const terms = termsOf(side, components)
    if (terms.length === 0) return refuse(`Nothing stands ${sign < 0 ? 'before' : 'after'} the arrow.`)
    for (const term of terms) {
      const read = readTerm(term, components)
      if (typeof read === 'string') return refuse(read)
      sums.set(read.component.id, (sums.get(read.component.id) ?? 0) + sign * read.factor)
    }
  }
  const coefficients = [...sums]
    .map(([componentId, value]) => ({ componentId, value }))
    .filter(({ value }) => value !== 0)
  if (coefficients.length === 0) return refuse('The same stands on both sides: nothing reacts.')
  const off = imbalance(coefficients, components)
  return off === null ? { ok: true, coefficients } : refuse(off)
}

/** Parts between plus signs; a plus within a tag is kept where the tag says so. */
function termsOf(side: string, components: readonly Component[]): string[] {
  const whole = side.trim()
  if (whole === '') return []
  if (find(whole, components)) return [whole]
  return whole.split(/\s\+(?=\s|$)|\+(?=\s|\d|[A-Za-z([])/).map((term) => term.trim())
}

function readTerm(term: string, components: readonly Component[]): { component: Component; factor: number } | string {
  if (term === '') return 'A plus sign has nothing beside it.'
  const whole = find(term, components)
  if (whole) return { component: whole, factor: 1 }
  const lead = LEAD.exec(term)
  const name = lead ? term.slice(lead[0].length).trim() : term
  const component = find(name, components)
  if (!component)
    return `“${name}” is no component of this book, by tag, formula or name: add it first, or mend the spelling.`
  const [top, under] = [lead?.[1], lead?.[2]].map((digits) =>
    digits === undefined ? 1 : Number(digits.replace(',', '.')),
  )
  const factor = (top as number) / (under as number)
  return Number.isFinite(factor) && factor > 0 ? { component, factor } : `“${term}”: a coefficient is more than 0.`
}

function find(name: string, components: readonly Component[]): Component | undefined {
  const same = (other: string | null): boolean => other !== null && other.trim() !== '' && other.trim() === name
  const atoms = parseFormula(name)
  return (
    components.find(({ tag }) => same(tag)) ??
    components.find(({ formula }) => same(formula)) ??
    components.find((component) => same(component.name)) ??
    components.find((component) => component.name.trim().toLowerCase() === name.toLowerCase()) ??
    (atoms && only(components.filter(({ formula }) => isSame(atoms, parseFormula(formula ?? '')))))
  )
}

/** A formula written another way ("H2O" for "OH2") is meant where one component alone has its atoms. */
const only = (found: readonly Component[]): Component | undefined => (found.length === 1 ? found[0] : undefined)

const isSame = (a: Atoms, b: Atoms | undefined): boolean =>
  b !== undefined &&
  Object.keys(a).length === Object.keys(b).length &&
  Object.entries(a).every(([element, number]) => b[element] === number)

/** Which element does not balance and by how much, in words; null where all do, or a formula is missing. */
export function imbalance(
  coefficients: readonly { componentId: string; value: number }[],
  components: readonly Component[],
): string | null {
  const byId = new Map(components.map((component) => [component.id, component]))
  const atoms = coefficients.map(({ componentId }) => parseFormula(byId.get(componentId)?.formula ?? ''))
  if (atoms.some((its) => its === undefined)) return null
  const gaps = elementGaps(
    coefficients.map(({ value }) => value),
    atoms as Atoms[],
  ).sort(([a], [b]) => order(a) - order(b))
  if (gaps.length === 0) return null
  const words = gaps.map(([element, gap]) => {
    const size = Number(Math.abs(gap).toPrecision(6))
    return `${element} by ${size} (${gap > 0 ? 'more formed than consumed' : 'more consumed than formed'})`
  })
  return `It does not balance: off in ${words.join(' and in ')}.`
}

const order = (element: string): number => Object.keys(atomicWeights).indexOf(element)

/** The reaction as it would be typed, by tags: "2 H2 + O2 -> 2 H2O"; empty without coefficients. */
export function reactionText(
  coefficients: readonly { componentId: string; value: number }[],
  components: readonly Component[],
  number: (value: number) => string = String,
): string {
  const side = (sign: 1 | -1): string =>
    components
      .map(({ id, tag }) => ({
        tag: tag.trim(),
        size: sign * (coefficients.find((its) => its.componentId === id)?.value ?? 0),
      }))
      .filter(({ size }) => size > 0)
      .map(({ tag, size }) => (size === 1 ? tag : `${number(size)} ${tag}`))
      .join(' + ')
  const [left, right] = [side(-1), side(1)]
  return left === '' && right === '' ? '' : `${left} -> ${right}`
}
