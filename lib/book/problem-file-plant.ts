import { type Atoms, elementGaps, flowFactor, massGap, parseFlowUnit } from '@/lib/balance'
import type { Reaction } from '@/lib/balance/problem'
import type { ProblemFacts, Refuse } from './problem-file-facts'

/** Largest part of the reactants' mass that rounded molar masses may leave unaccounted for. */
const MASS_GAP = 5e-4

/** Inventories and element balances. */
export function unitIssues(facts: ProblemFacts, refuse: Refuse): void {
  facts.problem.units.forEach((unit, index) => {
    const at = new Set(facts.componentsAt(unit.id))
    unit.inventory?.forEach(({ component, value, unit: text }, k) => {
      const path = `units.${index}.inventory.${k}`
      if (component !== undefined && !facts.components.has(component))
        refuse(`${path}.component`, `"${component}" is no component`)
      else if (component !== undefined && value !== 0 && !at.has(component))
        refuse(`${path}.component`, `"${component}" can be in no stream at unit ${unit.id}`)
      if (text !== undefined) checkFlowUnit(facts, `${path}.unit`, text, facts.problem.basis, refuse)
    })
    if (unit.balance !== 'elements') return
    for (const component of at)
      if (facts.components.has(component) && !facts.atoms(component))
        refuse(`units.${index}.balance`, `element balances of ${unit.id} need a formula for ${component}`)
  })
}

/** Refuses a flow unit that is unknown, of another kind, or of another kind of time than the book's. */
export function checkFlowUnit(
  facts: ProblemFacts,
  path: string,
  text: string,
  kind: 'mass' | 'mole' | 'volume',
  refuse: Refuse,
): void {
  const typed = parseFlowUnit(text)
  if (!typed) refuse(path, `"${text}" is no known flow unit`)
  else if (typed.kind !== kind) refuse(path, `"${text}" does not fit: a ${kind} unit is needed here`)
  else if (flowFactor(typed, facts.bookUnits[kind]) === undefined)
    refuse(path, `"${text}" does not fit the book's ${facts.problem.flowUnit}: one is a rate, the other an amount`)
}

/** Reactions: known ids, and atoms or mass that balance. */
export function reactionIssues(facts: ProblemFacts, refuse: Refuse): void {
  facts.problem.reactions?.forEach((reaction, index) => {
    if (!facts.units.has(reaction.unit)) refuse(`reactions.${index}.unit`, `"${reaction.unit}" is no unit`)
    const ids = Object.keys(reaction.stoichiometry)
    const unknown = ids.filter((id) => !facts.components.has(id))
    for (const id of unknown) refuse(`reactions.${index}.stoichiometry.${id}`, `"${id}" is no component`)
    if (unknown.length > 0) return
    const what = balanceFault(facts, reaction)
    if (what) refuse(`reactions.${index}.stoichiometry`, what)
  })
}

function balanceFault(facts: ProblemFacts, { id, stoichiometry }: Reaction): string | undefined {
  const entries = Object.entries(stoichiometry).filter(([, nu]) => nu !== 0)
  if (!entries.some(([, nu]) => nu < 0) || !entries.some(([, nu]) => nu > 0))
    return `reaction ${id} needs reactants (below 0) and products (above 0)`
  const numbers = entries.map(([, nu]) => nu)
  const atoms = entries.map(([component]) => facts.atoms(component))
  if (atoms.every((its): its is Atoms => its !== undefined)) {
    const gaps = elementGaps(numbers, atoms)
    if (gaps.length > 0) {
      const list = gaps
        .map(([element, gap]) => `${element} ${gap > 0 ? '+' : ''}${Number(gap.toPrecision(6))}`)
        .join(', ')
      return `reaction ${id} is not balanced: ${list} atoms left over`
    }
  }
  const masses = entries.map(([component]) => facts.molarMass(component))
  const missing = entries.filter((_, k) => masses[k] === undefined).map(([component]) => component)
  if (missing.length > 0)
    return facts.problem.basis === 'mole'
      ? undefined
      : `reaction ${id} needs a molar mass for ${missing.join(', ')} on a mass basis`
  const gap = massGap(numbers, masses as number[])
  if (Math.abs(gap) > MASS_GAP)
    return `reaction ${id} is not balanced: ${(100 * gap).toPrecision(3)} % of the reactants' mass is left over`
  return undefined
}
