import { describe, expect, it } from 'vitest'
import { awkwardCells } from './awkward-cells.fixture'
import { awkwardBuilds } from './awkward-tables.fixture'
import { readingOf, tableOf } from './reading.fixture'

const awkward = { ...awkwardCells, ...awkwardBuilds }

describe('awkward tables', () => {
  for (const [kind, cases] of Object.entries(awkward))
    describe(kind, () => {
      it.each(cases)('$name', ({ text, options, table, also }) => {
        const reading = readingOf(text, options)
        if (table) expect(tableOf(reading)).toEqual(table)
        if (also) expect(reading).toMatchObject(also)
      })
      it('has three cases', () => expect(cases.length).toBeGreaterThanOrEqual(3))
    })

  it('are of twenty kinds', () => expect(Object.keys(awkward).length).toBeGreaterThanOrEqual(20))
})
