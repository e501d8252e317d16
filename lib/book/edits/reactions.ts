import { type ComponentId, coefficientId, type ReactionId, type UnitId } from '../ids'
import type { BookRecord, RecordOf } from '../kinds'
import type { BookState } from '../state'
import { type Edit, edit, type MakeId, refuse, updateOf } from './draft'
import { listedIn, nextTag, takenTags } from './tags'

export type Coefficients = readonly { componentId: ComponentId; value: number }[]

/** A reaction in a unit, with its coefficients where they are known; negative ones are consumed. */
export function addReaction(
  state: BookState,
  input: { unitId: UnitId; tag?: string; name?: string; coefficients?: Coefficients },
  makeId: MakeId,
): Edit {
  if (!state.unit.has(input.unitId)) return refuse('This unit is no longer in the book.')
  const list = listedIn(state, 'reaction')
  const last = list.at(-1)
  const reaction: RecordOf<'reaction'> = {
    kind: 'reaction',
    id: makeId(),
    tag: input.tag?.trim() || nextTag(takenTags(state, 'reaction'), 'reaction', last?.tag),
    name: input.name?.trim() ?? '',
    unitId: input.unitId,
    position: Math.floor(last?.position ?? 0) + 1,
  }
  const coefficients = new Map((input.coefficients ?? []).map(({ componentId, value }) => [componentId, value]))
  const create: BookRecord[] = [reaction]
  for (const [componentId, value] of coefficients)
    if (value !== 0) create.push(newCoefficient(reaction.id, componentId, value))
  return edit(state, makeId, `Add reaction ${reaction.tag} in ${state.unit.get(input.unitId)?.tag}`, { create })
}

/** Sets a stoichiometric coefficient; 0 or null takes the component out of the reaction. */
export function setCoefficient(
  state: BookState,
  reactionId: ReactionId,
  componentId: ComponentId,
  value: number | null,
  makeId: MakeId,
): Edit {
  const reaction = state.reaction.get(reactionId)
  const component = state.component.get(componentId)
  if (!reaction || !component) return refuse(`This ${reaction ? 'component' : 'reaction'} is no longer in the book.`)
  const old = state.coefficient.get(coefficientId(reactionId, componentId))
  const name = `${component.tag} in reaction ${reaction.tag}`
  if (value === null || value === 0) return edit(state, makeId, `${name}: takes no part`, { remove: old ? [old] : [] })
  return edit(state, makeId, `${name}: ${value}`, {
    create: old ? [] : [newCoefficient(reactionId, componentId, value)],
    update: old ? [updateOf(old, { value })] : [],
  })
}

const newCoefficient = (reactionId: string, componentId: string, value: number): RecordOf<'coefficient'> => ({
  kind: 'coefficient',
  id: coefficientId(reactionId, componentId),
  reactionId,
  componentId,
  value,
})
