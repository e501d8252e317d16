import type { Given, Rule } from '@/lib/balance/problem'
import { inverse, over, reduceModulo, residue, times } from './residues'
import type { WideBook } from './wide-book'

/**
 * What follows from what is typed, whatever the sizes of the numbers: the rows are written out in residues of the same
 * plant with random numbers, where ranks are exact. Shares no code with the solver; no threshold in it.
 */
export type ResidueVerdict = {
  /** By "stream quantity component". */
  determined: Map<string, boolean>
  value: Map<string, number>
  /** Rows that repeat others: values that must agree. */
  redundant: number
}

type Row = number[]

export function judgeByResidues({ problem, flow, flowResidue, extentResidue }: WideBook): ResidueVerdict {
  const place = new Map<string, number>()
  const truth: number[] = []
  const real: number[] = []
  problem.streams.forEach(({ id, components }, s) => {
    problem.components.forEach((component, c) => {
      if (components && !components.includes(component.id)) return
      place.set(`${id} ${component.id}`, truth.push(flowResidue[s]?.[c] as number) - 1)
      real.push(flow[s]?.[c] as number)
    })
  })
  problem.reactions?.forEach(({ id }, r) => {
    place.set(`xi ${id}`, truth.push(extentResidue[r] as number) - 1)
  })
  const zero = (): Row => new Array<number>(truth.length).fill(0)
  const plus = (a: Row, b: Row, factor: number): Row =>
    a.map((value, k) => residue(value + times(residue(factor), b[k] as number)))
  const mass = (c: number): number => problem.components[c]?.molarMass as number
  const one = (stream: string, component: string, other = false): Row => {
    const row = zero()
    const at = place.get(`${stream} ${component}`)
    const c = problem.components.findIndex(({ id }) => id === component)
    if (at !== undefined) row[at] = other ? (problem.basis === 'mass' ? inverse(mass(c)) : mass(c)) : 1
    return row
  }
  const sum = (list: Row[]): Row => list.reduce((a, b) => plus(a, b, 1), zero())
  const total = (stream: string, other = false): Row => sum(problem.components.map(({ id }) => one(stream, id, other)))
  const extentOf = (reaction: string): Row => {
    const row = zero()
    row[place.get(`xi ${reaction}`) as number] = 1
    return row
  }
  const at = (row: Row): number => row.reduce((value, a, k) => residue(value + times(a, truth[k] as number)), 0)
  const ends = (unit: string, side: string): string[] =>
    Object.entries(problem.links[unit] ?? {}).flatMap(([stream, its]) => (its === side ? [stream] : []))

  const rows: Row[] = []
  const hold = (top: Row, bottom?: Row): void => {
    if (!bottom) rows.push(top)
    else if (at(bottom) !== 0) rows.push(plus(top, bottom, -over(at(top), at(bottom))))
  }
  for (const unit of problem.units)
    for (const { id } of problem.components) {
      let row = sum(ends(unit.id, 'in').map((s) => one(s, id)))
      for (const s of ends(unit.id, 'out')) row = plus(row, one(s, id), -1)
      for (const reaction of problem.reactions ?? [])
        if (reaction.unit === unit.id)
          row = plus(
            row,
            extentOf(reaction.id),
            (reaction.stoichiometry[id] ?? 0) * (problem.basis === 'mass' ? 50 : 1),
          )
      if (row.some((value) => value !== 0)) rows.push(row)
    }
  for (const given of problem.givens ?? []) holdGiven(given)
  for (const rule of problem.relations ?? []) holdRule(rule)
  const redundant = rows.length - reduceModulo(rows.map((row) => [...row])).pivots.length
  for (const unit of problem.units) {
    if (unit.kind !== 'splitter') continue
    const [first, ...rest] = ends(unit.id, 'out') as [string, ...string[]]
    for (const other of rest)
      for (const { id } of problem.components) {
        const [a, b, A, B] = [one(first, id), one(other, id), total(first), total(other)]
        rows.push(
          plus(
            plus(
              plus(
                a.map((v) => times(v, at(B))),
                B,
                at(a),
              ),
              b,
              -at(A),
            ),
            A,
            -at(b),
          ),
        )
      }
  }
  let basis = nullSpace(rows, truth.length)
  const moves = (row: Row): boolean =>
    basis.some((h) => h.reduce((value, a, k) => residue(value + times(a, row[k] as number)), 0) !== 0)
  for (let before = -1; before !== basis.length; ) {
    before = basis.length
    const look = (keys: string[]): void => {
      const its = keys.flatMap((key) => place.get(key) ?? []).filter((k) => basis.some((h) => h[k] !== 0))
      if (its.length === 0 || its.some((k) => real[k] !== 0)) return
      const row = zero()
      for (const k of its) row[k] = 1
      if (!moves(row)) for (const k of its) rows.push(zero().map((_, j) => Number(j === k)))
    }
    const keysOf = (s: string): string[] => problem.components.map(({ id }) => `${s} ${id}`)
    for (const { stream, quantity, component, value } of problem.givens ?? [])
      if (quantity.endsWith('Fraction') && value === 1)
        look(keysOf(stream).filter((key) => !key.endsWith(` ${component}`)))
    for (const { id } of problem.streams) look(keysOf(id))
    for (const unit of problem.units)
      for (const side of ['in', 'out']) {
        for (const { id } of problem.components) look(ends(unit.id, side).map((s) => `${s} ${id}`))
        look(
          ends(unit.id, side)
            .filter((s) => moves(total(s)))
            .flatMap(keysOf),
        )
        look(ends(unit.id, side).flatMap(keysOf))
      }
    basis = nullSpace(rows, truth.length)
  }

  const determined = new Map<string, boolean>()
  const value = new Map<string, number>()
  const [ownFraction, otherFlow, otherComponentFlow, otherFraction] =
    problem.basis === 'mass'
      ? ['massFraction', 'moleFlow', 'componentMoleFlow', 'moleFraction']
      : ['moleFraction', 'massFlow', 'componentMassFlow', 'massFraction']
  problem.streams.forEach(({ id, components = [] }, s) => {
    const its = problem.components.map((_, c) => flow[s]?.[c] as number)
    const others = its.map((n, c) => (problem.basis === 'mass' ? n / mass(c) : n * mass(c)))
    const add = (list: number[]): number => list.reduce((a, b) => a + b, 0)
    const cell = (key: string, its: number, top: Row, bottom?: Row): void => {
      value.set(key, bottom && components.length === 1 ? 1 : its)
      if (!bottom) determined.set(key, !moves(top))
      else
        determined.set(
          key,
          components.length === 1 || (at(bottom) !== 0 && !moves(plus(top, bottom, -over(at(top), at(bottom))))),
        )
    }
    cell(`${id} flow `, add(its), total(id))
    cell(`${id} ${otherFlow} `, add(others), total(id, true))
    for (const component of components) {
      const c = problem.components.findIndex((other) => other.id === component)
      const [n, m] = [its[c] as number, others[c] as number]
      cell(`${id} componentFlow ${component}`, n, one(id, component))
      cell(`${id} ${ownFraction} ${component}`, n / add(its), one(id, component), total(id))
      cell(`${id} ${otherComponentFlow} ${component}`, m, one(id, component, true))
      cell(`${id} ${otherFraction} ${component}`, m / add(others), one(id, component, true), total(id, true))
    }
  })
  return { determined, value, redundant }

  function holdGiven({ stream, quantity, component = '' }: Given): void {
    const other = quantity.toLowerCase().includes(problem.basis === 'mass' ? 'mole' : 'mass')
    if (quantity.endsWith('Fraction')) hold(one(stream, component, other), total(stream, other))
    else hold(component ? one(stream, component, other) : total(stream, other))
  }

  function holdRule(rule: Rule): void {
    const fed = (unit: string, component: string): Row => sum(ends(unit, 'in').map((s) => one(s, component)))
    if (rule.kind === 'split') for (const { id } of problem.components) hold(one(rule.stream, id), fed(rule.unit, id))
    else if (rule.kind === 'recovery') hold(one(rule.stream, rule.component), fed(rule.unit, rule.component))
    else if (rule.kind === 'flowRatio') hold(total(rule.stream), total(rule.of))
    else if (rule.kind === 'extent') hold(extentOf(rule.reaction))
    else throw new Error(`the oracle does not know ${rule.kind}`)
  }
}

function nullSpace(rows: Row[], n: number): Row[] {
  const { pivots } = reduceModulo(rows.map((row) => [...row]))
  const taken = new Set(pivots.map(([j]) => j))
  return Array.from({ length: n }, (_, free) => free)
    .filter((free) => !taken.has(free))
    .map((free) => {
      const h = new Array<number>(n).fill(0)
      h[free] = 1
      for (const [j, row] of pivots) h[j] = residue(-(row[free] as number))
      return h
    })
}
