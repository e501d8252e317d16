import { type Atoms, type BookUnits, bookUnits, molarMassOf, parseFormula } from '@/lib/balance'
import type { Component, Parameter, Problem, Reaction, Stream, Unit } from '@/lib/balance/problem'

export type Refuse = (path: string, what: string) => void

const byId = <T extends { id: string }>(list: readonly T[] | undefined): Map<string, T> =>
  new Map((list ?? []).map((item) => [item.id, item]))

/** Look-ups that the checks of a problem share. The flow unit must already fit the basis. */
export class ProblemFacts {
  readonly units: Map<string, Unit>
  readonly streams: Map<string, Stream>
  readonly components: Map<string, Component>
  readonly reactions: Map<string, Reaction>
  readonly parameters: Map<string, Parameter>
  readonly bookUnits: BookUnits
  private readonly present: Map<string, Set<string>>
  private readonly masses: Map<string, number | undefined>

  constructor(readonly problem: Problem) {
    this.units = byId(problem.units)
    this.streams = byId(problem.streams)
    this.components = byId(problem.components)
    this.reactions = byId(problem.reactions)
    this.parameters = byId(problem.parameters)
    this.bookUnits = bookUnits(problem.basis, problem.flowUnit) as BookUnits
    const all = new Set(this.components.keys())
    this.present = new Map(problem.streams.map(({ id, components }) => [id, components ? new Set(components) : all]))
    this.masses = new Map(
      problem.components.map(({ id, molarMass, formula }) => [
        id,
        molarMass ?? (formula === undefined ? undefined : molarMassOf(formula)),
      ]),
    )
  }

  isPresent(stream: string, component: string): boolean {
    return this.present.get(stream)?.has(component) ?? false
  }

  presentIn(stream: string): string[] {
    return [...(this.present.get(stream) ?? [])].filter((id) => this.components.has(id))
  }

  /** kg/kmol, undefined where neither typed nor readable from the formula. */
  molarMass(component: string): number | undefined {
    return this.masses.get(component)
  }

  atoms(component: string): Atoms | undefined {
    const formula = this.components.get(component)?.formula
    return formula === undefined ? undefined : parseFormula(formula)
  }

  linked(unit: string, direction: 'in' | 'out'): string[] {
    return Object.entries(this.problem.links[unit] ?? {})
      .filter(([, its]) => its === direction)
      .map(([stream]) => stream)
  }

  /** Components in a stream at the unit or taking part in a reaction in it. */
  componentsAt(unit: string): string[] {
    const found = new Set<string>()
    for (const stream of Object.keys(this.problem.links[unit] ?? {}))
      for (const component of this.presentIn(stream)) found.add(component)
    for (const reaction of this.problem.reactions ?? [])
      if (reaction.unit === unit) for (const component of Object.keys(reaction.stoichiometry)) found.add(component)
    return [...found]
  }
}
