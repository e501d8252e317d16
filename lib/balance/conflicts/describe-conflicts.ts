import { placeOf } from '../measure/measure-name'
import { namedMeasure } from '../measure/named-measure'
import { isRatio as isRatioQuantity, typedValue } from '../measure/typed-value'
import type { Model } from '../model'
import type { Given, Rule } from '../problem'
import { assemble, fixedRuleValue } from '../rows/assemble'
import type { Member } from '../rows/members'
import { measuresOfRule } from '../rows/rules'
import type { Conflict } from '../solution'
import { knownMeasure } from '../states/knowledge'
import { resolve } from '../states/resolve'
import type { Circuit } from './circuit'
import { membersOf } from './circuit-space'
import type { ConflictSet, Settled } from './find-conflicts'

/** Columns times solutions that may be spent on what the others imply of a ratio; beyond, it is taken from the rows at hand. */
const MOST_WORK = 6_000

/** Each set as the result has it: where it meets, and for each member what the others imply. */
export function describeConflicts(model: Model, settled: Settled): Conflict[] {
  let work = 0
  const maySpend = (): boolean => {
    work += model.nColumns
    return work <= MOST_WORK
  }
  return settled.sets.map((set) => describe(model, settled, set, maySpend))
}

function describe(
  model: Model,
  settled: Settled,
  { code, circuit, stream }: ConflictSet,
  maySpend: () => boolean,
): Conflict {
  const givens: Conflict['givens'] = []
  const relations: Conflict['relations'] = []
  const nGivens = model.problem.givens?.length ?? 0
  const members = membersOf(circuit)
  for (const member of members) {
    // A plain flow goes into the rows linearly, so its share of the gap is exact; a ratio is solved for anew.
    const implied =
      code !== 'fractionSum' && (code === 'forcedZero' || isRatio(model, member)) && maySpend()
        ? impliedBy(model, settled, members, member)
        : undefined
    if (member < nGivens) {
      const given = model.problem.givens?.[member] as Given
      const typed = typedValue(model, given).value
      const by = implied === undefined ? circuit.gap / (circuit.weight.get(member) as number) : typed - implied
      givens.push({
        ...placeOf(given),
        typed,
        implied: typed - by,
        by,
      })
    } else {
      const rule = model.problem.relations?.[member - nGivens] as Rule
      const typed = 'value' in rule ? fixedRuleValue(model, rule.value) : undefined
      const by =
        implied === undefined || typed === undefined
          ? circuit.gap / ((circuit.weight.get(member) as number) || 1)
          : typed - implied
      relations.push({ id: rule.id, ...(typed !== undefined && { typed, implied: typed - by }), by })
    }
  }
  return { givens, relations, ...meetingPlace(model, settled, circuit, givens, stream), code }
}

function isRatio(model: Model, member: Member): boolean {
  const nGivens = model.problem.givens?.length ?? 0
  if (member >= nGivens) return true
  return isRatioQuantity((model.problem.givens as Given[])[member]?.quantity as Given['quantity'])
}

/** What the other members alone say of one member's measure, everything else at odds left out; undefined where nothing. */
function impliedBy(model: Model, settled: Settled, members: Member[], member: Member): number | undefined {
  const nGivens = model.problem.givens?.length ?? 0
  const leaveOut = new Set(settled.atOdds)
  for (const other of members) if (other !== member) leaveOut.delete(other)
  const { knowledge } = resolve(model, assemble(model, { leaveOut, adjusted: settled.adjusted }))
  if (member < nGivens) {
    const given = (model.problem.givens as Given[])[member] as Given
    const measure = namedMeasure(model, model.streamIndex.get(given.stream) as number, given)
    return measure && knownMeasure(knowledge, measure)
  }
  for (const measure of measuresOfRule(model, model.problem.relations?.[member - nGivens] as Rule)) {
    const value = knownMeasure(knowledge, measure)
    if (value !== undefined) return value
  }
  return undefined
}

/** The units whose balances take part, the one component or stream where there is only one. */
function meetingPlace(
  model: Model,
  { assembly }: Settled,
  { structure }: Circuit,
  givens: Conflict['givens'],
  stream: number | undefined,
): Pick<Conflict, 'boundary' | 'component' | 'stream'> {
  const units = new Set<number>()
  const components = new Set<number | undefined>()
  for (const number of structure) {
    const source = assembly.rows.sources[number]
    if (source?.type !== 'balance') continue
    units.add(source.unit)
    components.add(source.component)
  }
  const [component] = components
  const streams = new Set(givens.map((given) => given.stream))
  const only = units.size === 0 && streams.size === 1 ? [...streams][0] : undefined
  const at = stream === undefined ? only : (model.problem.streams[stream]?.id as string)
  return {
    boundary: [...units].sort((a, b) => a - b).map((unit) => model.problem.units[unit]?.id as string),
    ...(components.size === 1 &&
      component !== undefined && { component: model.problem.components[component]?.id as string }),
    ...(at !== undefined && { stream: at }),
  }
}
