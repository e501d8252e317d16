import { atomicWeights } from '@/lib/balance'
import type { Given, MeasureName, Quantity } from '@/lib/balance/problem'
import type { ProblemFacts, Refuse } from './problem-file-facts'

type PartKey = Exclude<keyof MeasureName, 'quantity'>
type PartKeys = { needed: readonly PartKey[]; allowed: readonly PartKey[] }

const keys = (needed: readonly PartKey[], more: readonly PartKey[] = []): PartKeys => ({
  needed,
  allowed: [...needed, ...more],
})
const ofStream = keys([])
const ofComponent = keys(['component'])

/** The keys besides stream and quantity that name a measure. */
export function partKeys(quantity: Quantity): PartKeys {
  switch (quantity) {
    case 'flow':
    case 'massFlow':
    case 'moleFlow':
    case 'volumeFlow':
      return ofStream
    case 'dryMassFraction':
    case 'dryMoleFraction':
      return keys(['component', 'without'])
    case 'elementMassFraction':
      return keys(['element'])
    case 'groupMassRatio':
    case 'groupMoleRatio':
      return keys(['parts'], ['over'])
    default:
      return ofComponent
  }
}

/** Lists name known components, each once; the element is known. False where not. */
export function listIssues(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): boolean {
  let sound = true
  const say = (at: string, what: string): void => {
    refuse(`${path}.${at}`, what)
    sound = false
  }
  for (const key of ['without', 'parts', 'over'] as const) {
    const seen = new Set<string>()
    given[key]?.forEach((id, k) => {
      if (!facts.components.has(id)) say(`${key}.${k}`, `"${id}" is no component`)
      else if (seen.has(id)) say(`${key}.${k}`, `"${id}" is listed twice`)
      seen.add(id)
    })
  }
  if (given.element !== undefined && !Object.hasOwn(atomicWeights, given.element))
    say('element', `"${given.element}" is no element known here, such as Cu or S`)
  return sound
}

/** Something of the measure can be in the stream, or it is 0; and something is left to divide by. */
export function dividesSomething(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): boolean {
  const { stream, quantity, without, parts, over, value } = given
  const present = facts.presentIn(stream)
  if (without?.length && present.every((id) => without.includes(id))) {
    refuse(`${path}.without`, `leaves nothing of stream ${stream} to divide by`)
    return false
  }
  if (over && !over.some((id) => present.includes(id))) {
    refuse(`${path}.over`, `none of ${over.join(', ')} can be in stream ${stream}, so nothing is left to divide by`)
    return false
  }
  if (parts && !parts.some((id) => present.includes(id))) {
    if (value !== 0)
      refuse(`${path}.parts`, `none of ${parts.join(', ')} can be in stream ${stream}, so it cannot be ${value}`)
    return false
  }
  return quantity !== 'elementMassFraction' || hasElement(facts, path, given, refuse)
}

/** Every component of the stream has a formula, and one of them holds the element. */
function hasElement(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): boolean {
  const { stream, element = '', value } = given
  const present = facts.presentIn(stream)
  const without = present.filter((id) => facts.atoms(id) === undefined)
  if (without.length > 0) {
    refuse(`${path}.element`, `needs a formula for ${without.join(', ')}, which can be in stream ${stream}`)
    return false
  }
  if (present.some((id) => facts.atoms(id)?.[element] !== undefined)) return true
  if (value !== 0)
    refuse(`${path}.element`, `no component that can be in stream ${stream} holds ${element}, so it cannot be ${value}`)
  return false
}

/** Molar masses and density that a measure needs. */
export function needsOf(facts: ProblemFacts, path: string, given: Given, refuse: Refuse): void {
  const { stream, quantity, component, without, parts, over } = given
  const { basis } = facts.problem
  if (quantity === 'volumeFlow' && facts.streams.get(stream)?.density === undefined)
    refuse(`${path}.quantity`, `volumeFlow needs the density of stream ${stream}`)
  const own = quantity === 'flow' || quantity === 'componentFlow' || (quantity === 'volumeFlow' && basis === 'mass')
  const other = basis === 'mass' ? 'mole' : 'mass'
  const crosses = quantity === 'volumeFlow' || quantity.toLowerCase().includes(other)
  if (own || !crosses) return
  const present = facts.presentIn(stream)
  const single = quantity === 'componentMassFlow' || quantity === 'componentMoleFlow'
  const wanted = single
    ? [component as string]
    : without
      ? present.filter((id) => id === component || !without.includes(id))
      : parts && over
        ? present.filter((id) => parts.includes(id) || over.includes(id))
        : present
  const lacking = wanted.filter((id) => facts.molarMass(id) === undefined)
  if (lacking.length > 0)
    refuse(`${path}.quantity`, `${quantity} on a ${basis} basis needs a molar mass for ${lacking.join(', ')}`)
}
