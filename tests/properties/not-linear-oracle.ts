import type { Given, Rule } from '@/lib/balance/problem'
import type { NotLinearBook, Reading } from './not-linear-book'
import { generator } from './random-book'

type Vector = number[]

/** A cell as "stream quantity component", with its value at the truth. */
export type OracleCell = { key: string; value: number; read: (x: Vector) => number }

/**
 * A slow second opinion on books with rules that are not linear: all equations written out in component flows, extents and
 * parameters, gradients by differences, the null space at the truth, and a search for other solutions without negative
 * flows. Shares no code with the solver.
 */
export class NotLinearOracle {
  readonly cells: OracleCell[] = []
  readonly truth: Vector = []
  private readonly place = new Map<string, number>()
  private readonly equations: ((x: Vector) => number)[] = []
  private readonly scale: Vector = []
  private nFlows = 0

  constructor(private readonly book: NotLinearBook) {
    const { problem, flow, extent, parameters, equations } = book
    const put = (key: string, value: number): void => {
      this.place.set(key, this.truth.push(value) - 1)
    }
    problem.streams.forEach(({ id, components }, s) => {
      problem.components.forEach((component, c) => {
        if (!components || components.includes(component.id)) put(`${id} ${component.id}`, flow[s]?.[c] as number)
      })
    })
    this.nFlows = this.truth.length
    problem.reactions?.forEach(({ id }, r) => {
      put(`xi ${id}`, extent[r] as number)
    })
    for (const [id, value] of parameters) put(`parameter ${id}`, value)
    const largest = Math.max(...this.truth.map(Math.abs))
    for (const value of this.truth) this.scale.push(Math.abs(value) || largest)
    this.structure()
    for (const given of problem.givens ?? []) this.given(given)
    for (const rule of problem.relations ?? []) this.rule(rule)
    for (const equation of equations) this.equations.push((x) => equation(this.reading(x)))
    this.list()
  }

  private n = (x: Vector, stream: string, component: string): number => {
    const at = this.place.get(`${stream} ${component}`)
    return at === undefined ? 0 : (x[at] as number)
  }
  private other = (c: string): number => {
    const mass = this.book.problem.components.find(({ id }) => id === c)?.molarMass as number
    return this.book.problem.basis === 'mass' ? 1 / mass : mass
  }
  private total = (x: Vector, stream: string, other = false): number =>
    this.book.problem.components.reduce((sum, { id }) => sum + this.n(x, stream, id) * (other ? this.other(id) : 1), 0)

  reading(x: Vector): Reading {
    return {
      part: (s, c) => this.n(x, s, c),
      flow: (s) => this.total(x, s),
      parameter: (id) => x[this.place.get(`parameter ${id}`) as number] as number,
    }
  }

  private ends(unit: string, side: string): string[] {
    return Object.entries(this.book.problem.links[unit] ?? {}).flatMap(([stream, its]) =>
      its === side ? [stream] : [],
    )
  }
  private fed = (x: Vector, unit: string, c: string): number =>
    this.ends(unit, 'in').reduce((sum, s) => sum + this.n(x, s, c), 0)

  private structure(): void {
    const { problem } = this.book
    for (const unit of problem.units) {
      const [inlets, outlets] = [this.ends(unit.id, 'in'), this.ends(unit.id, 'out')]
      for (const { id } of problem.components)
        this.equations.push((x) => {
          let sum = this.fed(x, unit.id, id)
          for (const s of outlets) sum -= this.n(x, s, id)
          for (const reaction of problem.reactions ?? [])
            if (reaction.unit === unit.id)
              sum +=
                (reaction.stoichiometry[id] ?? 0) *
                (problem.basis === 'mass' ? 50 : 1) *
                (x[this.place.get(`xi ${reaction.id}`) as number] as number)
          return sum
        })
      if (unit.kind !== 'splitter' || inlets.length === 0) continue
      const [first, ...rest] = outlets
      for (const s of rest)
        for (const { id } of problem.components)
          this.equations.push(
            (x) =>
              this.n(x, s, id) * this.total(x, first as string) - this.n(x, first as string, id) * this.total(x, s),
          )
    }
  }

  private given({ stream, quantity, component = '', value }: Given): void {
    const other = quantity.toLowerCase().includes(this.book.problem.basis === 'mass' ? 'mole' : 'mass')
    const factor = component && other ? this.other(component) : 1
    const top = (x: Vector): number =>
      component ? factor * this.n(x, stream, component) : this.total(x, stream, other)
    if (quantity.endsWith('Fraction')) this.equations.push((x) => top(x) - value * this.total(x, stream, other))
    else this.equations.push((x) => top(x) - value)
  }

  private rule(rule: Rule): void {
    if (rule.kind === 'formula' || !('value' in rule) || typeof rule.value !== 'number') return
    const { value } = rule
    const components = this.book.problem.components.map(({ id }) => id)
    switch (rule.kind) {
      case 'split':
        for (const c of components)
          this.equations.push((x) => this.n(x, rule.stream, c) - value * this.fed(x, rule.unit, c))
        return
      case 'recovery':
        this.equations.push(
          (x) => this.n(x, rule.stream, rule.component) - value * this.fed(x, rule.unit, rule.component),
        )
        return
      case 'conversion':
        this.equations.push((x) => {
          const out = this.ends(rule.unit, 'out').reduce((sum, s) => sum + this.n(x, s, rule.component), 0)
          return (1 - value) * this.fed(x, rule.unit, rule.component) - out
        })
        return
      case 'flowRatio':
        this.equations.push((x) => this.total(x, rule.stream) - value * this.total(x, rule.of))
        return
      case 'extent':
        this.equations.push((x) => (x[this.place.get(`xi ${rule.reaction}`) as number] as number) - value)
        return
      default:
        throw new Error(`the oracle does not know ${rule.kind}`)
    }
  }

  private list(): void {
    const { problem } = this.book
    const mass = problem.basis === 'mass'
    const add = (key: string, read: (x: Vector) => number): void => {
      this.cells.push({ key, read, value: read(this.truth) })
    }
    for (const { id, components } of problem.streams) {
      add(`${id} flow `, (x) => this.total(x, id))
      add(`${id} ${mass ? 'moleFlow' : 'massFlow'} `, (x) => this.total(x, id, true))
      for (const c of components ?? problem.components.map((its) => its.id)) {
        add(`${id} componentFlow ${c}`, (x) => this.n(x, id, c))
        add(`${id} ${mass ? 'massFraction' : 'moleFraction'} ${c}`, (x) => this.n(x, id, c) / this.total(x, id))
        add(`${id} ${mass ? 'componentMoleFlow' : 'componentMassFlow'} ${c}`, (x) => this.n(x, id, c) * this.other(c))
        add(
          `${id} ${mass ? 'moleFraction' : 'massFraction'} ${c}`,
          (x) => (this.n(x, id, c) * this.other(c)) / this.total(x, id, true),
        )
      }
    }
  }

  /** Gradient along each unknown, measured by its size at the truth. */
  private gradient(f: (x: Vector) => number, x: Vector): Vector {
    return x.map((value, k) => {
      const step = 1e-5 * (this.scale[k] as number)
      const up = [...x]
      const down = [...x]
      up[k] = value + step
      down[k] = value - step
      return (f(up) - f(down)) / 2e-5
    })
  }

  /** Directions, measured by the truth, in which nothing changes to first order at x. */
  nullSpace(x: Vector): Vector[] {
    return nullSpaceOf(
      this.equations.map((f) => this.gradient(f, x)),
      x.length,
    )
  }

  cell(key: string): OracleCell {
    return this.cells.find((its) => its.key === key) as OracleCell
  }

  get freedom(): number {
    return this.nullSpace(this.truth).length
  }

  /** Cells that do not move to first order along what is free at the truth. */
  locallyDetermined(): Set<string> {
    const basis = this.nullSpace(this.truth)
    const found = new Set<string>()
    for (const { key, read } of this.cells) {
      const gradient = this.gradient(read, this.truth)
      const moves = basis.some((h) => {
        const terms = gradient.map((value, k) => value * (h[k] as number))
        const sum = terms.reduce((a, b) => a + b, 0)
        return Math.abs(sum) > 1e-6 * Math.max(1e-9, ...terms.map(Math.abs))
      })
      if (!moves) found.add(key)
    }
    return found
  }

  /** Solutions without negative flows that a damped Newton's method comes upon from random starts. */
  solutions(starts: number, seed: number): Vector[] {
    const random = generator(seed)
    const found: Vector[] = []
    for (let start = 0; start < starts; start++) {
      const spread = start % 3 === 0 ? 4 : 1
      const x = this.newton(this.truth.map((_, k) => (this.scale[k] as number) * 10 ** (spread * (random() - 0.5))))
      if (x?.every((value, k) => k >= this.nFlows || value >= -1e-9 * (this.scale[k] as number)) && this.flows(x))
        found.push(x)
    }
    return found
  }

  /** A stream without flow meets fractions falsely. */
  private flows = (x: Vector): boolean =>
    this.book.problem.streams.every(({ id }) => this.total(x, id) > 1e-4 * this.total(this.truth, id))

  private newton(start: Vector): Vector | undefined {
    let x = start
    const restOf = (y: Vector): Vector => this.equations.map((f, i) => f(y) / (this.sizes[i] as number))
    let rest = restOf(x)
    const norm = (r: Vector): number => r.reduce((sum, value) => sum + value * value, 0)
    let damping = 1e-3
    for (let step = 0; step < 60; step++) {
      if (Math.max(...rest.map(Math.abs)) < 1e-12) break
      const rows = this.equations.map((f, i) => this.gradient(f, x).map((v) => v / (this.sizes[i] as number)))
      const change = damped(rows, rest, damping)
      const next = x.map((value, k) => {
        const moved = value - (change[k] as number) * (this.scale[k] as number)
        // Flows stay positive on the way: at most nine tenths of one are taken off in one step.
        return k < this.nFlows && value > 0 ? Math.max(moved, 0.1 * value) : moved
      })
      const there = restOf(next)
      if (norm(there) < norm(rest)) {
        x = next
        rest = there
        damping = Math.max(1e-12, damping / 10)
      } else if (damping > 1e6) break
      else damping *= 10
    }
    return Math.max(...rest.map(Math.abs)) < 1e-9 ? x : undefined
  }

  private sizesMade: Vector | undefined
  /** What one change of all unknowns by themselves makes of each equation at the truth. */
  private get sizes(): Vector {
    this.sizesMade ??= this.equations.map((f) => Math.max(1e-9, ...this.gradient(f, this.truth).map(Math.abs)))
    return this.sizesMade
  }
}

function nullSpaceOf(matrix: Vector[], n: number): Vector[] {
  const rows = matrix.flatMap((row) => {
    const most = Math.max(0, ...row.map(Math.abs))
    return most < 1e-12 ? [] : [row.map((value) => value / most)]
  })
  const pivots: { column: number; row: Vector }[] = []
  const taken = new Set<number>()
  for (;;) {
    let size = 1e-6
    let best: [number, number] | undefined
    rows.forEach((row, i) => {
      row.forEach((value, j) => {
        if (Math.abs(value) > size && !taken.has(j)) {
          size = Math.abs(value)
          best = [i, j]
        }
      })
    })
    if (!best) break
    const [i, column] = best
    const [pivot] = rows.splice(i, 1) as [Vector]
    const head = pivot[column] as number
    const row = pivot.map((value) => value / head)
    taken.add(column)
    for (const other of [...rows, ...pivots.map((its) => its.row)]) {
      const factor = other[column] as number
      for (let k = 0; k < n; k++) other[k]! -= factor * (row[k] as number)
    }
    pivots.push({ column, row })
  }
  return Array.from({ length: n }, (_, free) => free)
    .filter((free) => !taken.has(free))
    .map((free) => {
      const h = new Array<number>(n).fill(0)
      h[free] = 1
      for (const { column, row } of pivots)
        h[column] = Math.abs(row[free] as number) < 1e-7 ? 0 : -(row[free] as number)
      return h
    })
}

/** (J'J + damping) change = J'rest by plain elimination. */
function damped(rows: Vector[], rest: Vector, damping: number): Vector {
  const n = rows[0]?.length ?? 0
  const system = Array.from({ length: n }, () => new Array<number>(n + 1).fill(0))
  rows.forEach((row, i) => {
    for (let a = 0; a < n; a++) {
      if (row[a] === 0) continue
      for (let b = 0; b < n; b++) system[a]![b]! += (row[a] as number) * (row[b] as number)
      system[a]![n]! += (row[a] as number) * (rest[i] as number)
    }
  })
  for (let a = 0; a < n; a++) system[a]![a]! += damping
  for (let k = 0; k < n; k++) {
    const pivot = system[k] as Vector
    for (let i = 0; i < n; i++) {
      if (i === k) continue
      const factor = (system[i]![k] as number) / (pivot[k] as number)
      if (factor !== 0) for (let j = k; j <= n; j++) system[i]![j]! -= factor * (pivot[j] as number)
    }
  }
  return system.map((row, k) => (row[n] as number) / (row[k] as number))
}
