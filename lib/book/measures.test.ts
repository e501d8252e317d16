import { describe, expect, it } from 'vitest'
import type { Problem } from '@/lib/balance/problem'
import { apply } from './change'
import type { Edit } from './edits/draft'
import { setGiven } from './edits/givens'
import { addMeasure, updateMeasure } from './edits/measures'
import { remove, removeComponents } from './edits/remove'
import { fromProblem } from './from-problem'
import { measureTitle } from './measures'
import { type BookState, inOrder, recordsOf, stateOf } from './state'
import { toProblem } from './to-problem'

let count = 0
const makeId = (): string => `id-${++count}`

const problem: Problem = {
  format: 'tallybrook/1',
  name: 'Pulp',
  basis: 'mass',
  flowUnit: 't/h',
  components: [
    { id: 'Ore', formula: 'SiO2' },
    { id: 'Cu', formula: 'CuS' },
    { id: 'Water', formula: 'H2O' },
  ],
  streams: [{ id: '1' }, { id: '2', density: 1200 }],
  units: [],
  links: {},
  reactions: [],
  parameters: [],
  givens: [
    { stream: '1', quantity: 'groupMassRatio', parts: ['Water'], over: ['Ore', 'Cu'], value: 1.5 },
    { stream: '1', quantity: 'dryMassFraction', component: 'Cu', without: ['Water'], value: 20, unit: '%' },
    { stream: '2', quantity: 'elementMassFraction', element: 'Cu', value: 4000, unit: 'ppm', instrument: 'XRF' },
    { stream: '2', quantity: 'groupMassRatio', parts: ['Water'], over: ['Cu', 'Ore'], value: 2 },
  ],
  relations: [],
}

const opened = (): BookState => stateOf(fromProblem(problem, makeId))
const caseOf = (state: BookState): string => inOrder(state.case)[0]?.id ?? ''
const done = (state: BookState, edit: Edit): BookState => {
  if (!edit.ok) throw new Error(edit.error)
  const applied = apply(state, edit.value)
  if (!applied.ok) throw new Error('does not apply')
  return applied.state
}
const component = (state: BookState, tag: string): string =>
  inOrder(state.component).find((one) => one.tag === tag)?.id ?? ''

describe('rows of measures', () => {
  it('come from a problem, one for each measure however its groups are ordered, and lead back to it', () => {
    const state = opened()
    expect(inOrder(state.measure).map((measure) => measureTitle(state, measure))).toEqual([
      'Water : Ore + Cu',
      'Cu without Water',
      'Element Cu',
    ])
    const back = toProblem(state, caseOf(state))
    expect(back.leftOut).toEqual([])
    const bySome = (givens: Problem['givens']) =>
      givens?.map(({ over, ...given }) => JSON.stringify({ ...given, over: over && [...over].sort() })).sort()
    expect(bySome(back.problem.givens)).toEqual(bySome(problem.givens))
    expect(back.rows).toEqual(['volumeFlow', ...inOrder(state.measure).map(({ id }) => id)])
    expect(back.wanted[2]).toEqual({ quantity: 'dryMassFraction', component: 'Cu', without: ['Water'] })
  })

  it('are added, renamed and given other groups; the same measure twice is refused', () => {
    const state = opened()
    const [ore, copper, water] = ['Ore', 'Cu', 'Water'].map((tag) => component(state, tag)) as [string, string, string]
    const more = done(state, addMeasure(state, 'groupMassRatio', { group: [ore, copper], name: 'Solids' }, makeId))
    const added = inOrder(more.measure).at(-1)
    expect(added).toMatchObject({ name: 'Solids', over: 'stream', unit: '1', position: 4 })
    const again = addMeasure(more, 'groupMassRatio', { group: [copper, ore] }, makeId)
    expect(again).toEqual({ ok: false, error: 'There is already a row of this measure: Solids.' })
    const changed = done(
      more,
      updateMeasure(more, added?.id ?? '', { group: [ore], over: [water], unit: 'g/kg', name: '' }, makeId),
    )
    expect(measureTitle(changed, changed.measure.get(added?.id ?? '') as never)).toBe('Ore : Water')
    expect(addMeasure(state, 'groupMassRatio', { group: [] }, makeId).ok).toBe(false)
    expect(addMeasure(state, 'groupMassRatio', { group: [ore], over: [] }, makeId).ok).toBe(false)
    expect(addMeasure(state, 'elementMassFraction', { element: 'Xx' }, makeId)).toEqual({
      ok: false,
      error: '“Xx” is no element known here: type its symbol, such as Cu or S',
    })
    expect(addMeasure(state, 'groupMoleRatio', { group: [ore], unit: 'wt%' }, makeId).ok).toBe(false)
    expect(addMeasure(state, 'dryMassFraction', { without: [water] }, makeId).ok).toBe(false)
  })

  it('take their values and groups along when they go, and go when a group is left empty', () => {
    const state = opened()
    const [first] = inOrder(state.measure)
    const without = done(state, remove(state, 'measure', [first?.id ?? ''], makeId))
    expect(without.given.size).toBe(2)
    expect([...without.measurePart.values()].some(({ measureId }) => measureId === first?.id)).toBe(false)
    const dry = done(state, removeComponents(state, [component(state, 'Water')], makeId))
    expect(inOrder(dry.measure).map(({ quantity }) => quantity)).toEqual(['elementMassFraction'])
    const poorer = done(state, removeComponents(state, [component(state, 'Ore')], makeId))
    expect(measureTitle(poorer, inOrder(poorer.measure)[0] as never)).toBe('Water : Cu')
  })

  it('hold typed values under their row, and say why one is left out', () => {
    const state = opened()
    const copper = inOrder(state.measure)[2]
    const place = {
      caseId: caseOf(state),
      streamId: inOrder(state.stream)[0]?.id ?? '',
      quantity: 'elementMassFraction' as const,
      componentId: null,
      measureId: copper?.id ?? null,
    }
    const typed = setGiven(state, place, { text: '2 %', value: 2, unit: '%', halfWidth: 0.5 }, makeId)
    expect(typed.ok && typed.value.label).toBe('Element Cu in 1: 2 %')
    const after = done(state, typed)
    expect(toProblem(after, place.caseId).problem.givens).toHaveLength(5)
    const bare = stateOf(
      recordsOf(after).map((record) =>
        record.kind === 'component' && record.tag === 'Ore' ? { ...record, formula: null } : record,
      ),
    )
    expect(toProblem(bare, place.caseId).leftOut[0]?.what).toBe(
      'Element Cu in 1: needs a formula for Ore, which can be in stream 1.',
    )
    const wrong = setGiven(
      state,
      { ...place, quantity: 'groupMassRatio' },
      { text: '2', value: 2, unit: '1', halfWidth: null },
      makeId,
    )
    expect(wrong.ok).toBe(false)
  })
})
