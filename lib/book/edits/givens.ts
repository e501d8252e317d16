import type { FieldUpdate } from '../change'
import type { BookRecord, RecordOf } from '../kinds'
import { convertSpread } from '../spread'
import type { BookState } from '../state'
import { counted, type Edit, edit, listed, type MakeId, refuse, updateOf } from './draft'
import { type GivenPlace, idOfPlace, placeName } from './place'

/** What was typed: read, or not readable and kept word for word. */
export type TypedGiven =
  | { text: string; value: number; unit: string | null; halfWidth: number | null }
  | { text: string; value: null }

/** null clears the cell. */
export type GivenCell = GivenPlace & { typed: TypedGiven | null }

/** Types into one cell; an empty one is cleared. */
export function setGiven(state: BookState, place: GivenPlace, typed: TypedGiven | null, makeId: MakeId): Edit {
  const name = placeName(state, place)
  return setGivens(
    state,
    [{ ...place, typed }],
    makeId,
    typed === null ? `${name}: cleared` : `${name}: ${said(typed)}`,
  )
}

/**
 * Types into many cells in one change. What a given carries besides its number (source, note, use) stays; its uncertainty
 * is carried over to the new unit. Refused as a whole where a component cannot be in the stream: 0 or nothing may stand there.
 */
export function setGivens(state: BookState, cells: readonly GivenCell[], makeId: MakeId, label?: string): Edit {
  const create = new Map<string, BookRecord>()
  const update = new Map<string, FieldUpdate | undefined>()
  const remove = new Map<string, BookRecord>()
  const absent: string[] = []
  for (const cell of cells) {
    const id = idOfPlace(cell)
    const old = state.given.get(id)
    const { typed } = cell
    create.delete(id)
    update.delete(id)
    remove.delete(id)
    if (typed === null) {
      if (old) remove.set(id, old)
      continue
    }
    if (typed.text.length > 400)
      return refuse(`${placeName(state, cell)}: what was typed is longer than 400 characters.`)
    if (cell.componentId !== null && state.absence.has(`${cell.streamId}/${cell.componentId}`)) {
      if (typed.value !== 0) absent.push(`${tagOf(state, cell.componentId)} in ${streamTag(state, cell.streamId)}`)
      continue
    }
    if (old) update.set(id, updateOf(old, numberOf(state, typed, old)))
    else create.set(id, newGiven(cell, id, typed))
  }
  if (absent.length > 0)
    return refuse(
      `${listed(absent)}: cannot be present there. Let the component be present first, then type its value.`,
    )
  const changed = create.size + update.size
  return edit(state, makeId, label ?? labelOf(changed, remove.size), {
    create: [...create.values()],
    update: [...update.values()],
    remove: [...remove.values()],
  })
}

/** Clears cells: what was given there may then follow from the rest. */
export function clearGivens(state: BookState, places: readonly GivenPlace[], makeId: MakeId): Edit {
  const standing = places.filter((place) => state.given.has(idOfPlace(place)))
  const [first] = standing
  const label = first && standing.length === 1 ? `${placeName(state, first)}: cleared` : undefined
  return setGivens(
    state,
    standing.map((place) => ({ ...place, typed: null })),
    makeId,
    label,
  )
}

export type GivenDetails = Partial<
  Pick<RecordOf<'given'>, 'sourceKind' | 'source' | 'note' | 'sigma' | 'use' | 'halfWidth'>
>

const detailNames: Record<keyof GivenDetails, string> = {
  sourceKind: 'kind of source',
  source: 'source',
  note: 'note',
  sigma: 'uncertainty',
  use: 'use',
  halfWidth: 'rounding',
}

/** What a given carries besides its number. `sigma` and `halfWidth` are in the given's unit. */
export function setGivenDetails(state: BookState, id: string, details: GivenDetails, makeId: MakeId): Edit {
  const given = state.given.get(id)
  if (!given) return refuse('There is no value in this cell any more.')
  for (const field of ['sigma', 'halfWidth'] as const) {
    const width = details[field]
    if (width != null && !(width > 0 && Number.isFinite(width)))
      return refuse(`The ${detailNames[field]} must be more than 0: leave it empty where it is not known.`)
  }
  const update = updateOf(given, details)
  const fields = Object.keys(update?.fields ?? {}) as (keyof GivenDetails)[]
  const what = fields.map((field) => {
    const to = details[field]
    return to === null || to === '' ? `${detailNames[field]} cleared` : `${detailNames[field]} ${to}`
  })
  return edit(state, makeId, `${placeName(state, given)}: ${what.join(', ')}`, { update: [update] })
}

function newGiven(place: GivenPlace, id: string, typed: TypedGiven): RecordOf<'given'> {
  const { caseId, streamId, quantity, componentId, measureId = null, instrument = 'main' } = place
  return {
    kind: 'given',
    id,
    caseId,
    streamId,
    quantity,
    componentId,
    measureId,
    instrument,
    text: typed.text,
    value: typed.value,
    unit: typed.value === null ? null : typed.unit,
    halfWidth: typed.value === null ? null : typed.halfWidth,
    sigma: null,
    use: 'given',
    sourceKind: null,
    source: null,
    note: null,
  }
}

function numberOf(state: BookState, typed: TypedGiven, old: RecordOf<'given'>): Partial<RecordOf<'given'>> {
  // A wrong entry has no number; the uncertainty and its unit wait for the next right one.
  if (typed.value === null) return { text: typed.text, value: null, halfWidth: null }
  return {
    text: typed.text,
    value: typed.value,
    unit: typed.unit,
    halfWidth: typed.halfWidth,
    sigma: convertSpread(state, old, typed.unit),
  }
}

function said(typed: TypedGiven): string {
  if (typed.value === null) return `“${typed.text}” (not a number)`
  const bare = typed.unit !== null && /\d$/.test(typed.text.trim())
  return bare ? `${typed.text.trim()} ${typed.unit}` : typed.text.trim()
}

function labelOf(changed: number, cleared: number): string {
  const parts: string[] = []
  if (changed > 0 || cleared === 0) parts.push(`${counted(changed, 'value')} typed`)
  if (cleared > 0) parts.push(`${counted(cleared, 'value')} cleared`)
  return parts.join(', ')
}

const tagOf = (state: BookState, id: string): string => state.component.get(id)?.tag ?? ''
const streamTag = (state: BookState, id: string): string => state.stream.get(id)?.tag ?? ''
