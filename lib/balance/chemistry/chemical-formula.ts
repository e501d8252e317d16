import { atomicWeights } from './atomic-weights'

/** Atoms of each element in one formula unit. */
export type Atoms = Record<string, number>

/**
 * Reads a chemical formula: "H2SO4", "Ca(OH)2", hydrates "CuSO4.5H2O" or with "·" or "*"; subscript digits too. A full
 * stop is a decimal point only after a leading 0 ("Fe0.95O"), else it parts a hydrate. Gives undefined where the text
 * is no formula or an element is unknown.
 */
export function parseFormula(text: string): Atoms | undefined {
  const plain = text
    .trim()
    .replace(/[₀-₉]/g, (digit) => String(digit.charCodeAt(0) - 0x2080))
    .replace(/[·•⋅*]/g, '·')
    .replace(/(^|[^0-9])0\.(\d+)/g, '$10,$2')
    .replace(/\./g, '·')
  if (plain === '') return undefined
  const atoms: Atoms = {}
  for (const part of plain.split('·')) {
    const lead = /^(\d+(?:,\d+)?)?(.+)$/.exec(part.trim())
    if (!lead) return undefined
    const times = lead[1] === undefined ? 1 : toNumber(lead[1])
    const group = readGroup(lead[2] as string)
    if (!group || times === 0) return undefined
    for (const [element, count] of Object.entries(group)) atoms[element] = (atoms[element] ?? 0) + times * count
  }
  return atoms
}

const toNumber = (text: string): number => Number(text.replace(',', '.'))

/** One part without a hydrate dot; brackets are kept on a stack. */
function readGroup(text: string): Atoms | undefined {
  const stack: Atoms[] = [{}]
  const token = /([A-Z][a-z]?)(\d+(?:,\d+)?)?|([([])|([)\]])(\d+(?:,\d+)?)?/y
  let read = 0
  for (let match = token.exec(text); match; match = token.exec(text)) {
    read = token.lastIndex
    const [, element, count, open, close, times] = match
    const top = stack[stack.length - 1] as Atoms
    if (element !== undefined) {
      if (atomicWeights[element] === undefined) return undefined
      top[element] = (top[element] ?? 0) + (count === undefined ? 1 : toNumber(count))
    } else if (open !== undefined) stack.push({})
    else if (close !== undefined) {
      if (stack.length < 2) return undefined
      stack.pop()
      const outer = stack[stack.length - 1] as Atoms
      for (const [name, inside] of Object.entries(top))
        outer[name] = (outer[name] ?? 0) + inside * (times === undefined ? 1 : toNumber(times))
    }
  }
  const sound = read === text.length && stack.length === 1
  return sound && Object.keys(stack[0] as Atoms).length > 0 ? stack[0] : undefined
}

/** kg/kmol of a formula, or undefined where it cannot be read. */
export function molarMassOf(formula: string): number | undefined {
  const atoms = parseFormula(formula)
  return atoms && massOf(atoms)
}

function massOf(atoms: Atoms): number {
  let sum = 0
  for (const [element, count] of Object.entries(atoms)) sum += (atomicWeights[element] as number) * count
  return sum
}

/** Mass of one element in a component of these atoms, per mass of the component; the shares of all elements add up to 1. */
export const elementShare = (atoms: Atoms, element: string): number =>
  ((atoms[element] ?? 0) * (atomicWeights[element] ?? 0)) / massOf(atoms)
