import { type ComponentId, coefficientId, type ReactionId, type UnitId } from '../ids'
import type { BookRecord, RecordOf } from '../kinds'
import { readReaction } from '../reaction-text'
import { type BookState, inOrder } from '../state'
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

/** Gives a reaction the coefficients that a text says: "2 H2 + O2 -> 2 H2O"; an empty text takes all of them out. */
export function setReactionText(state: BookState, reactionId: ReactionId, text: string, makeId: MakeId): Edit {
  const reaction = state.reaction.get(reactionId)
  if (!reaction) return refuse('This reaction is no longer in the book.')
  const read =
    text.trim() === '' ? { ok: true as const, coefficients: [] } : readReaction(text, inOrder(state.component))
  if (!read.ok) return refuse(read.what)
  const wanted = new Map(read.coefficients.map(({ componentId, value }) => [componentId, value]))
  const old = [...state.coefficient.values()].filter((its) => its.reactionId === reactionId)
  const standing = new Set(old.map(({ componentId }) => componentId))
  return edit(state, makeId, `Reaction ${reaction.tag}: ${text.trim() || 'cleared'}`, {
    create: [...wanted].filter(([id]) => !standing.has(id)).map(([id, value]) => newCoefficient(reactionId, id, value)),
    update: old.map((its) => updateOf(its, { value: wanted.get(its.componentId) ?? its.value })),
    remove: old.filter(({ componentId }) => !wanted.has(componentId)),
  })
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
