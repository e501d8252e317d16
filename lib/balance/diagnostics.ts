import { massGap } from './chemistry/reaction-balance'
import type { Model } from './model'
import { isBalanced } from './rows/balances'
import type { Diagnostic } from './solution'

/** What is odd about how the book is put together: warnings and notes that change no value. */
export function structureDiagnostics(model: Model): Diagnostic[] {
  const found: Diagnostic[] = []
  const { problem } = model
  const linked = new Set(model.plant.flatMap(({ inlets, outlets }) => [...inlets, ...outlets]))
  problem.streams.forEach(({ id }, s) => {
    if (!linked.has(s))
      found.push({
        code: 'noUnit',
        severity: 'warning',
        stream: id,
        text: `Stream ${id} is linked to no unit: no balance uses it. Link it in the connections, or remove it.`,
      })
  })
  model.plant.forEach((unit, index) => {
    const skipped = isBalanced(model, index) ? '' : ' Until then its balances are left out.'
    if (unit.outlets.length === 0)
      found.push({
        code: 'noOutlet',
        severity: 'warning',
        unit: unit.id,
        text: `Unit ${unit.id} has no outlet stream: link one as out.${skipped}`,
      })
    if (unit.inlets.length === 0)
      found.push({
        code: 'noInlet',
        severity: 'warning',
        unit: unit.id,
        text: `Unit ${unit.id} has no inlet stream: link one as in.${skipped}`,
      })
    if (unit.kind === 'mixer' && unit.outlets.length > 1)
      found.push({
        code: 'mixerManyOutlets',
        severity: 'warning',
        unit: unit.id,
        text: `Mixer ${unit.id} has ${unit.outlets.length} outlets, and a mixer says nothing about how they differ. If they have one composition, make it a splitter; else a separator.`,
      })
  })
  const usedComponents = new Set(model.present.flat())
  problem.components.forEach(({ id }, c) => {
    if (!usedComponents.has(c))
      found.push({
        code: 'unusedComponent',
        severity: 'warning',
        component: id,
        text: `Component ${id} is in no stream: let it be present in one, or remove it.`,
      })
  })
  return [...found, ...reactionDiagnostics(model)]
}

function reactionDiagnostics(model: Model): Diagnostic[] {
  const found: Diagnostic[] = []
  for (const { id, components, moles } of model.reactions) {
    const missing = components.filter((c) => !Number.isFinite(model.molarMass[c]))
    if (missing.length > 0) {
      const names = missing.map((c) => model.problem.components[c]?.id).join(', ')
      found.push({
        code: 'missingMolarMass',
        severity: 'warning',
        id,
        text: `Reaction ${id} could not be checked for mass: no molar mass for ${names}. Give a formula or a molar mass.`,
      })
      continue
    }
    if (model.problem.basis !== 'mass') continue
    const gap = massGap(
      moles,
      components.map((c) => model.molarMass[c] as number),
    )
    if (Math.abs(gap) > 1e-9)
      found.push({
        code: 'massScaled',
        severity: 'note',
        id,
        text: `In reaction ${id} the molar masses leave ${(gap * 100).toPrecision(2)} % of the reactants' mass unaccounted for; the products are scaled so that mass closes exactly.`,
      })
  }
  return found
}
