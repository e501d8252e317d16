import { describe, expect, it } from 'vitest'
import { openBench } from './test-bench'

describe('keys of the stream table', () => {
  it('names a cell by row, stream, value, unit and state', () => {
    const { said } = openBench()
    expect(said('Total flow, stream 101')).toBe('Total flow, stream 101: 50\u00a0000 kg/h, given')
    expect(said('Total flow, stream 107')).toBe('Total flow, stream 107: 10\u00a0939 kg/h, solvable now')
    expect(said('Mass fraction of Sodium chloride, stream 103')).toBe(
      'Mass fraction of Sodium chloride, stream 103: absent',
    )
  })

  it('clears a given with Delete, and the cells that leaned on it turn unknown; Ctrl+Z brings all back', async () => {
    const { user, go, said, strip } = openBench()
    expect(strip()).toContain('79 cells follow from 11 given')
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    expect(said('Total flow, stream 101')).toBe('Total flow, stream 101: still unknown')
    expect(said('Total flow, stream 107')).toBe('Total flow, stream 107: still unknown')
    expect(strip()).toContain('1 more value closes the table')
    await user.keyboard('{Control>}z{/Control}')
    expect(said('Total flow, stream 107')).toContain('solvable now')
    await user.keyboard('{Control>}y{/Control}')
    expect(said('Total flow, stream 107')).toContain('still unknown')
  })

  it('types over a cell, takes a unit behind the number, and goes down on Enter', async () => {
    const { user, go, said, focused } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('60 t/h{Enter}')
    expect(said('Total flow, stream 101')).toBe('Total flow, stream 101: 60\u00a0000 kg/h, given')
    expect(focused()).toContain('Mass fraction of Water, stream 101')
  })

  it('goes right on Tab, left on Shift+Tab, and up on Shift+Enter', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 102')
    await user.keyboard('{Tab}')
    expect(focused()).toContain('Total flow, stream 103')
    await user.keyboard('{Shift>}{Tab}{/Shift}')
    expect(focused()).toContain('Total flow, stream 102')
    await user.keyboard('{Shift>}{Enter}{/Shift}')
    expect(focused()).toContain('To, stream 102')
  })

  it('lets Tab leave after Esc, so that the keyboard is not caught', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 102')
    await user.keyboard('{Escape}{Tab}')
    expect(focused()).not.toContain('Total flow')
  })

  it('opens the editor with what was typed on F2, and Esc leaves the cell as it was', async () => {
    const { user, go, said } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{F2}')
    const input = document.querySelector<HTMLInputElement>('.grid-editor')
    expect(input).toHaveValue('50000 kg/h')
    await user.keyboard('9{Escape}')
    expect(said('Total flow, stream 101')).toContain('50\u00a0000 kg/h, given')
  })

  it('does not turn what follows into a given when Enter is pressed twice', async () => {
    const { user, go, said } = openBench()
    await go('Total flow, stream 107')
    await user.keyboard('{Enter}{Enter}')
    expect(said('Total flow, stream 107')).toContain('solvable now')
  })

  it('moves by arrows, Home, End and Ctrl with them, over the section headings', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{ArrowDown}')
    expect(focused()).toContain('Mass fraction of Water, stream 101')
    await user.keyboard('{End}')
    expect(focused()).toContain('stream 112')
    await user.keyboard('{Home}')
    expect(focused()).toContain('Water')
    await user.keyboard('{Control>}{Home}{/Control}')
    expect(focused()).toBe('Stream')
  })

  it('has one tab stop, one-based indexes and the whole size', () => {
    openBench()
    const grid = document.getElementById('grid-table')
    expect(grid).toHaveAttribute('aria-colcount', '14')
    expect(Number(grid?.getAttribute('aria-rowcount'))).toBeGreaterThan(15)
    expect(grid?.querySelectorAll('.grid-cell[tabindex="0"]')).toHaveLength(1)
    expect(grid?.querySelector('[role=row]')).toHaveAttribute('aria-rowindex', '1')
    expect(grid?.querySelector('[data-row="tag"][data-column="#name"]')).toHaveAttribute('aria-colindex', '1')
  })

  it('extends with Shift and clears the whole block as one step', async () => {
    const { user, go, state } = openBench()
    await go('Mass fraction of Sodium chloride, stream 101')
    await user.keyboard('{Shift>}{ArrowDown}{ArrowDown}{/Shift}')
    expect(document.querySelectorAll('#grid-table [aria-selected=true]')).toHaveLength(3)
    const before = state().given.size
    await user.keyboard('{Delete}')
    expect(state().given.size).toBe(before - 3)
    await user.keyboard('{Control>}z{/Control}')
    expect(state().given.size).toBe(before)
  })

  it('opens and closes a section with Enter', async () => {
    const { user, go, cell } = openBench()
    await go('Mass fraction, section')
    expect(document.querySelector('[aria-label^="Mass fraction of Water"]')).toBeNull()
    expect(cell('Mass fraction, section')).toHaveAttribute('aria-expanded', 'false')
    await user.keyboard('{Enter}')
    expect(cell('Mass fraction of Water, stream 101')).toBeInTheDocument()
  })

  it('handles no key while an input method is composing', async () => {
    const { go, said, cell } = openBench()
    await go('Total flow, stream 101')
    const event = new KeyboardEvent('keydown', { key: 'Delete', bubbles: true, cancelable: true, isComposing: true })
    cell('Total flow, stream 101').dispatchEvent(event)
    expect(said('Total flow, stream 101')).toContain('given')
  })
})
