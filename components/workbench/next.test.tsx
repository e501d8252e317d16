import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from './test-bench'

const panel = () => within(screen.getByRole('tabpanel'))
const card = () => within(screen.getByRole('complementary', { name: 'Cell card' }))

describe('what to measure next', () => {
  it('is named in the strip only while something is unknown', async () => {
    const { user, go, strip } = openBench()
    expect(strip()).toContain('the table closes')
    expect(screen.queryByRole('button', { name: 'What to measure next' })).toBeNull()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    expect(strip()).toContain('still unknown; 1 more value closes the table')
    await user.click(screen.getByRole('button', { name: 'What to measure next' }))
    expect(screen.getByRole('tab', { name: 'What to measure next' })).toHaveAttribute('aria-selected', 'true')
    expect(panel().getByText(/closes the table/)).toBeInTheDocument()
  })

  it('leads to the cell of a value; typing there closes the table', async () => {
    const { user, go, strip, focused } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await user.click(screen.getByRole('button', { name: 'What to measure next' }))
    const values = within(panel().getByRole('region', { name: 'Single values' }))
    await user.click(values.getByRole('button', { name: 'Total flow of 107' }))
    await expect.poll(focused).toBe('Total flow, stream 107: still unknown')
    await user.keyboard('10939{Enter}')
    expect(strip()).toContain('the table closes')
    expect(panel().getByText(/Nothing is still unknown/)).toBeInTheDocument()
  })

  it('names a set where one value is not enough, and every value of it settles the rest', async () => {
    const { user, go, strip } = openBench()
    for (const stream of ['101', '104']) {
      await go(`Total flow, stream ${stream}`)
      await user.keyboard('{Delete}')
    }
    await go('Mass fraction of Sodium chloride, stream 101')
    await user.keyboard('{Delete}')
    const wanted = Number(/; (\d+) more values? closes? the table/.exec(strip())?.[1])
    expect(wanted).toBeGreaterThan(1)
    await user.click(screen.getByRole('button', { name: 'What to measure next' }))
    expect(within(panel().getByRole('list', { name: 'Values to measure' })).getAllByRole('listitem')).toHaveLength(
      wanted,
    )
  })

  it('leaves out what is marked as out of reach, from the list and from the stream card', async () => {
    const { user, go, state } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await user.click(screen.getByRole('button', { name: 'What to measure next' }))
    await user.click(panel().getByRole('button', { name: 'Flow of 107 cannot be measured' }))
    expect(screen.getByRole('tabpanel')).toContainElement(document.activeElement as HTMLElement)
    expect(panel().queryByRole('button', { name: 'Total flow of 107' })).toBeNull()
    expect([...state().stream.values()].find(({ tag }) => tag === '107')).toMatchObject({ cannotMeasure: 'flow' })
    await go('Stream 107')
    const box = card().getByRole('checkbox', { name: 'Flow cannot be measured' })
    expect(box).toBeChecked()
    await user.click(box)
    expect(panel().getByRole('button', { name: 'Total flow of 107' })).toBeInTheDocument()
    await user.click(card().getByRole('checkbox', { name: 'Cannot be analysed' }))
    expect(panel().getByText('107 cannot be analysed.')).toBeInTheDocument()
  })
})
