import loadHighs from 'highs'
import { describe, expect, it } from 'vitest'
import type { Given, Problem } from '../problem'
import { solve } from '../solve'
import { limitsOf } from './limits'
import { solveLpBy } from './programme'

const solveLp = solveLpBy(await loadHighs())

const flow = (stream: string, value: number): Given => ({ stream, quantity: 'flow', value })
const fraction = (stream: string, component: string, value: number): Given => ({
  stream,
  quantity: 'massFraction',
  component,
  value,
})

/** A mixer of 1 and 2 that gives 3, beside a second one that nothing joins to it. */
const problem = (givens: Given[], more: Partial<Problem> = {}): Problem => ({
  format: 'tallybrook/1',
  name: 'mixers',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [{ id: 'A' }, { id: 'B' }],
  streams: ['1', '2', '3', '4', '5', '6'].map((id) => ({ id })),
  units: [
    { id: 'M', kind: 'mixer' },
    { id: 'N', kind: 'mixer' },
  ],
  links: { M: { '1': 'in', '2': 'in', '3': 'out' }, N: { '4': 'in', '5': 'in', '6': 'out' } },
  givens,
  ...more,
})

const limits = (
  book: Problem,
  stream: string,
  quantity: 'flow' | 'componentFlow' | 'massFraction' = 'flow',
  component?: string,
) => limitsOf(book, solve(book), { stream, quantity, ...(component !== undefined && { component }) }, solveLp)

const reached = (value: number) => ({ value: expect.closeTo(value, 6), isReached: true })
const approached = (value: number) => ({ value: expect.closeTo(value, 6), isReached: false })
const none = { value: null, isReached: false }

describe('limits of an unknown, worked by hand', () => {
  it('an inlet lies between nothing and the whole outlet', () =>
    expect(limits(problem([flow('3', 100)]), '1')).toEqual({
      found: true,
      least: reached(0),
      greatest: reached(100),
      atLeastAsWide: false,
    }))

  it('without an upper limit none is made up', () => {
    const book = problem([flow('1', 100)])
    expect(limits(book, '2')).toMatchObject({ least: reached(0), greatest: none })
    expect(limits(book, '3')).toMatchObject({ least: reached(100), greatest: none })
  })

  it('a component that enters has to leave: 40 of A in, so at least 40 of A and 40 in all', () => {
    const book = problem([flow('1', 100), fraction('1', 'A', 0.4), flow('3', 150)])
    expect(limits(book, '3', 'componentFlow', 'A')).toMatchObject({ least: reached(40), greatest: reached(90) })
    expect(limits(book, '3', 'massFraction', 'A')).toMatchObject({
      least: reached(40 / 150),
      greatest: reached(90 / 150),
    })
    expect(limits(book, '2', 'massFraction', 'A')).toMatchObject({ least: reached(0), greatest: reached(1) })
  })

  it('a share that only an endless flow would thin out is approached, not reached', () => {
    const streams = problem([]).streams.map((one) =>
      one.id === '1' ? { ...one, components: ['A'] } : one.id === '2' ? { ...one, components: ['B'] } : one,
    )
    const book = problem([flow('1', 100)], { streams })
    expect(limits(book, '3', 'massFraction', 'A')).toMatchObject({ least: approached(0), greatest: reached(1) })
    expect(limits(book, '3', 'massFraction', 'B')).toMatchObject({ least: reached(0), greatest: approached(1) })
  })

  it('a share that any flow has can have its limit reached, also where no flow is typed', () =>
    expect(limits(problem([fraction('1', 'A', 0.4), fraction('2', 'A', 0.1)]), '3', 'massFraction', 'A')).toMatchObject(
      {
        least: reached(0.1),
        greatest: reached(0.4),
      },
    ))

  it('there are none where a flow would be negative', () =>
    expect(
      limits(problem([flow('1', 100), flow('3', 60), fraction('1', 'A', 0.4)]), '2', 'componentFlow', 'A'),
    ).toEqual({
      found: false,
      why: 'negativeFlow',
    }))

  it('there are none in a block at odds; the other block has its own', () => {
    const book = problem([flow('1', 100), flow('2', 50), flow('3', 200), flow('6', 10)])
    expect(limits(book, '1', 'massFraction', 'A')).toEqual({ found: false, why: 'atOdds' })
    expect(limits(book, '4')).toMatchObject({ least: reached(0), greatest: reached(10) })
  })

  it('a rule that multiplies unknowns is left out, and that is said', () => {
    const book = problem([flow('3', 100), flow('6', 10)], {
      relations: [{ id: 'Q', kind: 'formula', text: 'part("1", "A") * part("1", "B") = 400' }],
    })
    expect(limits(book, '1')).toMatchObject({ least: reached(0), greatest: reached(100), atLeastAsWide: true })
    expect(limits(book, '4')).toMatchObject({ greatest: reached(10), atLeastAsWide: false })
  })

  it('a known cell has its value at both ends; a place that is not in the book has none', () => {
    const book = problem([flow('1', 30), flow('2', 50)])
    expect(limits(book, '3')).toMatchObject({ least: reached(80), greatest: reached(80) })
    expect(limits(book, '9')).toEqual({ found: false, why: 'noCell' })
  })
})
