import type { Given, Rule } from '@/lib/balance/problem'
import type { RandomBook } from './random-book'

/**
 * A slow, obvious second opinion: rows written out in component flows and extents, one dense matrix, elimination with
 * complete pivoting, and a cell is determined when its gradient at the hidden truth is orthogonal to every direction
 * left free. Shares no code with the solver.
 */
export type Verdict = {
  /** By "stream quantity component". */
  determined: Map<string, boolean>
  value: Map<string, number>
  freedom: number
  /** Some splitter needs the equal compositions as such: locally determined cells may have a second root. */
  bilinear: boolean
}

type Row = number[]

export function judge({ problem, flow, extent }: RandomBook): Verdict {
  const place = new Map<string, number>()
  const truth: number[] = []
  problem.streams.forEach(({ id, components }, s) => {
    problem.components.forEach((component, c) => {
      if (!components || components.includes(component.id))
        place.set(`${id} ${component.id}`, truth.push(flow[s]?.[c] as number) - 1)
    })
  })
  problem.reactions?.forEach(({ id }, r) => {
    place.set(`xi ${id}`, truth.push(extent[r] as number) - 1)
  })
  const n = truth.length
  const zero = (): Row => new Array<number>(n).fill(0)
  const add = (row: Row, key: string, factor: number): void => {
    const at = place.get(key)
    if (at !== undefined) row[at]! += factor
  }
  const mass = (c: number): number => problem.components[c]?.molarMass as number
  const otherFactor = (c: number): number => (problem.basis === 'mass' ? 1 / mass(c) : mass(c))
  const total = (stream: string, other = false): Row => {
    const row = zero()
    problem.components.forEach(({ id }, c) => {
      add(row, `${stream} ${id}`, other ? otherFactor(c) : 1)
    })
    return row
  }
  const one = (stream: string, component: string, other = false): Row => {
    const row = zero()
    add(
      row,
      `${stream} ${component}`,
      other ? otherFactor(problem.components.findIndex(({ id }) => id === component)) : 1,
    )
    return row
  }
  const minus = (a: Row, b: Row, factor: number): Row => a.map((value, k) => value - factor * (b[k] as number))
  const sum = (list: Row[]): Row => list.reduce((a, b) => minus(a, b, -1), zero())
  const at = (row: Row): number => row.reduce((value, a, k) => value + a * (truth[k] as number), 0)
  const ends = (unit: string, side: string): string[] =>
    Object.entries(problem.links[unit] ?? {}).flatMap(([stream, its]) => (its === side ? [stream] : []))

  const rows: Row[] = []
  for (const unit of problem.units) {
    for (const { id } of problem.components) {
      const row = zero()
      for (const s of ends(unit.id, 'in')) add(row, `${s} ${id}`, 1)
      for (const s of ends(unit.id, 'out')) add(row, `${s} ${id}`, -1)
      for (const reaction of problem.reactions ?? [])
        if (reaction.unit === unit.id)
          add(row, `xi ${reaction.id}`, (reaction.stoichiometry[id] ?? 0) * (problem.basis === 'mass' ? 50 : 1))
      rows.push(row)
    }
  }
  const ratio = (top: Row, bottom: Row, value: number): void => {
    rows.push(minus(top, bottom, value))
  }
  for (const given of problem.givens ?? []) pushGiven(given)
  for (const rule of problem.relations ?? []) pushRule(rule)
  let bilinear = false
  const linearRank = rankOf(rows, truth)
  for (const unit of problem.units) {
    if (unit.kind !== 'splitter') continue
    const [first, ...rest] = ends(unit.id, 'out')
    for (const other of rest)
      for (const { id } of problem.components) {
        // Gradient of n[first] F[other] - n[other] F[first] at the truth.
        const a = one(first as string, id)
        const b = one(other, id)
        const A = total(first as string)
        const B = total(other)
        rows.push(
          sum([a.map((v) => v * at(B)), B.map((v) => v * at(a)), b.map((v) => -v * at(A)), A.map((v) => -v * at(b))]),
        )
      }
  }
  if (rankOf(rows, truth) > linearRank) bilinear = true

  // A fixed sum of flows that is 0 fixes each of them at 0, repeated.
  let basis = nullSpace(rows, truth)
  for (;;) {
    const before = basis.length
    const look = (keys: string[]): void => {
      const open = keys.filter(
        (key) => place.has(key) && basis.some((h) => moves(one(...(key.split(' ') as [string, string])), h)),
      )
      if (open.length === 0) return
      const row = zero()
      for (const key of open) add(row, key, 1)
      if (at(row) === 0 && basis.every((h) => !moves(row, h)))
        for (const key of open) rows.push(one(...(key.split(' ') as [string, string])))
    }
    for (const { id } of problem.streams) look(problem.components.map((component) => `${id} ${component.id}`))
    for (const unit of problem.units)
      for (const side of ['in', 'out']) {
        for (const { id } of problem.components) look(ends(unit.id, side).map((s) => `${s} ${id}`))
        const open = ends(unit.id, side).filter((s) => basis.some((h) => moves(total(s), h)))
        look(open.flatMap((s) => problem.components.map(({ id }) => `${s} ${id}`)))
        look(ends(unit.id, side).flatMap((s) => problem.components.map(({ id }) => `${s} ${id}`)))
      }
    basis = nullSpace(rows, truth)
    if (basis.length === before) break
  }

  const determined = new Map<string, boolean>()
  const value = new Map<string, number>()
  const cell = (key: string, top: Row, bottom?: Row): void => {
    const up = at(top)
    if (!bottom) {
      determined.set(
        key,
        basis.every((h) => !moves(top, h)),
      )
      value.set(key, up)
      return
    }
    const down = at(bottom)
    const single = bottom.filter((v) => v !== 0).length === 1
    value.set(key, single ? 1 : up / down)
    determined.set(key, single || (down > 0 && basis.every((h) => !moves(minus(top, bottom, up / down), h))))
  }
  const quantities =
    problem.basis === 'mass'
      ? (['massFraction', 'moleFlow', 'componentMoleFlow', 'moleFraction'] as const)
      : (['moleFraction', 'massFlow', 'componentMassFlow', 'massFraction'] as const)
  for (const { id, components } of problem.streams) {
    cell(`${id} flow `, total(id))
    cell(`${id} ${quantities[1]} `, total(id, true))
    for (const component of components ?? problem.components.map((its) => its.id)) {
      cell(`${id} componentFlow ${component}`, one(id, component))
      cell(`${id} ${quantities[0]} ${component}`, one(id, component), total(id))
      cell(`${id} ${quantities[2]} ${component}`, one(id, component, true))
      cell(`${id} ${quantities[3]} ${component}`, one(id, component, true), total(id, true))
    }
  }
  return { determined, value, freedom: basis.length, bilinear }

  function moves(row: Row, direction: Row): boolean {
    let move = 0
    let terms = 0
    row.forEach((a, k) => {
      move += a * (direction[k] as number)
      terms += Math.abs(a * (direction[k] as number))
    })
    return Math.abs(move) > 1e-7 * terms
  }

  function pushGiven({ stream, quantity, component = '', value }: Given): void {
    const other = quantity.toLowerCase().includes(problem.basis === 'mass' ? 'mole' : 'mass')
    if (quantity.endsWith('Fraction')) ratio(one(stream, component, other), total(stream, other), value)
    else rows.push(component ? one(stream, component, other) : total(stream, other))
  }

  function pushRule(rule: Rule): void {
    if ('value' in rule && typeof rule.value !== 'number') throw new Error('the oracle takes typed values only')
    const fed = (unit: string, component: string): Row => sum(ends(unit, 'in').map((s) => one(s, component)))
    switch (rule.kind) {
      case 'split':
        for (const { id } of problem.components) ratio(one(rule.stream, id), fed(rule.unit, id), rule.value as number)
        return
      case 'recovery':
        ratio(one(rule.stream, rule.component), fed(rule.unit, rule.component), rule.value as number)
        return
      case 'conversion':
        ratio(
          minus(fed(rule.unit, rule.component), sum(ends(rule.unit, 'out').map((s) => one(s, rule.component))), 1),
          fed(rule.unit, rule.component),
          rule.value as number,
        )
        return
      case 'flowRatio':
        ratio(total(rule.stream), total(rule.of), rule.value as number)
        return
      case 'extent': {
        const row = zero()
        add(row, `xi ${rule.reaction}`, 1)
        rows.push(row)
        return
      }
      default:
        throw new Error(`the oracle does not know ${rule.kind}`)
    }
  }
}

/** Columns are measured by the truth, so that each entry is what the term weighs. */
function scaled(rows: Row[], truth: number[]): Row[] {
  const scale = truth.map((value) => Math.abs(value) || 1)
  return rows.flatMap((row) => {
    const its = row.map((value, k) => value * (scale[k] as number))
    const most = Math.max(0, ...its.map(Math.abs))
    return most === 0 ? [] : [its.map((value) => value / most)]
  })
}

function reduce(rows: Row[], truth: number[]): { pivots: [number, Row][] } {
  const left = scaled(rows, truth)
  const pivots: [number, Row][] = []
  for (;;) {
    let size = 1e-9
    let best: [number, number] | undefined
    left.forEach((row, i) => {
      row.forEach((value, j) => {
        if (Math.abs(value) > size) {
          size = Math.abs(value)
          best = [i, j]
        }
      })
    })
    if (!best) return { pivots }
    const [i, j] = best
    const [pivot] = left.splice(i, 1) as [Row]
    const head = pivot[j] as number
    const row = pivot.map((value) => value / head)
    for (const other of [...left, ...pivots.map(([, its]) => its)]) {
      const factor = other[j] as number
      if (factor === 0) continue
      for (let k = 0; k < other.length; k++) other[k]! -= factor * (row[k] as number)
      other[j] = 0
    }
    pivots.push([j, row])
  }
}

const rankOf = (rows: Row[], truth: number[]): number => reduce(rows, truth).pivots.length

function nullSpace(rows: Row[], truth: number[]): Row[] {
  const { pivots } = reduce(rows, truth)
  const taken = new Set(pivots.map(([j]) => j))
  const scale = truth.map((value) => Math.abs(value) || 1)
  return truth.flatMap((_, free) => {
    if (taken.has(free)) return []
    const h = truth.map(() => 0)
    h[free] = 1
    for (const [j, row] of pivots) h[j] = Math.abs(row[free] as number) < 1e-9 ? 0 : -(row[free] as number)
    return [h.map((value, k) => value * (scale[k] as number))]
  })
}
