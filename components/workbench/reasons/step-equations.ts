import { unitFactor } from '@/lib/balance/measure/typed-value'
import { otherPerOwn } from '@/lib/balance/model'
import type { Rule } from '@/lib/balance/problem'
import type { Step, Use } from '@/lib/balance/workings/step'
import { type BookView, rowOfPlace } from '../book-view'
import { lowered, placeWords } from '../words'
import { type Explained, modelOf, placeOf } from './explained'
import { added, equal, type LeanedOn, StepTerms, type Term } from './step-terms'
import { countsApart, typedTerm } from './typed-use'
import { writtenRule } from './written-rule'

/** An equation of a step: what it is called, in symbols, and with the numbers known before the step put in. */
export type EquationLine = { key: string; name: string } & Term

export type StepEquations = { lines: EquationLine[]; leansOn: LeanedOn[] }

/** The equations that a step uses, as they are redone by hand, and the cells whose numbers they take. */
export function stepEquations(view: BookView, explained: Explained, step: Step): StepEquations {
  const model = modelOf(explained.problem)
  if (!model) return { lines: [], leansOn: [] }
  const terms = new StepTerms(view, explained, model, step)
  const lines: EquationLine[] = []
  const seen = new Set<string>()
  const put = (key: string, name: string, term: Term | null): void => {
    if (!term || seen.has(key)) return
    seen.add(key)
    lines.push({ key, name, ...term })
  }
  for (const use of step.uses) {
    const { equation, id, component, element, stream } = use
    const units = id === undefined ? step.boundary : [id]
    const around = id === undefined ? '' : ` of ${id}`
    switch (equation) {
      case 'total':
        put(`total ${id}`, `total${around}`, balance(terms, units, undefined))
        break
      case 'balance':
        if (element !== undefined)
          put(`element ${element} ${id}`, `${element}${around}`, elements(terms, units, element))
        else put(`${component} ${id}`, `${component}${around}`, balance(terms, units, component))
        break
      case 'sum':
        put(`sum ${stream} ${use.quantity}`, `sum of ${stream}`, sum(terms, use))
        break
      case 'composition':
        put(`same ${id} ${component}`, `${component} the same, ${id}`, composition(terms, step, use))
        break
      case 'rule': {
        const rule = explained.problem.relations?.find((one) => one.id === id)
        const name = component === undefined ? `rule ${id}` : `rule ${id}, ${component}`
        put(`rule ${id} ${component}`, name, rule ? ruled(terms, rule, component) : null)
        break
      }
      case 'given':
        if (countsApart(use)) put(`given ${lines.length}`, 'typed', typedTerm(view, explained, use))
    }
  }
  // After the equations: most typed values already stand in them by their numbers.
  for (const use of step.uses) if (use.equation === 'given') lean(terms, use)
  const leansOn = [...terms.leansOn.values()].sort((a, b) => a.step - b.step)
  return { lines, leansOn }
}

/** A typed value counts as leaned on also where the equations print it as part of a product. */
function lean(terms: StepTerms, use: Use): void {
  const { stream, quantity } = use
  if (stream === undefined || quantity === undefined) return
  const place = { ...use, stream, quantity }
  const row = rowOfPlace(terms.view, place)
  const key = `typed ${JSON.stringify(placeOf(terms.view, place))}`
  const text = typedTerm(terms.view, terms.explained, use)
  const [value = '', unit = ''] = (text?.numbers.split(' = ')[1] ?? '').split(/ (?=[^ ]*$)/)
  const same = [...terms.leansOn.values()].some(({ place: at }) => `typed ${JSON.stringify(at)}` === key)
  if (!same)
    terms.leansOn.set(key, {
      key,
      name: lowered(placeWords(terms.view, place)),
      place: row ? placeOf(terms.view, place) : null,
      value,
      unit,
      step: 0,
    })
}

/** in + made = out + gained, round the units, of everything or of one component. */
function balance(terms: StepTerms, units: readonly string[], componentTag: string | undefined): Term | null {
  const { model } = terms
  const component = componentTag === undefined ? undefined : model.componentIndex.get(componentTag)
  const of = (stream: number): Term | null =>
    component === undefined ? terms.total(stream) : terms.part(stream, component)
  const { inlets, outlets } = crossing(terms, units)
  const filled = (streams: readonly number[]): Term[] => streams.flatMap((s) => of(s) ?? [])
  const left = [...filled(inlets), ...made(terms, units, component)]
  const right = [...filled(outlets), ...gained(terms, units, componentTag)]
  return equal(added(left), added(right))
}

function crossing({ model }: StepTerms, units: readonly string[]): { inlets: number[]; outlets: number[] } {
  const inside = units.flatMap((id) => model.plant[model.unitIndex.get(id) ?? -1] ?? [])
  const into = inside.flatMap(({ inlets }) => inlets)
  const out = inside.flatMap(({ outlets }) => outlets)
  return { inlets: into.filter((s) => !out.includes(s)), outlets: out.filter((s) => !into.includes(s)) }
}

/** What reactions inside make; of the total only on a mole basis, since mass is not made. */
function made(terms: StepTerms, units: readonly string[], component: number | undefined): Term[] {
  const { model, explained, step } = terms
  if (component === undefined && model.problem.basis === 'mass') return []
  return model.reactions.flatMap(({ id, unit, components, change }) => {
    const here = model.problem.units[unit]
    if (!here || !units.includes(here.id) || here.balance === 'elements') return []
    const change_ = components.reduce(
      (total, c, k) => (component === undefined || c === component ? total + (change[k] as number) : total),
      0,
    )
    if (change_ === 0) return []
    const size = terms.fraction(Math.abs(change_))
    const sign = change_ < 0 ? '−' : ''
    const symbols = `${sign}${size} × extent(${id})`
    const before = explained.explanation.workings
      .slice(0, step.step - 1)
      .some(({ finds }) => finds.some(({ reaction }) => reaction === id))
    const extent = explained.solved.solution.extents.find(({ reaction }) => reaction === id)
    const isKnown = extent?.value !== undefined && (extent.state === 'given' || before)
    return [{ symbols, numbers: isKnown ? `${sign}${size} × ${terms.number(extent?.value ?? 0)}` : symbols }]
  })
}

function gained({ model, number }: StepTerms, units: readonly string[], component: string | undefined): Term[] {
  return model.problem.units.flatMap(({ id, inventory }) =>
    units.includes(id)
      ? (inventory ?? [])
          .filter((gain) => component === undefined || gain.component === component)
          .map((gain) => ({
            symbols: `gain(${id})`,
            numbers: number(gain.value * unitFactor(model, 'flow', gain.unit)),
          }))
      : [],
  )
}

/** Atoms in = atoms out, in moles: each component flow times the atoms that a unit of it brings. */
function elements(terms: StepTerms, units: readonly string[], element: string): Term {
  const { model } = terms
  const { inlets, outlets } = crossing(terms, units)
  const side = (streams: readonly number[]): Term =>
    added(
      streams.flatMap((s) =>
        terms.present(s).flatMap((c) => {
          const atoms = model.atoms[c]?.[element] ?? 0
          const part = atoms === 0 ? null : terms.part(s, c)
          if (!part) return []
          const per = terms.fraction(atoms * (model.problem.basis === 'mole' ? 1 : otherPerOwn(model, c)))
          return [{ symbols: `${per} × ${part.symbols}`, numbers: `${per} × ${part.numbers}` }]
        }),
      ),
    )
  return equal(side(inlets), side(outlets))
}

/** A total as the sum of its components; as fractions that add up to 1 where no flow in it is known. */
function sum(terms: StepTerms, { stream, quantity }: Use): Term | null {
  const index = terms.model.streamIndex.get(stream ?? '')
  if (index === undefined) return null
  const { basis } = terms.model.problem
  const isOther = quantity === (basis === 'mass' ? 'moleFlow' : 'massFlow')
  const family = StepTerms.familyOf(isOther)
  const there = terms.present(index)
  const parts = there.filter((c) => terms.known(index, family.componentFlow, c) !== undefined)
  const shares = there.filter((c) => terms.known(index, family.fraction, c) !== undefined)
  const isOnlyShares = parts.length < shares.length && shares.length >= there.length - 1
  if (there.length === 1 || isOnlyShares)
    return equal(added(there.map((c) => terms.share(index, c, family))), { symbols: '1', numbers: '1' })
  return equal(terms.total(index, family), added(there.flatMap((c) => terms.part(index, c, family) ?? [])))
}

function composition(terms: StepTerms, { uses }: Step, { id, component }: Use): Term | null {
  const index = terms.model.componentIndex.get(component ?? '')
  if (index === undefined) return null
  const streams = uses.flatMap((use) =>
    use.equation === 'composition' && use.id === id && use.component === component
      ? (terms.model.streamIndex.get(use.stream ?? '') ?? [])
      : [],
  )
  return streams.length < 2 ? null : equal(...streams.map((s) => terms.share(s, index)))
}

/** A rule as the book writes it; the plain ratios of flows also with their numbers. */
function ruled(terms: StepTerms, rule: Rule, component: string | undefined): Term {
  const written = writtenRule(terms.view, rule)
  const { model } = terms
  const value = 'value' in rule && typeof rule.value === 'number' ? rule.value : undefined
  const stream = (id: string): number => model.streamIndex.get(id) ?? -1
  const c = model.componentIndex.get(component ?? ('component' in rule ? rule.component : '')) ?? -1
  if (value === undefined) return { symbols: written, numbers: written }
  const factor = terms.fraction(value)
  const times = ({ numbers }: Term): string => `${factor} × ${numbers}`
  const put = (left: Term | null, right: Term | null): Term =>
    left && right
      ? { symbols: written, numbers: `${left.numbers} = ${times(right)}` }
      : { symbols: written, numbers: written }
  if (rule.kind === 'flowRatio') return put(terms.total(stream(rule.stream)), terms.total(stream(rule.of)))
  if (rule.kind === 'componentRatio')
    return put(
      terms.part(stream(rule.stream), c),
      terms.part(stream(rule.of.stream), model.componentIndex.get(rule.of.component) ?? -1),
    )
  if (rule.kind !== 'split' && rule.kind !== 'recovery') return { symbols: written, numbers: written }
  const { inlets } = model.plant[model.unitIndex.get(rule.unit) ?? -1] ?? { inlets: [] }
  const fed = c < 0 ? inlets.map((s) => terms.total(s)) : inlets.flatMap((s) => terms.part(s, c) ?? [])
  const all = added(fed)
  const right = fed.length > 1 ? { ...all, numbers: `(${all.numbers})` } : all
  return put(c < 0 ? terms.total(stream(rule.stream)) : terms.part(stream(rule.stream), c), right)
}
