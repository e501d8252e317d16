import { parseFractionUnit } from '@/lib/balance'
import type { Given, Quantity } from '@/lib/balance/problem'
import type { ProblemFacts, Refuse } from './problem-file-facts'
import { checkFlowUnit } from './problem-file-plant'

const ofComponent = new Set<Quantity>([
  'componentFlow',
  'componentMassFlow',
  'componentMoleFlow',
  'massFraction',
  'moleFraction',
])

/** Givens: known and present ids, a unit that fits, a molar mass or density where one is needed, one value a place. */
export function givenIssues(facts: ProblemFacts, refuse: Refuse): void {
  const seen = new Map<string, number>()
  for (const [index, given] of (facts.problem.givens ?? []).entries()) {
    const path = `givens.${index}`
    const { stream, quantity, component, instrument = 'main' } = given
    const place = JSON.stringify([stream, quantity, component ?? null, instrument])
    const first = seen.get(place)
    if (first !== undefined) refuse(path, `is the same measure and instrument as givens.${first}`)
    else seen.set(place, index)
    if (!facts.streams.has(stream)) refuse(`${path}.stream`, `"${stream}" is no stream`)
    checkUnit(facts, path, given, refuse)
    const fits = checkComponent(facts, path, given, refuse)
    if (fits && facts.streams.has(stream)) checkNeeds(facts, path, given, refuse)
  }
}

/** False where the component is missing, unknown or absent, so that nothing more can be asked of the given. */
function checkComponent(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): boolean {
  const { stream, quantity, component, value } = given
  const at = `${path}.component`
  if (!ofComponent.has(quantity)) {
    if (component !== undefined) refuse(at, `${quantity} is of the whole stream: leave the component out`)
    return true
  }
  if (component === undefined) refuse(at, `${quantity} needs a component`)
  else if (!facts.components.has(component)) refuse(at, `"${component}" is no component`)
  else if (!facts.streams.has(stream) || facts.isPresent(stream, component)) return true
  else if (value !== 0) refuse(at, `${component} cannot be in stream ${stream}, so it cannot be ${value}`)
  return false
}

function checkUnit(facts: ProblemFacts, path: string, { quantity, unit }: Given, refuse: Refuse): void {
  if (unit === undefined) return
  if (quantity === 'massFraction' || quantity === 'moleFraction') {
    const read = parseFractionUnit(unit)
    if (!read) refuse(`${path}.unit`, `"${unit}" is no known unit of a fraction`)
    else if (read.only && read.only !== quantity) refuse(`${path}.unit`, `"${unit}" does not fit a ${quantity}`)
    return
  }
  checkFlowUnit(facts, `${path}.unit`, unit, kindOf(quantity, facts.problem.basis), refuse)
}

function kindOf(quantity: Quantity, basis: 'mass' | 'mole'): 'mass' | 'mole' | 'volume' {
  if (quantity === 'volumeFlow') return 'volume'
  if (quantity === 'massFlow' || quantity === 'componentMassFlow') return 'mass'
  if (quantity === 'moleFlow' || quantity === 'componentMoleFlow') return 'mole'
  return basis
}

/** Molar masses and density that a measure needs. */
function checkNeeds(facts: ProblemFacts, path: string, { stream, quantity, component }: Given, refuse: Refuse): void {
  const { basis } = facts.problem
  const missing = (ids: string[]): string[] => ids.filter((id) => facts.molarMass(id) === undefined)
  if (quantity === 'volumeFlow' && facts.streams.get(stream)?.density === undefined)
    refuse(`${path}.quantity`, `volumeFlow needs the density of stream ${stream}`)
  const own = quantity === 'flow' || quantity === 'componentFlow' || (quantity === 'volumeFlow' && basis === 'mass')
  const other = basis === 'mass' ? 'mole' : 'mass'
  const crosses = quantity === 'volumeFlow' || quantity.toLowerCase().includes(other)
  if (own || !crosses) return
  const single = quantity === 'componentMassFlow' || quantity === 'componentMoleFlow'
  const lacking = missing(single ? [component as string] : facts.presentIn(stream))
  if (lacking.length > 0)
    refuse(`${path}.quantity`, `${quantity} on a ${basis} basis needs a molar mass for ${lacking.join(', ')}`)
}
