import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { demoRecords, openBench, saltRecords } from '../test-bench'

const plain = (text: string | null | undefined) => (text ?? '').replace(/\s+/g, ' ').trim()
const cells = (row: HTMLElement | null) =>
  [...(row?.querySelectorAll('th, td') ?? [])].map(({ textContent }) => plain(textContent))

/** The salt plant with a coarse belt weigher on its product: it agrees within its rounding, and does not close to the limit. */
function offBy(): ReturnType<typeof saltRecords> {
  const records = saltRecords()
  const stream = records.find((record) => record.kind === 'stream' && record.tag === '112')
  const model = records.find((record) => record.kind === 'given')
  if (!stream || model?.kind !== 'given') throw new Error('The salt plant has changed')
  const number = { text: '10.6 t/h', value: 10.6, unit: 't/h', halfWidth: 0.05, sigma: null, use: 'given' } as const
  const id = [model.caseId, stream.id, 'flow', '', 'main'].join('/')
  return [
    ...records,
    { ...model, ...number, id, streamId: stream.id, quantity: 'flow', componentId: null, instrument: 'main' },
  ]
}

async function open(records = saltRecords()) {
  const bench = openBench({ records })
  await bench.user.click(screen.getByRole('tab', { name: /Closure/ }))
  const byUnit = () => within(screen.getByRole('table', { name: 'Closure by unit' }))
  return { ...bench, byUnit }
}

describe('closure', () => {
  it('of the solved salt plant is nothing left over, round every unit and the whole, in every component and element', async () => {
    const { user, byUnit } = await open()
    const rows = byUnit().getAllByRole('row').slice(1).map(cells)
    expect(rows.map(([name]) => name)).toEqual(['T-101', 'E-102', 'C-103', 'S-104', 'M-105', 'D-106', 'Whole process'])
    for (const [name, , , left, percent, worst] of rows)
      expect([name, left, percent, worst]).toEqual([name, '0', '0', 'none'])
    expect(rows.at(-1)?.slice(1, 3)).toEqual(['50 000', '50 000'])
    await user.click(byUnit().getByRole('button', { name: 'D-106' }))
    const lines = within(screen.getByRole('table', { name: 'Closure round D-106' }))
      .getAllByRole('row')
      .slice(1)
      .map(cells)
    expect(lines[0]).toEqual(['Total', 'kg/h', '10 939', '10 939', '0', '0'])
    expect(lines.map(([name]) => name)).toContain('Sodium chloride')
    expect(
      screen.getByText(/No boundary whose flows are known is off by more than the limit of 0.1 %/),
    ).toBeInTheDocument()
  })

  it('says what is not known rather than nought', async () => {
    const { user, byUnit, go } = await open()
    await go('Total flow, stream 101')
    await user.keyboard('{Delete}')
    const row = cells(byUnit().getByRole('rowheader', { name: 'T-101' }).closest('tr'))
    expect(row.slice(1)).toContain('not known')
    expect(row.at(-1)).toBe('not all known')
  })

  it('marks what is further off than the limit of the team', async () => {
    const { byUnit } = await open(offBy())
    const row = cells(byUnit().getByRole('rowheader', { name: 'D-106' }).closest('tr'))
    expect(row.at(-1)).toContain('over 0.1 %')
    expect(screen.getByText(/^Off by more: .*D-106/)).toBeInTheDocument()
  })

  it('counts elements where formulas are known', async () => {
    const { user, byUnit } = await open(demoRecords('demo-d-biogas'))
    await user.click(byUnit().getByRole('button', { name: 'Whole process' }))
    const table = within(screen.getByRole('table', { name: 'Closure round the whole process' }))
    const lines = table.getAllByRole('row').slice(1).map(cells)
    const carbon = lines.find(([name]) => name === 'Element C')
    expect(carbon?.at(-1)).toBe('0')
    expect(carbon?.[1]).toMatch(/mol/)
  })
})
