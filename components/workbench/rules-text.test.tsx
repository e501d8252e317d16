import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { inOrder } from '@/lib/book/state'
import { openBench } from './test-bench'

async function openRules({ mayEdit = true } = {}) {
  const bench = openBench({ mayEdit })
  await bench.user.click(screen.getByRole('tab', { name: /Rules/ }))
  const panel = within(screen.getByRole('tabpanel'))
  const area = () => panel.getByRole<HTMLTextAreaElement>('textbox', { name: 'Rules, one a line' })
  const rules = () => inOrder(bench.state().rule)
  return { ...bench, panel, area, rules }
}

describe('rules as text', () => {
  it('shows each rule as a line that can be edited', async () => {
    const { user, panel, rules } = await openRules()
    const line = panel.getByRole('textbox', { name: 'As text' })
    expect(line).toHaveValue('split of M-105 to 109 = 0.55')
    await user.clear(line)
    await user.type(line, 'check: split of M-105 to 109 = 60 % ± 1 %{Enter}')
    expect(rules()[0]).toMatchObject({ use: 'check', value: 0.6, halfWidth: 0.01 })
    expect(line).toHaveValue('check: split of M-105 to 109 = 0.6 ± 0.01')
    await user.clear(line)
    await user.type(line, 'split of M-105 to 999 = 1{Enter}')
    expect(line).toBeInvalid()
    expect(line).toHaveAccessibleDescription('At column 19: There is no stream “999”.')
    expect(line).toHaveValue('split of M-105 to 999 = 1')
  })

  it('takes all of them as one change, and undoes them as one', async () => {
    const { user, panel, area, rules } = await openRules()
    await user.click(panel.getByRole('button', { name: 'As text' }))
    const before = area().value
    await user.type(area(), '\nflow(103) = 0.16 * flow(101) # as designed')
    await user.click(panel.getByRole('button', { name: 'Take the text' }))
    expect(rules()).toHaveLength(2)
    expect(rules()[1]).toMatchObject({ ruleKind: 'flowRatio', value: 0.16, note: 'as designed' })
    await user.click(screen.getByRole('button', { name: /undo/i }))
    expect(rules()).toHaveLength(1)
    expect(area()).toHaveValue(before)
  })

  it('takes nothing where a line is wrong, says where, and keeps what was typed', async () => {
    const { user, panel, area, rules } = await openRules()
    await user.click(panel.getByRole('button', { name: 'As text' }))
    const wrong = `${area().value}\nsplit of M-105 to 109 = 0,5`
    await user.type(area(), '\nsplit of M-105 to 109 = 0,5')
    await user.keyboard('{Control>}{Enter}{/Control}')
    expect(rules()).toHaveLength(1)
    expect(area()).toBeInvalid()
    await user.click(panel.getByRole('button', { name: 'Line 2, column 26' }))
    expect(area().selectionStart).toBe(area().value.indexOf(',5'))
    await user.click(screen.getByRole('tab', { name: /Notes/ }))
    await user.click(screen.getByRole('tab', { name: /Rules/ }))
    expect(area()).toHaveValue(wrong)
    await user.click(panel.getByRole('button', { name: 'Leave it' }))
    expect(area()).toHaveValue('Q1: split of M-105 to 109 = 0.55')
  })

  it('has the parameters at its head, with a value or free', async () => {
    const { user, panel, state } = await openRules()
    await user.click(panel.getByRole('button', { name: 'Parameter' }))
    const parameters = within(panel.getByRole('list', { name: 'Parameters' }))
    await user.type(parameters.getByRole('textbox', { name: 'Value' }), '40 %{Enter}')
    expect([...state().parameter.values()][0]).toMatchObject({ value: 0.4 })
    const lists = panel.getAllByRole('list').map((list) => list.getAttribute('aria-label'))
    expect(lists.indexOf('Parameters')).toBeLessThan(lists.indexOf('Rules'))
  })

  it('takes the half-width of a value from its digits, and lets another be typed', async () => {
    const { user, panel, rules } = await openRules()
    const value = panel.getByRole('textbox', { name: 'Value' })
    await user.clear(value)
    await user.type(value, '55.0 %{Enter}')
    expect(rules()[0]).toMatchObject({ value: 0.55, halfWidth: 0.0005 })
    const width = panel.getByRole('textbox', { name: 'Half-width, ±' })
    expect(width).toHaveValue('0.0005')
    await user.clear(width)
    await user.type(width, '2 %{Enter}')
    expect(rules()[0]).toMatchObject({ halfWidth: 0.02 })
  })

  it('can be read by somebody who does not edit', async () => {
    const { user, panel, area } = await openRules({ mayEdit: false })
    await user.click(panel.getByRole('button', { name: 'As text' }))
    expect(area()).toHaveAttribute('readonly')
    expect(panel.queryByRole('button', { name: 'Take the text' })).toBeNull()
  })
})
