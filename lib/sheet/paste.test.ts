import { describe, expect, it } from 'vitest'
import { fillOf, placeBlock } from './paste'
import { extendTo, selectCell } from './selection'

const grid = { rows: ['r1', 'r2', 'r3', 'r4'], columns: ['a', 'b', 'c', 'd'] }
const cell = (place: string) => ({ row: place.slice(0, 2), column: place.slice(2) })
const range = (from: string, to: string) => extendTo(selectCell(cell(from)), cell(to))
const told = (cells: { row: string; column: string; text: string }[]): string =>
  cells.map(({ row, column, text }) => `${row}${column}=${text}`).join(' ')

describe('a pasted block', () => {
  it('is laid from the active cell, and selected', () => {
    const placed = placeBlock(grid, selectCell(cell('r2b')), [
      ['1', '2'],
      ['3', '4'],
    ])
    expect(told(placed.cells)).toBe('r2b=1 r2c=2 r3b=3 r3c=4')
    expect(placed).toMatchObject({ outside: [], missing: { rows: 0, columns: 0 }, ragged: false })
    expect(placed.selection).toEqual({ active: cell('r2b'), anchor: cell('r2b'), focus: cell('r3c') })
  })

  it('is laid from the top left corner of a range, whichever way it was drawn', () => {
    expect(told(placeBlock(grid, range('r3c', 'r2b'), [['1', '2', '3']]).cells)).toBe('r2b=1 r2c=2 r2d=3')
  })

  it('fills a range that is a whole multiple of it', () => {
    expect(told(placeBlock(grid, range('r1a', 'r2b'), [['x']]).cells)).toBe('r1a=x r1b=x r2a=x r2b=x')
    expect(told(placeBlock(grid, range('r1a', 'r2b'), [['x'], ['y']]).cells)).toBe('r1a=x r1b=x r2a=y r2b=y')
    expect(told(placeBlock(grid, range('r1a', 'r3a'), [['x'], ['y']]).cells)).toBe('r1a=x r2a=y')
  })

  it('says what falls beyond the grid, and by how much', () => {
    const placed = placeBlock(grid, selectCell(cell('r4d')), [
      ['1', '2'],
      ['3', '4'],
    ])
    expect(told(placed.cells)).toBe('r4d=1')
    expect(placed.outside).toEqual([
      { row: 0, column: 1, text: '2' },
      { row: 1, column: 0, text: '3' },
      { row: 1, column: 1, text: '4' },
    ])
    expect(placed.missing).toEqual({ rows: 1, columns: 1 })
    expect(placed.selection?.focus).toEqual(cell('r4d'))
  })

  it('leaves alone the cells that a short row lacks, but clears with an empty one', () => {
    const placed = placeBlock(grid, selectCell(cell('r1a')), [['1', '', '3'], ['4']])
    expect(told(placed.cells)).toBe('r1a=1 r1b= r1c=3 r2a=4')
    expect(placed.ragged).toBe(true)
  })

  it('is nothing where there is nothing, or nowhere to lay it', () => {
    expect(placeBlock(grid, selectCell(cell('r1a')), []).selection).toBeUndefined()
    expect(placeBlock({ rows: [], columns: [] }, selectCell(cell('r1a')), [['1']]).cells).toEqual([])
  })
})

describe('filling', () => {
  it('copies the first row down and the first column right', () => {
    const pairs = (way: 'down' | 'right') =>
      fillOf(grid, range('r1a', 'r2b'), way)
        .map(({ from, to }) => `${from.row}${from.column}>${to.row}${to.column}`)
        .join(' ')
    expect(pairs('down')).toBe('r1a>r2a r1b>r2b')
    expect(pairs('right')).toBe('r1a>r1b r2a>r2b')
  })
})
