import { render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { solve } from '@/lib/balance'
import { LivePlant } from './live-plant'
import { typedAtFirst } from './plant'
import { viewPlant } from './plant-view'

const cell = (name: RegExp) => screen.getByRole('textbox', { name })

async function show() {
  render(<LivePlant first={viewPlant(typedAtFirst, solve)} />)
  const user = userEvent.setup()
  // The page loads the solver when it is needed; until then nothing follows from what is typed.
  await import('@/lib/balance')
  return user
}

/** The alum plant by hand: crystals 1200 x 18 % / 96 % = 225; recycle (26 % x 1200 - 216) / (36 % - 26 %) = 960. */
describe('the table of the front page', () => {
  it('opens with what follows worked out and the recycle still unknown', async () => {
    await show()
    expect(cell(/^total flow of 4, solvable now/)).toHaveValue('225.0')
    expect(cell(/^total flow of 3, solvable now/)).toHaveValue('975.0')
    expect(cell(/^total flow of 5, still unknown/)).toHaveValue('')
    expect(screen.getByRole('status')).toHaveTextContent('11 cells follow from 4 given; 8 are still unknown.')
    const tank = within(screen.getByRole('row', { name: /B-1/ })).getAllByRole('cell')
    expect(tank.map((cell) => cell.textContent)).toEqual(['mixer', 'in', 'out', '', '', 'in'])
  })

  it('leads to a cell whose value closes it, and settles the rest while it is typed', async () => {
    const user = await show()
    await user.click(screen.getByRole('button', { name: 'wt % alum in 2' }))
    expect(cell(/^wt % alum in 2/)).toHaveFocus()
    await user.keyboard('26')
    await waitFor(() => expect(cell(/^total flow of 5, solvable now/)).toHaveValue('960.0'))
    expect(cell(/^total flow of 2, solvable now/)).toHaveValue('2\u00a0160')
    expect(cell(/^wt % alum in 2, given/)).toHaveValue('26')
    expect(screen.getByRole('status')).toHaveTextContent('Nothing is still unknown: the table closes.')
  })

  it('understands a unit, and clears a given', async () => {
    const user = await show()
    await user.click(cell(/^total flow of 2/))
    await user.keyboard('2.16 t/h{Tab}')
    await waitFor(() => expect(cell(/^total flow of 5, solvable now/)).toHaveValue('960.0'))
    expect(cell(/^total flow of 2, given/)).toHaveValue('2\u00a0160')
    await user.clear(cell(/^total flow of 2/))
    await waitFor(() => expect(cell(/^total flow of 5, still unknown/)).toHaveValue(''))
  })

  it('names values that cannot all hold, and changes none of them', async () => {
    const user = await show()
    await user.clear(cell(/^total flow of 4/))
    await user.type(cell(/^total flow of 4/), '300')
    await waitFor(() => expect(cell(/^total flow of 4, at odds/)).toHaveValue('300'))
    expect(screen.getByRole('status')).toHaveTextContent(/^These cannot all hold: .*total flow of 4/)
    expect(cell(/^total flow of 1, at odds/)).toHaveValue('1\u00a0200')
  })

  it('says when it closes only with a flow below zero', async () => {
    const user = await show()
    await user.type(cell(/^wt % alum in 2/), '50')
    await waitFor(() => expect(screen.getByRole('status')).toHaveTextContent(/flows below zero: .*total flow of 5/))
  })

  it('keeps an entry that it does not understand, marked, with the reason', async () => {
    const user = await show()
    await user.type(cell(/^total flow of 5/), '1,200')
    expect(cell(/^total flow of 5, not understood/)).toHaveValue('1,200')
    expect(cell(/^total flow of 5/)).toBeInvalid()
    expect(screen.getByRole('status')).toHaveTextContent(/can be read as/)
    await user.tab()
    expect(cell(/^total flow of 5/)).toHaveValue('1,200')
    await user.click(screen.getByRole('button', { name: 'Start over' }))
    expect(cell(/^total flow of 5, still unknown/)).toHaveValue('')
  })

  it('moves by arrows and Enter, over absent cells', async () => {
    const user = await show()
    await user.click(cell(/^wt % water in 3/))
    await user.keyboard('{ArrowUp}')
    expect(cell(/^total flow of 3/)).toHaveFocus()
    await user.keyboard('{Enter}')
    expect(cell(/^wt % water in 3/)).toHaveFocus()
    await user.keyboard('{ArrowRight}')
    expect(cell(/^wt % water in 4/)).toHaveFocus()
  })
})
