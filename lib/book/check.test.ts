import { describe, expect, it } from 'vitest'
import { applied, bookOfProblem, smallPlant } from '@/tests/support/books'
import type { Change, FieldUpdate } from './change'
import { calledBy, check } from './check'
import { absenceId } from './ids'
import { type BookRecord, fieldsOf, kindOrder, placeId, references, schemas } from './kinds'
import { bookOf, emptyState, recordsOf } from './state'

const { state, caseId, id } = bookOfProblem(smallPlant)
const first = <K extends keyof typeof state>(kind: K) => [...state[kind].values()][0] as never as BookRecord
const change = (part: Partial<Change>): Change => ({
  id: 'change01',
  label: 'x',
  create: [],
  update: [],
  remove: [],
  ...part,
})
const problems = (part: Partial<Change>): string[] =>
  check(applied(state, change(part)), change(part)).map(({ what }) => what)
const set = (kind: FieldUpdate['kind'], recordId: string, fields: FieldUpdate['fields']) =>
  problems({ update: [{ kind, id: recordId, fields }] })

it('has nothing against a sound book', () => {
  const all = change({ create: recordsOf(state).filter(({ kind }) => kind !== 'book') })
  expect(check(state, all)).toEqual([])
})

describe('refuses', () => {
  const stream = id('stream', '101')
  it('fields that do not fit their kind', () => {
    expect(set('stream', stream, { density: [null, -5] })[0]).toMatch(/^stream 101: density/)
    expect(set('stream', stream, { tag: ['101', '  '] })[0]).toMatch(/needs a tag/)
    expect(set('unit', id('unit', 'T-1'), { unitKind: ['mixer', 'magic'] })).toHaveLength(1)
  })

  it('two of one tag, blanks aside, within a kind only', () => {
    expect(set('stream', stream, { tag: ['101', ' 102 '] })).toEqual(['There is already a stream  102 '])
    expect(set('stream', stream, { tag: ['101', 'T-1'] })).toEqual([])
  })

  it('a record that points at what is not there, and removing what is pointed at', () => {
    expect(set('reaction', id('reaction', 'R1'), { unitId: [id('unit', 'R-1'), 'none'] })).toEqual([
      'reaction R1: the unit that it names is gone',
    ])
    expect(problems({ remove: [state.unit.get(id('unit', 'R-1')) as BookRecord] })).toEqual([
      'reaction R1 still uses a removed unit',
    ])
  })

  it('a place that is not what the id says', () => {
    const absence = first('absence')
    expect(
      problems({ create: [{ ...absence, id: absenceId(stream, id('component', 'B')) } as BookRecord] })[0],
    ).toMatch(/does not fit its place/)
  })

  it('a stream that leaves a unit and enters it again', () => {
    const unitId = id('unit', 'T-1')
    expect(
      problems({ create: [{ kind: 'link', id: `${stream}/out`, streamId: stream, direction: 'out', unitId }] }),
    ).toEqual(['Stream 101 would leave T-1 and enter it again: clear one end first'])
  })

  it('a given that names a component where it must not, or none where it must', () => {
    const given = first('given') as Extract<BookRecord, { kind: 'given' }>
    const componentId = id('component', 'W')
    const wrong = { ...given, componentId, id: [caseId, given.streamId, 'flow', componentId, 'main'].join('/') }
    expect(problems({ create: [wrong] })).toHaveLength(1)
  })

  it('a component by difference without its name', () => {
    expect(set('stream', stream, { fractions: ['asTyped', 'difference'] })).toEqual([
      'stream 101: say which component is by difference',
    ])
  })

  it('another basis or flow unit once numbers lean on it, and making or removing a book', () => {
    const book = bookOf(state)
    expect(set('book', book.id, { basis: ['mass', 'mole'], flowUnit: ['kg/h', 'kmol/h'] })[0]).toMatch(
      /start a new book/,
    )
    expect(set('book', book.id, { flowUnit: ['kg/h', 't/d'] })[0]).toMatch(/lean on the flow unit/)
    expect(set('book', book.id, { flowUnit: ['kg/h', 'kmol/h'] })[0]).toBe(
      '“kmol/h” is no mass flow unit known here: kg/h, t/d or lb/h would fit',
    )
    expect(set('book', book.id, { name: ['Small plant', 'Large plant'] })).toEqual([])
    expect(problems({ create: [{ ...book, id: 'other' }] })).toContain('An edit cannot make a book')
    expect(check(state, change({ remove: [book] }))[0]?.what).toMatch(/archive it in the list/)
  })
})

describe('the table of kinds', () => {
  it('orders kinds after those that they point at', () => {
    for (const kind of kindOrder)
      for (const target of Object.values(references[kind]))
        expect(kindOrder.indexOf(target)).toBeLessThan(kindOrder.indexOf(kind))
  })

  it('points by fields that there are', () => {
    for (const kind of kindOrder)
      for (const field of Object.keys(references[kind])) expect(fieldsOf[kind]).toContain(field)
  })

  it('has a place for exactly the records whose place is their identity', () => {
    for (const record of recordsOf(state)) expect([undefined, record.id]).toContain(placeId(record))
    expect(
      recordsOf(state)
        .filter((record) => placeId(record) !== undefined)
        .map(({ kind }) => kind),
    ).toContain('given')
    expect(schemas.given.shape.quantity.options).toHaveLength(14)
  })

  it('calls records by tag or name, and has no book in an empty state', () => {
    expect(calledBy(first('case'))).toBe('operating case Base case')
    expect(calledBy(first('absence'))).toBe('absent component')
    expect(() => bookOf(emptyState())).toThrow()
  })
})
