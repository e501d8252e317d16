import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from './test-bench'

const card = () => within(screen.getByRole('complementary', { name: 'Cell card' }))
const plain = (text: string | null | undefined) => (text ?? '').replace(/[\u00a0\u2009\u202f]/g, ' ')

describe('limits of an unknown on its card', () => {
  it('are shown in the unit of the row, for unknown cells only', async () => {
    const { user, go } = openBench()
    await go('Total flow, stream 107')
    expect(card().queryByText('Limits')).toBeNull()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await go('Total flow, stream 107')
    expect(card().getByText('Limits')).toBeInTheDocument()
    const line = plain(card().getByText(/^At least/).textContent)
    const [, low = ''] = /^At least ([\d ]+\.\d) kg\/h; no upper limit\.$/.exec(line) ?? []
    // What flows there in the whole plant, as the starter says.
    expect(Number(low.replaceAll(' ', ''))).toBeLessThanOrEqual(10_939)
    expect(low).not.toBe('')
  })

  it('of a fraction are in per cent, and follow what is typed', async () => {
    const { user, go } = openBench()
    await go('Mass fraction of Sodium chloride, stream 101')
    await user.keyboard('{Delete}')
    await go('Mass fraction of Water, stream 101')
    await user.keyboard('{Delete}')
    await go('Mass fraction of Sodium chloride, stream 101')
    const line = plain(card().getByText(/^Between/).textContent)
    const [, low, high] = /^Between ([\d.]+) and ([\d.]+) wt %\.$/.exec(line) ?? []
    expect(Number(low)).toBeLessThanOrEqual(24)
    expect(Number(high)).toBeGreaterThanOrEqual(24)
    expect(Number(high)).toBeLessThanOrEqual(100)
  })
})
