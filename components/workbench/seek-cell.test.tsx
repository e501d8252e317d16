import { describe, expect, it, vi } from 'vitest'
import { openBench } from './test-bench'

const toasts = vi.hoisted(() => [] as string[])
vi.mock('@/components/ui/toast', () => ({
  notify: (text: string) => void toasts.push(text),
  notifyProblem: (text: string) => void toasts.push(text),
}))

describe('keys that go to the next cell of a kind', () => {
  it('F4 goes from unknown to unknown, round the end to the beginning', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await user.keyboard('{Shift>}{F4}{/Shift}')
    await expect.poll(focused).toMatch(/^Component flow of .*, stream 112: still unknown$/)
    await user.keyboard('{F4}')
    await expect.poll(focused).toBe('Total flow, stream 101: still unknown')
  })

  it('stays in the stream first, and opens a section that was shut', async () => {
    const { user, go, focused, cell } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await user.click(cell('Component flow'))
    await go('Total flow, stream 101')
    await user.keyboard('{F4}')
    await expect.poll(focused).toMatch(/^Component flow of .*, stream 101: still unknown$/)
    const first = focused()
    await user.keyboard('{F4}')
    await expect.poll(focused).not.toBe(first)
    await user.keyboard('{Shift>}{F4}{/Shift}')
    await expect.poll(focused).toBe(first)
    await user.keyboard('{Shift>}{F4}{/Shift}')
    await expect.poll(focused).toBe('Total flow, stream 101: still unknown')
  })

  it('F8 goes to what is at odds, F9 to what was not understood; without any it says so', async () => {
    const { user, go, focused } = openBench()
    await go('Total flow, stream 101')
    await user.keyboard('{F8}')
    expect(toasts).toEqual(['No cell is at odds.'])
    expect(focused()).toContain('Total flow, stream 101')
    await go('Total flow, stream 112')
    await user.keyboard('10900{Enter}')
    await go('Total flow, stream 101')
    await user.keyboard('{Shift>}{F8}{/Shift}')
    await expect.poll(focused).toMatch(/at odds$/)
    await go('Total flow, stream 107')
    await user.keyboard('abc{Enter}')
    await go('Total flow, stream 101')
    await user.keyboard('{F9}')
    await expect.poll(focused).toContain('Total flow, stream 107')
  })
})
