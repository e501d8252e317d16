import type { Problem, Rule, Step, Use } from '@/lib/balance'

/**
 * Redoes steps of the workings by a slow, obvious road: each equation that a step names is written out from the problem
 * as a gradient over all component flows and extents at a true solution, beside what was found before, and every find's
 * gradient must then be a combination of them. Shares no code with the solver.
 */
export type Truth = { flow: (stream: string, component: string) => number; extent: (reaction: string) => number }

/** One measure: numerator over denominator, as rows over the unknowns. */
type Form = { top: number[]; bottom?: number[] }

export class Redo {
  private readonly place = new Map<string, number>()
  readonly truth: number[] = []
  private readonly parameters: string[]

  constructor(
    private readonly problem: Problem,
    truth: Truth,
    private readonly molesPerMass = 1,
  ) {
    for (const { id, components } of problem.streams)
      for (const component of problem.components)
        if (!components || components.includes(component.id))
          this.place.set(`${id} ${component.id}`, this.truth.push(truth.flow(id, component.id)) - 1)
    for (const { id } of problem.reactions ?? []) this.place.set(`xi ${id}`, this.truth.push(truth.extent(id)) - 1)
    this.parameters = (problem.parameters ?? []).flatMap(({ id, value }) => (value === undefined ? [id] : []))
  }

  /** Finds that do not follow from the step's equations and `known`, in words. */
  faults(step: Step, known: readonly number[][]): string[] {
    const rows = [...known, ...step.uses.flatMap((use) => this.equations(step, use))]
    const faults: string[] = []
    for (const row of rows.slice(known.length))
      if (row.some(Number.isNaN)) faults.push('an equation could not be written out')
    const zeros = this.zeroRows(step, rows)
    const basis = new Basis([...rows, ...zeros], this.truth)
    for (const find of step.finds) {
      const gradient = this.findRow(find)
      if (!basis.holds(gradient))
        faults.push(`${find.stream ?? find.reaction} ${find.quantity ?? ''} ${find.component ?? ''}`)
    }
    return faults
  }

  /** Gradient of a find's measure at the truth. */
  findRow({ stream, reaction, quantity, component }: Step['finds'][number]): number[] {
    if (reaction !== undefined) return this.row([[`xi ${reaction}`, 1]])
    return this.gradient(this.measure(stream as string, quantity as string, component))
  }

  /** The measure's value at the truth, NaN where it has none. */
  valueOf({ stream, reaction, quantity, component }: Step['finds'][number]): number {
    if (reaction !== undefined) return this.truth[this.place.get(`xi ${reaction}`) as number] as number
    const { top, bottom } = this.measure(stream as string, quantity as string, component)
    return bottom ? this.at(top) / this.at(bottom) : this.at(top)
  }

  /** Rows of typed values that are cells: known before any step. */
  givenRows(): number[][] {
    return (this.problem.givens ?? []).flatMap((given) =>
      (given.use ?? 'given') === 'given' && this.isPresent(given.stream, given.component)
        ? [this.gradient(this.measure(given.stream, given.quantity, given.component))]
        : [],
    )
  }

  private isPresent(stream: string, component?: string): boolean {
    return component === undefined || this.place.has(`${stream} ${component}`)
  }

  private row(entries: [string, number][]): number[] {
    const row = new Array<number>(this.truth.length).fill(0)
    for (const [key, factor] of entries) {
      const at = this.place.get(key)
      if (at !== undefined) row[at]! += factor
    }
    return row
  }

  private at = (row: readonly number[]): number => row.reduce((sum, a, k) => sum + a * (this.truth[k] as number), 0)

  private mass(component: string): number {
    return this.problem.components.find(({ id }) => id === component)?.molarMass as number
  }

  private other(component: string): number {
    const mass = this.mass(component)
    return this.problem.basis === 'mass' ? this.molesPerMass / mass : mass / this.molesPerMass
  }

  private part = (stream: string, component: string, other = false): number[] =>
    this.row([[`${stream} ${component}`, other ? this.other(component) : 1]])

  private total = (stream: string, other = false): number[] =>
    this.row(
      this.problem.components
        .filter(({ id }) => this.place.has(`${stream} ${id}`))
        .map(({ id }): [string, number] => [`${stream} ${id}`, other ? this.other(id) : 1]),
    )

  private measure(stream: string, quantity: string, component = ''): Form {
    const own = this.problem.basis
    switch (quantity) {
      case 'flow':
        return { top: this.total(stream) }
      case 'componentFlow':
        return { top: this.part(stream, component) }
      case 'massFlow':
      case 'moleFlow':
        return { top: this.total(stream, !quantity.startsWith(own)) }
      case 'componentMassFlow':
      case 'componentMoleFlow':
        return { top: this.part(stream, component, !quantity.toLowerCase().includes(own)) }
      case 'volumeFlow':
        return { top: this.total(stream, own === 'mole') }
      default: {
        const other = !quantity.startsWith(own)
        return { top: this.part(stream, component, other), bottom: this.total(stream, other) }
      }
    }
  }

  /** d(top / bottom) at the truth, times bottom. */
  private gradient({ top, bottom }: Form): number[] {
    if (!bottom) return top
    const below = this.at(bottom)
    // A ratio to nothing says nothing; that of a stream's one component is 1 whatever flows.
    if (below === 0) return top.map(() => 0)
    const ratio = this.at(top) / below
    return top.map((a, k) => a - ratio * (bottom[k] as number))
  }

  private ends(unit: string, side: string): string[] {
    return Object.entries(this.problem.links[unit] ?? {}).flatMap(([stream, its]) => (its === side ? [stream] : []))
  }

  /** The balance round these units of one component (all where left out), in the book's basis. */
  private balance(
    units: readonly string[],
    component?: string,
    factor: (component: string) => number = () => 1,
  ): number[] {
    const entries: [string, number][] = []
    for (const { id } of this.problem.components) {
      if (component !== undefined && id !== component) continue
      for (const unit of units) {
        for (const s of this.ends(unit, 'in')) entries.push([`${s} ${id}`, factor(id)])
        for (const s of this.ends(unit, 'out')) entries.push([`${s} ${id}`, -factor(id)])
        const byElements = this.problem.units.find((its) => its.id === unit)?.balance === 'elements'
        for (const reaction of byElements ? [] : (this.problem.reactions ?? []))
          if (reaction.unit === unit)
            entries.push([`xi ${reaction.id}`, factor(id) * this.change(reaction.stoichiometry, id)])
      }
    }
    return this.row(entries)
  }

  /** Mass, or moles, of a component per extent; products scaled so that mass closes. */
  private change(stoichiometry: Record<string, number>, component: string): number {
    const nu = stoichiometry[component] ?? 0
    if (this.problem.basis === 'mole' || nu === 0) return nu
    const mass = (id: string, its: number): number => (its * this.mass(id)) / this.molesPerMass
    const entries = Object.entries(stoichiometry)
    const used = entries.reduce((sum, [id, its]) => sum - Math.min(mass(id, its), 0), 0)
    const made = entries.reduce((sum, [id, its]) => sum + Math.max(mass(id, its), 0), 0)
    return nu > 0 ? (mass(component, nu) * used) / made : mass(component, nu)
  }

  private equations(step: Step, use: Use): number[][] {
    const units = use.id === undefined ? step.boundary : [use.id]
    switch (use.equation) {
      case 'balance':
        return [
          use.element === undefined
            ? this.balance(units, use.component)
            : this.balance(units, undefined, (id) => this.atoms(id, use.element as string) * this.moles(id)),
        ]
      case 'total':
        return [this.balance(units)]
      case 'sum':
        return []
      case 'given':
        return [this.gradient(this.measure(use.stream as string, use.quantity as string, use.component))]
      case 'composition':
        return this.sameComposition(step, use)
      case 'rule': {
        const rule = this.problem.relations?.find(({ id }) => id === use.id)
        return rule ? this.ruleRows(rule, use.component) : [[Number.NaN]]
      }
    }
  }

  private moles = (component: string): number => (this.problem.basis === 'mole' ? 1 : 1 / this.mass(component))

  private atoms(component: string, element: string): number {
    const formula = this.problem.components.find(({ id }) => id === component)?.formula ?? ''
    return [...formula.matchAll(/([A-Z][a-z]?)(\d*)/g)].reduce(
      (sum, [, name, count]) => sum + (name === element ? Number(count || 1) : 0),
      0,
    )
  }

  /** A component's fraction in one stream and in each other that the step names for the same equality. */
  private sameComposition(step: Step, { id, stream = '', component = '' }: Use): number[][] {
    return step.uses
      .filter(
        (use) =>
          use.equation === 'composition' && use.id === id && use.component === component && use.stream !== stream,
      )
      .map(({ stream: other = '' }) => {
        const [a, b] = [this.part(stream, component), this.part(other, component)]
        const [A, B] = [this.total(stream), this.total(other)]
        // d(a B - b A) = 0
        return a.map(
          (_, k) =>
            (a[k] as number) * this.at(B) +
            this.at(a) * (B[k] as number) -
            (b[k] as number) * this.at(A) -
            this.at(b) * (A[k] as number),
        )
      })
  }

  private ruleRows(rule: Rule, component?: string): number[][] {
    const fed = (unit: string, c: string, factor = 1): number[] =>
      this.row(this.ends(unit, 'in').map((s): [string, number] => [`${s} ${c}`, factor]))
    const scaled = (row: readonly number[], factor: number): number[] => row.map((a) => a * factor)
    const minus = (a: readonly number[], b: readonly number[]): number[] =>
      a.map((value, k) => value - (b[k] as number))
    const formed = (unit: string, c: string): number[] => {
      const reacts = (this.problem.reactions ?? []).filter((its) => its.unit === unit)
      if (reacts.length > 0)
        return this.row(reacts.map((its): [string, number] => [`xi ${its.id}`, its.stoichiometry[c] ?? 0]))
      const net = minus(this.row(this.ends(unit, 'out').map((s): [string, number] => [`${s} ${c}`, 1])), fed(unit, c))
      return scaled(net, this.moles(c))
    }
    const value = 'value' in rule && typeof rule.value === 'number' ? rule.value : undefined
    const ratio = (top: number[], bottom: number[]): number[][] =>
      // What a rule says of an inlet that is 0 is still that top = value x bottom.
      this.at(bottom) === 0 && value !== undefined
        ? [minus(top, scaled(bottom, value))]
        : [this.gradient({ top, bottom })]
    switch (rule.kind) {
      case 'split':
        return this.problem.components
          .filter(({ id }) => component === undefined || id === component)
          .flatMap(({ id }) => ratio(this.part(rule.stream, id), fed(rule.unit, id)))
      case 'recovery':
        return ratio(this.part(rule.stream, rule.component), fed(rule.unit, rule.component))
      case 'conversion': {
        const net = minus(
          fed(rule.unit, rule.component),
          this.row(this.ends(rule.unit, 'out').map((s): [string, number] => [`${s} ${rule.component}`, 1])),
        )
        return ratio(net, fed(rule.unit, rule.component))
      }
      case 'flowRatio':
        return ratio(this.total(rule.stream), this.total(rule.of))
      case 'componentRatio':
        return ratio(this.part(rule.stream, rule.component), this.part(rule.of.stream, rule.of.component))
      case 'extent':
        return [this.row([[`xi ${rule.reaction}`, 1]])]
      case 'yield':
        return ratio(formed(rule.unit, rule.product), scaled(fed(rule.unit, rule.from), this.moles(rule.from)))
      case 'selectivity':
        return ratio(formed(rule.unit, rule.product), formed(rule.unit, rule.over))
      case 'excess': {
        const nu = this.problem.reactions?.find(({ id }) => id === rule.reaction)?.stoichiometry ?? {}
        const needed = scaled(
          fed(rule.unit, rule.limiting),
          (this.moles(rule.limiting) * (nu[rule.component] ?? 0)) / (nu[rule.limiting] ?? 1),
        )
        return ratio(scaled(fed(rule.unit, rule.component), this.moles(rule.component)), needed)
      }
      case 'formula':
        return this.formulaRows(rule.text)
      default:
        return []
    }
  }

  /** By central differences of the text itself; only what the tests' books hold. */
  private formulaRows(text: string): number[][] {
    const sides = text.split('=')
    const at = (x: readonly number[], side: string): number => {
      const n = (s: string, c: string): number => {
        const k = this.place.get(`${s} ${c}`)
        return k === undefined ? 0 : (x[k] as number)
      }
      const flow = (s: string): number => this.problem.components.reduce((sum, { id }) => sum + n(s, id), 0)
      const words = side.replace(/\b(flow|part|share)\(([^)]*)\)/g, (_, name: string, list: string) => {
        const [s = '', c = ''] = list.split(',').map((word) => word.trim().replaceAll('"', ''))
        return `(${name === 'flow' ? flow(s) : name === 'part' ? n(s, c) : n(s, c) / flow(s)})`
      })
      if (/[a-z]/i.test(words.replace(/e[+-]?\d/gi, '')) || this.parameters.length > 0) return Number.NaN
      return Number(new Function(`return ${words.replaceAll('^', '**')}`)())
    }
    const gap = (x: readonly number[]): number => at(x, sides[0] ?? '') - at(x, sides[1] ?? '')
    return [
      this.truth.map((value, k) => {
        const h = 1e-4 * (Math.abs(value) || 1)
        const moved = (by: number): number[] => this.truth.map((its, q) => (q === k ? its + by : its))
        return (gap(moved(h)) - gap(moved(-h))) / (2 * h)
      }),
    ]
  }

  /** Sums of flows that the rows hold at 0 hold each of them at 0: streams, and either side of a unit. */
  private zeroRows(step: Step, rows: readonly number[][]): number[][] {
    const zeros: number[][] = []
    if (this.truth.every((value) => value !== 0)) return zeros
    const units = [...new Set([...step.boundary, ...this.problem.units.map(({ id }) => id)])]
    const sums = [
      ...this.problem.streams.map(({ id }) => this.total(id)),
      ...units.flatMap((unit) =>
        ['in', 'out'].flatMap((side) => [
          this.row(
            this.ends(unit, side).flatMap((s) =>
              this.problem.components.map(({ id }): [string, number] => [`${s} ${id}`, 1]),
            ),
          ),
          ...this.problem.components.map(({ id }) =>
            this.row(this.ends(unit, side).map((s): [string, number] => [`${s} ${id}`, 1])),
          ),
        ]),
      ),
    ]
    for (let before = -1; before !== zeros.length; ) {
      before = zeros.length
      const basis = new Basis([...rows, ...zeros], this.truth)
      // Any row that is a sum of flows, less what is known, counts too.
      const nothing = (row: readonly number[]): number[] => row.map((a, k) => (this.truth[k] === 0 ? a : 0))
      for (const sum of [...sums, ...rows, ...sums.map(nothing)]) {
        const open = sum.map((a, k) => (a !== 0 && !basis.holds(this.unit(k)) ? k : -1)).filter((k) => k >= 0)
        if (open.length === 0 || !open.every((k) => this.truth[k] === 0)) continue
        if (!open.every((k) => Math.sign(sum[k] as number) === Math.sign(sum[open[0] as number] as number))) continue
        if (!basis.holds(sum)) continue
        for (const k of open) zeros.push(this.unit(k))
        break
      }
    }
    return zeros
  }

  private unit = (k: number): number[] => this.truth.map((_, q) => Number(q === k))
}

/** Rows brought to echelon form by complete pivoting, columns scaled by the truth. */
class Basis {
  private readonly rows: { pivot: number; row: number[] }[] = []
  private readonly scale: number[]

  constructor(list: readonly number[][], truth: readonly number[]) {
    const typical = Math.max(...truth.map(Math.abs), 1e-300)
    this.scale = truth.map((value) => Math.abs(value) || 1e-3 * typical)
    const left = list.map((row) => this.scaled(row)).filter((row) => row.some((a) => a !== 0))
    const size = left.map((row) => Math.max(...row.map(Math.abs)))
    for (;;) {
      let best = -1
      let pivot = -1
      let most = 1e-9
      for (const [i, row] of left.entries())
        for (const [k, a] of row.entries()) {
          const part = Math.abs(a) / (size[i] as number)
          if (part <= most) continue
          most = part
          best = i
          pivot = k
        }
      if (best < 0) return
      const head = left[best]?.[pivot] as number
      const row = (left[best] as number[]).map((a) => a / head)
      this.rows.push({ pivot, row })
      left.forEach((other, i) => {
        const factor = other[pivot] as number
        if (factor !== 0) left[i] = other.map((a, k) => (k === pivot ? 0 : a - factor * (row[k] as number)))
      })
    }
  }

  /** True where the row is a combination of the others. */
  holds(row: readonly number[]): boolean {
    let its = this.scaled(row)
    const most = Math.max(...its.map(Math.abs))
    if (most === 0) return true
    for (const { pivot, row: other } of this.rows) {
      const factor = its[pivot] as number
      if (factor !== 0) its = its.map((a, k) => (k === pivot ? 0 : a - factor * (other[k] as number)))
    }
    return its.every((a) => Math.abs(a) <= 1e-7 * most)
  }

  private scaled(row: readonly number[]): number[] {
    const its = row.map((a, k) => a * (this.scale[k] as number))
    const most = Math.max(...its.map(Math.abs))
    return most === 0 ? its : its.map((a) => a / most)
  }
}
