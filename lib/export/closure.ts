import { unitFactor } from '@/lib/balance/measure/typed-value'
import { buildModel, type Model, otherPerOwn } from '@/lib/balance/model'
import type { Problem } from '@/lib/balance/problem'
import type { Solution } from '@/lib/balance/solution'
import { taggedName } from './table-model'

/** What a unit gains of what it holds; `notSplit`: only the gain of the total is typed, so a component's is not known. */
export type Gain = number | 'notSplit'

/** One balance: in - out + formed - gain. Streams are indexes into the table; `formed` into `ClosureModel.formations`. */
export type ClosureLine = {
  component: number | null
  inlets: number[]
  outlets: number[]
  formed: number[]
  gain: Gain
}

/** Balance of one element over the lines of its group: `parts` are indexes into `lines` with one of `contents` each. */
export type ElementLine = { element: string; parts: { line: number; content: number }[] }

export type ClosureGroup = {
  title: string
  /** Set where the group cannot be balanced: why. */
  open: string | null
  /** What reacts is found by element, not by extent: a component's formed amount is then a difference, not a check. */
  byElements: boolean
  lines: ClosureLine[]
  elements: ElementLine[]
}

/** What one reaction makes of one component: coefficient x molar mass x scale x extent. */
export type Formation = {
  reaction: number
  component: number
  coefficient: number
  /** In the book's flow unit per unit of extent; 1 on a mole basis. */
  molarMass: number
  /** Products are scaled so that rounded molar masses still close; 1 where they do already. */
  scale: number
}

/** Atoms of an element that a unit of flow of a component brings, in moles of the book. */
export type Content = { component: number; element: string; atoms: number; perFlow: number }

export type ClosureModel = {
  groups: ClosureGroup[]
  extents: { tag: string; name: string; unit: string; value: number | null }[]
  extentUnit: string
  formations: Formation[]
  contents: Content[]
  /** Components that can be in each stream. */
  present: number[][]
}

/** The balances that a reader can verify: every unit and the whole process, by component and in total. */
export function closureModel(problem: Problem, solution: Solution): ClosureModel {
  const model = buildModel(problem)
  if (!model) throw new Error(`The flow unit ${problem.flowUnit} does not fit a ${problem.basis} basis`)
  const formations = formationsOf(model)
  const contents: Content[] = []
  const extentOf = new Map(solution.extents.map(({ reaction, value }) => [reaction, value]))
  return {
    groups: [
      ...model.plant.map((_, unit) => unitGroup(model, unit, formations, contents)),
      processGroup(model, formations, contents),
    ],
    extents: (problem.reactions ?? []).map(({ id, name, unit }) => {
      const value = extentOf.get(id)
      return { tag: id, name: name ?? '', unit, value: value !== undefined && Number.isFinite(value) ? value : null }
    }),
    extentUnit: model.units.mole.symbol,
    formations,
    contents,
    present: model.present,
  }
}

function formationsOf(model: Model): Formation[] {
  return model.reactions.flatMap(({ components, change, moles }, reaction) =>
    components.map((component, k) => {
      const coefficient = moles[k] as number
      const molarMass = model.problem.basis === 'mole' ? 1 : 1 / otherPerOwn(model, component)
      return { reaction, component, coefficient, molarMass, scale: (change[k] as number) / (coefficient * molarMass) }
    }),
  )
}

type Gains = { total: number | undefined; byComponent: Map<number, number> }

function gainsOf(model: Model, unit: number): Gains {
  const gains: Gains = { total: undefined, byComponent: new Map() }
  for (const { component, value, unit: typed } of model.problem.units[unit]?.inventory ?? []) {
    const gain = value * unitFactor(model, 'flow', typed)
    const index = component === undefined ? undefined : model.componentIndex.get(component)
    if (index === undefined) gains.total = (gains.total ?? 0) + gain
    else gains.byComponent.set(index, (gains.byComponent.get(index) ?? 0) + gain)
  }
  return gains
}

const gainOf = ({ total, byComponent }: Gains, component: number | null): Gain => {
  if (component === null) return total ?? [...byComponent.values()].reduce((sum, gain) => sum + gain, 0)
  return byComponent.get(component) ?? (total === undefined ? 0 : 'notSplit')
}

function unitGroup(model: Model, unit: number, formations: Formation[], contents: Content[]): ClosureGroup {
  const { id, inlets, outlets, byElements, reactions } = model.plant[unit] as Model['plant'][number]
  const gains = gainsOf(model, unit)
  const holds = gains.total !== undefined || gains.byComponent.size > 0
  const open =
    inlets.length + outlets.length === 0
      ? 'no stream is connected'
      : !holds && inlets.length === 0
        ? 'nothing enters'
        : !holds && outlets.length === 0
          ? 'nothing leaves'
          : null
  const formed = formations.flatMap(({ reaction }, index) => (reactions.includes(reaction) ? [index] : []))
  const name = model.problem.units[unit]?.name
  return groupOf(
    model,
    { title: taggedName({ tag: id, name: name ?? '' }), open, byElements },
    inlets,
    outlets,
    formed,
    formations,
    contents,
    (component) => gainOf(gains, component),
  )
}

/** Streams with one end only cross the boundary of the whole process. */
function processGroup(model: Model, formations: Formation[], contents: Content[]): ClosureGroup {
  const sinks = new Set(model.plant.flatMap(({ inlets }) => inlets))
  const sources = new Set(model.plant.flatMap(({ outlets }) => outlets))
  const inlets = [...sinks].filter((s) => !sources.has(s)).sort((a, b) => a - b)
  const outlets = [...sources].filter((s) => !sinks.has(s)).sort((a, b) => a - b)
  const every = model.plant.map((_, unit) => gainsOf(model, unit))
  const gain = (component: number | null): Gain => {
    const gains = every.map((one) => gainOf(one, component))
    return gains.includes('notSplit') ? 'notSplit' : gains.reduce<number>((sum, one) => sum + (one as number), 0)
  }
  const byElements = model.plant.some((unit) => unit.byElements)
  const open = inlets.length + outlets.length === 0 ? 'no stream crosses its boundary' : null
  const formed = formations.map((_, index) => index)
  return groupOf(
    model,
    { title: 'Whole process', open, byElements },
    inlets,
    outlets,
    formed,
    formations,
    contents,
    gain,
  )
}

function groupOf(
  model: Model,
  head: Pick<ClosureGroup, 'title' | 'open' | 'byElements'>,
  inlets: number[],
  outlets: number[],
  formed: number[],
  formations: Formation[],
  contents: Content[],
  gain: (component: number | null) => Gain,
): ClosureGroup {
  const has = (component: number) => (stream: number) => (model.present[stream] as number[]).includes(component)
  const lines: ClosureLine[] = []
  for (let component = 0; component < model.nComponents; component++) {
    const line = {
      component,
      inlets: inlets.filter(has(component)),
      outlets: outlets.filter(has(component)),
      formed: formed.filter((index) => formations[index]?.component === component),
      gain: gain(component),
    }
    const typed = line.gain !== 0 && line.gain !== 'notSplit'
    if (line.inlets.length + line.outlets.length + line.formed.length > 0 || typed) lines.push(line)
  }
  const elements = head.byElements ? elementsOf(model, lines, contents) : []
  const filled = (stream: number): boolean => (model.present[stream] as number[]).length > 0
  lines.push({
    component: null,
    inlets: inlets.filter(filled),
    outlets: outlets.filter(filled),
    formed,
    gain: gain(null),
  })
  return { ...head, lines, elements }
}

/** None where a component has no formula: its atoms are not known. */
function elementsOf(model: Model, lines: readonly ClosureLine[], contents: Content[]): ElementLine[] {
  if (lines.some(({ component }) => component === null || !model.atoms[component])) return []
  const elements = [
    ...new Set(lines.flatMap(({ component }) => Object.keys(model.atoms[component as number] ?? {}))),
  ].sort()
  return elements.map((element) => ({
    element,
    parts: lines.flatMap(({ component }, line) => {
      const atoms = model.atoms[component as number]?.[element] ?? 0
      return atoms === 0 ? [] : [{ line, content: contentOf(model, contents, component as number, element, atoms) }]
    }),
  }))
}

function contentOf(model: Model, contents: Content[], component: number, element: string, atoms: number): number {
  const found = contents.findIndex((content) => content.component === component && content.element === element)
  if (found >= 0) return found
  const moles = model.problem.basis === 'mole' ? 1 : otherPerOwn(model, component)
  return contents.push({ component, element, atoms, perFlow: atoms * moles }) - 1
}
