import { describe, expect, it } from 'vitest'
import { overlapOf, overlapSentences } from './overlap'

describe('why a boundary has fewer independent equations than it counts', () => {
  it('a balance with nothing unknown adds nothing', () => {
    expect(overlapSentences([overlapOf({ equation: 'balance', component: 'W' }, [])])).toEqual([
      'The W balance holds nothing unknown, so it adds nothing.',
    ])
  })

  it('balances repeat each other where streams have one composition', () => {
    const from = [{ equation: 'balance', component: 'W' } as const, { equation: 'composition', id: 'S-1' } as const]
    const overlaps = ['A', 'B'].map((component) => overlapOf({ equation: 'balance', component }, from))
    expect(overlaps.map(({ reason }) => reason)).toEqual(['composition', 'composition'])
    expect(overlapSentences(overlaps)).toEqual([
      'The A balance and the B balance repeat the others, because the streams have one composition.',
    ])
  })

  it('else it names what the equation follows from', () => {
    const overlap = overlapOf({ equation: 'sum', stream: '4' }, [{ equation: 'rule', id: 'Q1' }])
    expect(overlapSentences([overlap])).toEqual(['The sum of stream 4 follows from rule Q1.'])
  })
})
