import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from '../test-bench'

const plain = (text: string | null | undefined) => (text ?? '').replace(/\s+/g, ' ').trim()
const card = () => within(screen.getByRole('complementary', { name: 'Cell card' }))
const why = () => plain(card().getByRole('heading', { name: 'Why' }).closest('section')?.textContent)

describe('why, on the card', () => {
  it('of a solved cell is its step, boundary and equations, and what it leans on', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 107')
    expect(why()).toContain('Boundary round T-101, E-102, C-103 and S-104')
    expect(why()).toContain('NaCl 12 000.0 + 0.2300 × F(109) = NaCl(107) + 0.2300 × F(108)')
    await user.click(card().getByRole('button', { name: 'total flow of 101' }))
    await new Promise((done) => setTimeout(done, 100))
    expect(focused()).toMatch(/^Total flow, stream 101/)
    expect(card().queryByRole('heading', { name: 'Why' })).toBeNull()
  })

  it('leads to the step in the workings', async () => {
    const { user, go } = openBench()
    await go('Total flow, stream 112')
    await user.click(card().getByRole('button', { name: /^Step \d+ of 12 in the workings$/ }))
    await new Promise((done) => setTimeout(done, 50))
    expect(screen.getByRole('tab', { name: /Workings/ })).toHaveAttribute('aria-selected', 'true')
    expect(plain(document.activeElement?.textContent)).toContain('Round D-106')
  })

  it('of an unknown is which boundaries are short and by how much', async () => {
    const { user, go } = openBench()
    await go('Mass fraction of Water, stream 107')
    await user.keyboard('{Delete}')
    await go('Total flow, stream 107')
    expect(why()).toMatch(/D-106 is short by \d+: \d+ unknown, \d+ independent equations\./)
    await user.click(card().getByRole('button', { name: 'D-106' }))
    expect(screen.getByRole('tab', { name: /Boundaries/ })).toHaveAttribute('aria-selected', 'true')
    const heads = [...document.querySelectorAll('.grid-capped')].map((one) => one.getAttribute('aria-label'))
    expect(heads.filter((name) => name?.startsWith('Stream 107'))).toHaveLength(1)
  })
})
