import { describe, expect, it } from 'vitest'
import type { Given, Problem } from '../problem'
import { solve } from '../solve'
import { measureNext } from './measure-next'

const flow = (stream: string, value: number): Given => ({ stream, quantity: 'flow', value })
const fraction = (stream: string, component: string, value: number): Given => ({
  stream,
  quantity: 'massFraction',
  component,
  value,
})

/** Two tanks that nothing joins; each takes two streams and gives one. */
const problem = (givens: Given[]): Problem => ({
  format: 'tallybrook/1',
  name: 'two tanks',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [{ id: 'water' }, { id: 'salt' }],
  streams: ['1', '2', '3', '4', '5', '6'].map((id) => ({ id })),
  units: [
    { id: 'A', kind: 'mixer' },
    { id: 'B', kind: 'mixer' },
  ],
  links: { A: { '1': 'in', '2': 'in', '3': 'out' }, B: { '4': 'in', '5': 'in', '6': 'out' } },
  givens,
})

const left = [flow('1', 100), fraction('1', 'salt', 0.1), flow('2', 50), fraction('2', 'salt', 0.2)]
const right = [flow('4', 100), fraction('4', 'salt', 0.1), flow('5', 50)]

describe('measureNext', () => {
  it('is empty where nothing is unknown', () =>
    expect(measureNext(problem([...left, ...right, fraction('5', 'salt', 0.2)]))).toEqual([]))

  it('names every cell that closes the table: what hangs on one unknown composition is settled together', () => {
    const open = problem([...left, ...right])
    const next = measureNext(open)
    expect(next.every(({ leaves, settles }) => leaves === 0 && settles === 8)).toBe(true)
    expect(next.map(({ set: [place] }) => `${place?.stream} ${place?.quantity} ${place?.component}`).sort()).toEqual(
      ['5', '6'].flatMap((s) =>
        ['componentFlow', 'massFraction'].flatMap((q) => [`${s} ${q} salt`, `${s} ${q} water`]),
      ),
    )
  })

  it('leaves out what cannot be measured, and says what is left then', () => {
    const open = problem([...left, ...right])
    expect(measureNext(open, { cannot: { components: ['salt', 'water'] } })).toEqual([])
    const only6 = measureNext(open, { cannot: { analyses: ['5'] } })
    expect(new Set(only6.map(({ set: [place] }) => place?.stream))).toEqual(new Set(['6']))
    const place = { stream: '6', quantity: 'massFraction', component: 'salt' } as const
    const fewer = measureNext(open, { cannot: { analyses: ['5'], places: [place] } })
    expect(fewer).toHaveLength(only6.length - 1)
  })

  it('prefers a set that can be closed within what can be measured', () => {
    const [best] = measureNext(problem(left), { cannot: { analyses: ['6'] } })
    expect(best).toMatchObject({ settles: 15, leaves: 0 })
    expect(best?.set).toHaveLength(4)
    for (const place of best?.set ?? []) expect(place.stream === '6' && place.component !== undefined).toBe(false)
  })

  it('gives a set that settles what it can where the table cannot be closed', () => {
    const [best] = measureNext(problem(left), { cannot: { analyses: ['5', '6'] } })
    expect(best?.leaves).toBeGreaterThan(0)
    expect(best?.settles).toBeGreaterThan(0)
  })

  it('claims nothing in a block that is at odds, and goes on in the others', () => {
    const open = problem([...left, flow('3', 200), ...right])
    expect(solve(open).status).toBe('atOdds')
    const next = measureNext(open)
    expect(next.length).toBeGreaterThan(0)
    for (const { set, leaves } of next) {
      for (const { stream } of set) expect(['4', '5', '6']).toContain(stream)
      expect(leaves).toBe(solve(open).summary.unknown - 8)
    }
  })

  it('sets the basis first where no flow is typed: any flow will do', () => {
    const open = problem(
      [...left, ...right, fraction('5', 'salt', 0.2)].filter(
        ({ quantity, stream }) => quantity !== 'flow' || stream < '4',
      ),
    )
    const rates = { ...open, relations: [{ id: 'half', kind: 'flowRatio' as const, stream: '5', of: '4', value: 0.5 }] }
    const next = measureNext(rates)
    expect(next[0]).toEqual({ set: [{ stream: '4', quantity: 'flow' }], settles: 9, leaves: 0 })
  })

  it('sees what turns linear: the split of one outlet gives the other', () => {
    const splitter: Problem = {
      ...problem([flow('1', 100), fraction('1', 'salt', 0.1)]),
      streams: ['1', '2', '3'].map((id) => ({ id })),
      units: [{ id: 'S', kind: 'splitter' }],
      links: { S: { '1': 'in', '2': 'out', '3': 'out' } },
    }
    const unknownFeed = { ...splitter, givens: [flow('1', 100)] }
    for (const open of [splitter, unknownFeed])
      for (const { set, leaves } of measureNext(open)) {
        const value = { flow: 40, componentFlow: 4, massFraction: 0.1 } as Record<string, number>
        const typed = set.map((place) => ({
          ...place,
          value:
            (place.stream === '1' ? 2.5 : place.stream === '3' ? 1.5 : 1) ** Number(place.quantity !== 'massFraction') *
            (value[place.quantity] as number) *
            (place.component === 'water' ? 9 : 1),
        }))
        const solved = solve({ ...open, givens: [...(open.givens ?? []), ...typed] })
        expect(solved.summary.unknown, JSON.stringify(set)).toBe(leaves)
      }
    expect(measureNext(unknownFeed)[0]).toMatchObject({ leaves: 0, set: { length: 2 } })
  })
})
