import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from './test-bench'

const card = () => screen.getByRole('complementary', { name: 'Cell card' })

describe('rows that people add', () => {
  it('are made in a dialog, answered for every stream, and typed into like any other', async () => {
    const { user, go, said, state } = openBench()
    await user.click(screen.getByRole('button', { name: 'Add' }))
    await user.click(await screen.findByRole('menuitem', { name: /A row/ }))
    const dialog = await screen.findByRole('dialog', { name: 'Add a row' })
    await user.click(within(dialog).getByRole('button', { name: 'Add row' }))
    expect(within(dialog).getByText(/Choose at least one component/)).toBeInTheDocument()
    await user.click(within(dialog).getByRole('checkbox', { name: 'Water' }))
    await user.type(within(dialog).getByRole('textbox', { name: 'Name' }), 'Moisture')
    await user.selectOptions(within(dialog).getByRole('combobox', { name: 'Unit' }), 'g/kg')
    await user.click(within(dialog).getByRole('button', { name: 'Add row' }))
    expect(said('Moisture, mass ratio of groups')).toBe('Moisture, mass ratio of groups')
    const water = said('Mass fraction of Water, stream 101') ?? ''
    const percent = Number(/: ([\d.]+) wt %/.exec(water)?.[1])
    expect(Number(/: ([\d.]+) g\/kg, solvable now/.exec(said('Moisture, stream 101') ?? '')?.[1])).toBeCloseTo(
      percent * 10,
      0,
    )
    await go('Moisture, stream 108')
    await user.keyboard('30 000 ppm{Enter}')
    expect(said('Moisture, stream 108')).toContain('30.000 g/kg')
    const given = [...state().given.values()].find(({ text }) => text === '30 000 ppm')
    expect(given).toMatchObject({ quantity: 'groupMassRatio', componentId: null, value: 30_000, unit: 'ppm' })
    await go('Moisture, stream 108')
    expect(within(card()).getByText(/Moisture/)).toBeInTheDocument()
  })

  it('refuse a unit of flow with the reason, and take another unit for the row', async () => {
    const { user, said } = openBench()
    await user.click(screen.getByRole('button', { name: 'Add' }))
    await user.click(await screen.findByRole('menuitem', { name: /A row/ }))
    await user.click(within(await screen.findByRole('dialog')).getByRole('checkbox', { name: 'Water' }))
    await user.click(screen.getByRole('button', { name: 'Add row' }))
    const unit = () => document.querySelector<HTMLElement>('[data-row^="value/measure/"][data-column="#unit"]')
    await user.click(unit() as HTMLElement)
    await user.keyboard('ppm{Enter}')
    expect(unit()?.textContent).toBe('ppm')
    const row = unit()?.dataset.row ?? ''
    const first = document.querySelector<HTMLElement>(`[data-row="${row}"]:not([data-column^="#"])`)
    await user.click(first as HTMLElement)
    await user.keyboard('3 kg/h{Enter}')
    expect(said(`${first?.getAttribute('aria-label')?.split(':')[0]}`)).toContain('not understood')
  })
})

describe('several instruments for one measure', () => {
  it('stand in one cell, marked, each with its own use', async () => {
    const { user, go, said, cell, state } = openBench()
    await go('Total flow, stream 101')
    await user.click(within(card()).getByRole('button', { name: 'Add a reading by another instrument' }))
    await user.type(within(card()).getByRole('textbox', { name: 'Instrument' }), 'main{Enter}')
    expect(within(card()).getByText(/already a reading by main/)).toBeInTheDocument()
    await user.clear(within(card()).getByRole('textbox', { name: 'Instrument' }))
    await user.type(within(card()).getByRole('textbox', { name: 'Instrument' }), 'WT-101{Enter}')
    await user.type(within(card()).getByRole('textbox', { name: 'Reading, kg/h' }), '50 400{Enter}')
    expect(state().given.size).toBeGreaterThan(0)
    expect(said('Total flow, stream 101')).toContain('at odds, 2 readings')
    expect(cell('Total flow, stream 101').dataset.readings).toBe('2')
    const second = within(card()).getByText(/WT-101: 50 400/)
    await user.click(second)
    const uses = within(card()).getAllByRole('combobox', { name: 'Use' })
    await user.selectOptions(uses.at(-1) as HTMLElement, 'check')
    expect(said('Total flow, stream 101')).toContain('50\u00a0000 kg/h, given, 2 readings')
    await user.click(within(card()).getByRole('button', { name: 'Remove this reading' }))
    expect(said('Total flow, stream 101')).toContain('50\u00a0000 kg/h, given')
    expect(said('Total flow, stream 101')).not.toContain('readings')
  })
})

describe('volume flow by density', () => {
  it('follows from a density, and can be typed where one is known', async () => {
    const { user, go, cell, said } = openBench()
    await user.click(cell('Carried notes, section'))
    expect(said('Volume flow, stream 101')).toBe('Volume flow, stream 101: not available')
    await go('Density, stream 101')
    await user.keyboard('1 250{Enter}')
    expect(said('Volume flow, stream 101')).toBe('Volume flow, stream 101: 40.0 m³/h, solvable now')
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    await go('Volume flow, stream 101')
    await user.keyboard('48 m3/h{Enter}')
    expect(said('Volume flow, stream 101')).toContain('48.0 m³/h, given')
    expect(said('Total flow, stream 101')).toBe('Total flow, stream 101: 60\u00a0000 kg/h, solvable now')
  })
})
