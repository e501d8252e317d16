import type { Atoms } from './chemical-formula'

/** Mass left over (reactants less products) as a part of the reactants' mass; 0 for an exact reaction. */
export function massGap(stoichiometry: readonly number[], molarMass: readonly number[]): number {
  let used = 0
  let sum = 0
  stoichiometry.forEach((nu, k) => {
    const mass = nu * (molarMass[k] as number)
    sum += mass
    if (nu < 0) used -= mass
  })
  return used === 0 ? Number.POSITIVE_INFINITY : -sum / used
}

/** Elements of which a reaction makes or loses atoms, with the number per unit of extent; empty when balanced. */
export function elementGaps(
  stoichiometry: readonly number[],
  atoms: readonly Atoms[],
): [element: string, gap: number][] {
  const sums = new Map<string, { gap: number; size: number }>()
  stoichiometry.forEach((nu, k) => {
    for (const [element, count] of Object.entries(atoms[k] as Atoms)) {
      const entry = sums.get(element) ?? { gap: 0, size: 0 }
      sums.set(element, { gap: entry.gap + nu * count, size: entry.size + Math.abs(nu * count) })
    }
  })
  return [...sums]
    .filter(([, { gap, size }]) => Math.abs(gap) > 1e-9 * size)
    .map(([element, { gap }]) => [element, gap])
}
