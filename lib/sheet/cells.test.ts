import { describe, expect, it } from 'vitest'
import { type Grid, nextSelection } from './cells'
import { cellsOf, extendTo, keepSelection, type Selection, selectAll, selectCell } from './selection'

const rows = ['r1', 'r2', 'r3', 'r4', 'r5']
const columns = ['a', 'b', 'c', 'd', 'e']
/** "r2c" */
const cell = (place: string) => ({ row: place.slice(0, 2), column: place.slice(2) })
const told = (selection: Selection | undefined): string | undefined =>
  selection && `${selection.active.row}${selection.active.column}`
const filled = new Set(['r1a', 'r1b', 'r1d', 'r1e', 'r3a', 'r4a'])
const grid: Grid = { rows, columns, pageRows: 3, isFilled: ({ row, column }) => filled.has(row + column) }

function press(from: string, keys: string, start = selectCell(cell(from))): Selection | undefined {
  let selection: Selection | undefined = start
  for (const word of keys.split(' ')) {
    const parts = word.split('+')
    const key = parts.pop() as string
    selection =
      selection && nextSelection(grid, selection, { key, shift: parts.includes('Shift'), ctrl: parts.includes('Ctrl') })
  }
  return selection
}

describe('keys', () => {
  const cases: [from: string, keys: string, to: string | undefined][] = [
    ['r2b', 'ArrowUp', 'r1b'],
    ['r2b', 'ArrowDown', 'r3b'],
    ['r2b', 'ArrowLeft', 'r2a'],
    ['r2b', 'ArrowRight', 'r2c'],
    ['r1a', 'ArrowUp', 'r1a'],
    ['r1a', 'ArrowLeft', 'r1a'],
    ['r5e', 'ArrowDown', 'r5e'],
    ['r5e', 'ArrowRight', 'r5e'],
    ['r3c', 'Home', 'r3a'],
    ['r3c', 'End', 'r3e'],
    ['r3c', 'Ctrl+Home', 'r1a'],
    ['r3c', 'Ctrl+End', 'r5e'],
    ['r5c', 'PageUp', 'r2c'],
    ['r1c', 'PageDown', 'r4c'],
    ['r4c', 'PageDown', 'r5c'],
    ['r3c', 'Ctrl+PageDown', undefined],
    // To the end of the block, over the gap, to the end of the next block, to the edge.
    ['r1a', 'Ctrl+ArrowRight', 'r1b'],
    ['r1b', 'Ctrl+ArrowRight', 'r1d'],
    ['r1d', 'Ctrl+ArrowRight', 'r1e'],
    ['r1e', 'Ctrl+ArrowRight', 'r1e'],
    ['r1c', 'Ctrl+ArrowLeft', 'r1b'],
    ['r2a', 'Ctrl+ArrowRight', 'r2e'],
    ['r1a', 'Ctrl+ArrowDown', 'r3a'],
    ['r3a', 'Ctrl+ArrowDown', 'r4a'],
    ['r4a', 'Ctrl+ArrowDown', 'r5a'],
    ['r5a', 'Ctrl+ArrowUp', 'r4a'],
    ['r2b', 'Tab', 'r2c'],
    ['r2e', 'Tab', 'r3a'],
    ['r2a', 'Shift+Tab', 'r1e'],
    ['r5e', 'Tab', undefined],
    ['r1a', 'Shift+Tab', undefined],
    ['r2b', 'Enter', 'r3b'],
    ['r5b', 'Enter', 'r5b'],
    ['r2b', 'Shift+Enter', 'r1b'],
    ['r2b', 'Tab Tab Enter', 'r3b'],
    ['r2b', 'Tab ArrowDown Enter', 'r4c'],
    ['r2b', 'F2', undefined],
    ['r2b', 'x', undefined],
    ['r2b', 'Ctrl+Tab', undefined],
  ]
  it.each(cases)('%s %s', (from, keys, to) => {
    expect(told(press(from, keys))).toBe(to)
  })
})

describe('ranges', () => {
  it('grow with Shift from the corner that moves, and keep the active cell', () => {
    const selection = press('r2b', 'Shift+ArrowRight Shift+ArrowDown') as Selection
    expect(told(selection)).toBe('r2b')
    expect(cellsOf(grid, selection)).toEqual(['r2b', 'r2c', 'r3b', 'r3c'].map(cell))
    expect(cellsOf(grid, press('r3c', 'Shift+ArrowUp Shift+ArrowLeft') as Selection)).toEqual(
      ['r2b', 'r2c', 'r3b', 'r3c'].map(cell),
    )
    expect((press('r1a', 'Ctrl+Shift+ArrowRight Ctrl+Shift+ArrowRight') as Selection).focus).toEqual(cell('r1d'))
    expect((press('r2b', 'Ctrl+Shift+End') as Selection).focus).toEqual(cell('r5e'))
  })

  it('fall back to one cell at an arrow', () => {
    const selection = press('r2b', 'Shift+ArrowDown ArrowRight') as Selection
    expect(selection).toEqual(selectCell(cell('r2c')))
  })

  it('are gone round in by Tab and by Enter', () => {
    const range = extendTo(selectCell(cell('r2b')), cell('r3c'))
    const places = (key: string): (string | undefined)[] => {
      let selection: Selection | undefined = range
      return [1, 2, 3, 4].map(() => {
        selection = nextSelection(grid, selection as Selection, { key, shift: false, ctrl: false })
        return told(selection)
      })
    }
    expect(places('Tab')).toEqual(['r2c', 'r3b', 'r3c', 'r2b'])
    expect(places('Enter')).toEqual(['r3b', 'r2c', 'r3c', 'r2b'])
    expect(press('', 'Tab', range)).toMatchObject({ anchor: cell('r2b'), focus: cell('r3c') })
    expect(told(press('', 'Shift+Enter', range))).toBe('r3c')
  })

  it('take all at Ctrl+A, active cell kept', () => {
    const all = press('r2b', 'Ctrl+a') as Selection
    expect(cellsOf(grid, all)).toHaveLength(25)
    expect(told(all)).toBe('r2b')
    expect(selectAll({ rows: [], columns })).toBeUndefined()
  })
})

describe('rows and columns that move or go', () => {
  it('keeps a selection on its ids', () => {
    const selection = extendTo(selectCell(cell('r2b')), cell('r2c'))
    const moved = { rows, columns: ['a', 'c', 'x', 'b', 'd'] }
    expect(keepSelection(selection, grid, moved)).toEqual(selection)
    expect(cellsOf(moved, selection).map(({ column }) => column)).toEqual(['c', 'x', 'b'])
  })

  it('goes to what stands in the place of what went', () => {
    const at = (place: string, after: { rows: string[]; columns: string[] }) =>
      told(keepSelection(selectCell(cell(place)), grid, after))
    expect(at('r2b', { rows, columns: ['a', 'c', 'd'] })).toBe('r2c')
    expect(at('r2e', { rows, columns: ['a', 'c', 'd'] })).toBe('r2d')
    expect(at('r5a', { rows: ['n1', 'n2'], columns })).toBe('n1a')
    expect(at('r5a', { rows: [], columns })).toBeUndefined()
  })

  it('answers no key in an empty grid', () => {
    const empty = { ...grid, rows: [] }
    expect(
      nextSelection(empty, selectCell(cell('r1a')), { key: 'ArrowDown', shift: false, ctrl: false }),
    ).toBeUndefined()
  })
})
