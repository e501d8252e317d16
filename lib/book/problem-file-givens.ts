import { measureKey, parseFractionUnit } from '@/lib/balance'
import type { Given, Quantity } from '@/lib/balance/problem'
import type { ProblemFacts, Refuse } from './problem-file-facts'
import { dividesSomething, listIssues, needsOf, partKeys } from './problem-file-measures'
import { checkFlowUnit } from './problem-file-plant'
import { unitKindOf } from './units'

/** Givens: known and present ids, a unit that fits, a molar mass, formula or density where one is needed, one value a place. */
export function givenIssues(facts: ProblemFacts, refuse: Refuse): void {
  const seen = new Map<string, number>()
  for (const [index, given] of (facts.problem.givens ?? []).entries()) {
    const path = `givens.${index}`
    const { stream, instrument = 'main' } = given
    const place = JSON.stringify([stream, measureKey(given), instrument])
    const first = seen.get(place)
    if (first !== undefined) refuse(path, `is the same measure and instrument as givens.${first}`)
    else seen.set(place, index)
    if (!facts.streams.has(stream)) refuse(`${path}.stream`, `"${stream}" is no stream`)
    checkUnit(facts, path, given, refuse)
    const fits = [checkKeys(path, given, refuse), checkComponent(facts, path, given, refuse)].every(Boolean)
    if (!fits || !listIssues(facts, path, given, refuse) || !facts.streams.has(stream)) continue
    if (dividesSomething(facts, path, given, refuse)) needsOf(facts, path, given, refuse)
  }
}

/** False where a key that the quantity needs is missing, or one stands that it does not take. */
function checkKeys(path: string, given: Given, refuse: Refuse): boolean {
  const { needed, allowed } = partKeys(given.quantity)
  let fits = true
  const say = (key: string, what: string): void => {
    refuse(`${path}.${key}`, what)
    fits = false
  }
  for (const key of ['component', 'without', 'element', 'parts', 'over'] as const) {
    if (given[key] === undefined) {
      if (needed.includes(key)) say(key, `${given.quantity} needs ${keyWords[key]}`)
    } else if (key === 'component' && !allowed.includes(key))
      say(key, `${given.quantity} is of the whole stream: leave the component out`)
    else if (!allowed.includes(key)) say(key, `${given.quantity} takes no "${key}": leave it out`)
  }
  return fits
}

const keyWords = {
  component: 'a component',
  without: 'the components that it leaves out',
  element: 'an element',
  parts: 'a group of components',
  over: 'a group to divide by',
} as const

/** False where the component is unknown or absent, so that nothing more can be asked of the given. */
function checkComponent(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): boolean {
  const { stream, component, value } = given
  if (component === undefined) return true
  const at = `${path}.component`
  if (!facts.components.has(component)) refuse(at, `"${component}" is no component`)
  else if (!facts.streams.has(stream) || facts.isPresent(stream, component)) return true
  else if (value !== 0) refuse(at, `${component} cannot be in stream ${stream}, so it cannot be ${value}`)
  return false
}

function checkUnit(facts: ProblemFacts, path: string, { quantity, unit }: Given, refuse: Refuse): void {
  if (unit === undefined) return
  const kind = unitKindOf(quantity, facts.problem.basis)
  if (kind === 'mass' || kind === 'mole' || kind === 'volume') {
    checkFlowUnit(facts, `${path}.unit`, unit, kind, refuse)
    return
  }
  const read = parseFractionUnit(unit)
  if (!read) refuse(`${path}.unit`, `"${unit}" is no known unit of a ${fractionWord(quantity)}`)
  else if (read.only && read.only !== kind) refuse(`${path}.unit`, `"${unit}" does not fit a ${quantity}`)
}

const fractionWord = (quantity: Quantity): string => (quantity.endsWith('Ratio') ? 'ratio' : 'fraction')
