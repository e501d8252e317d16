import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import type { BookRecord } from '@/lib/book/kinds'
import { openBench, saltRecords } from './test-bench'

const plain = (text: string | null | undefined) => (text ?? '').replace(/\s/g, ' ')

/** The salt plant with a belt weigher on its product that reads 10,900 kg/h. */
function weighed(): BookRecord[] {
  const records = saltRecords()
  const stream = records.find((record) => record.kind === 'stream' && record.tag === '112')
  const model = records.find((record) => record.kind === 'given')
  if (!stream || model?.kind !== 'given') throw new Error('The salt plant has changed')
  const place = { streamId: stream.id, quantity: 'flow', componentId: null, instrument: 'main' } as const
  const id = [model.caseId, stream.id, 'flow', '', 'main'].join('/')
  const number = { text: '10900', value: 10900, unit: 'kg/h', halfWidth: 0.5, sigma: null, use: 'given' } as const
  return [...records, { ...model, ...place, ...number, id, source: 'Belt weigher', note: null }]
}
const open = (records = weighed()) => {
  const bench = openBench({ records })
  return { ...bench, card: () => within(screen.getByRole('complementary', { name: 'Cell card' })) }
}
const panel = () => within(screen.getByRole('tabpanel'))
const given = (state: ReturnType<ReturnType<typeof open>['state']>) =>
  [...state.given.values()].find(({ text }) => text === '10900')

describe('what is at odds', () => {
  it('is listed from the strip, with typed, implied and by how much in the unit of the row', async () => {
    const { user, strip } = open()
    expect(strip()).toContain('cannot all hold')
    await user.click(screen.getByRole('button', { name: 'See what is at odds' }))
    const set = within(panel().getByRole('region', { name: 'Conflict 1' }))
    expect(set.getByRole('heading')).toHaveTextContent(/round T-101, .*D-106/)
    expect(set.getAllByRole('listitem')).toHaveLength(11)
    const weigher = set.getByRole('button', { name: 'Total flow of 112' }).closest('li')
    expect(plain(weigher?.textContent)).toContain(
      'typed 10 900others imply 10 615.8off by +284.19 kg/hwithdrawing it settles 1 of 1',
    )
    const brine = set.getByRole('button', { name: 'Mass fraction of Sodium chloride in 101' }).closest('li')
    expect(plain(brine?.textContent)).toContain('off by −0.560 wt %')
    expect(panel().getByText(/any one of its members settles it/)).toBeInTheDocument()
  })

  it('is settled by withdrawing one from the card; undo brings it back', async () => {
    const { user, go, said, card, strip, state } = open()
    await go('Total flow, stream 112')
    expect(plain(card().getByText(/Typed 10/).textContent)).toBe(
      'Typed 10 900, the others imply 10 615.8 kg/h: off by +284.19. Withdrawing this settles 1 of 1 set.',
    )
    await user.click(card().getByRole('button', { name: 'Withdraw total flow of 112' }))
    expect(given(state())).toMatchObject({ use: 'withdrawn', value: 10900 })
    expect(plain(said('Total flow, stream 112'))).toBe(
      'Total flow, stream 112: 10 616 kg/h, solvable now; typed 10 900 kg/h, withdrawn',
    )
    expect(document.querySelector('.grid-kept.cell-kept-withdrawn')).toBeInTheDocument()
    expect(strip()).toContain('the table closes')
    const undo = screen.getByRole('button', { name: /undo/i })
    expect(undo.getAttribute('title') ?? undo.getAttribute('aria-label')).toContain('Withdraw total flow of 112')
    await user.click(undo)
    expect(plain(said('Total flow, stream 112'))).toBe('Total flow, stream 112: 10 900 kg/h, at odds')
  })

  it('keeps one as a check only, and takes it back into use from the card', async () => {
    const { user, go, said, card } = open()
    await go('Total flow, stream 112')
    await user.click(card().getByRole('button', { name: 'Keep total flow of 112 as a check only' }))
    expect(plain(said('Total flow, stream 112'))).toMatch(/solvable now; typed 10 900 kg\/h, check only$/)
    expect(card().getByText('Check only')).toBeInTheDocument()
    await user.click(card().getByRole('button', { name: 'Use it again' }))
    expect(plain(said('Total flow, stream 112'))).toMatch(/at odds$/)
  })

  it('gives one an uncertainty, and says that reconciling comes with Readings', async () => {
    const { user, go, card, state, said } = open()
    await go('Total flow, stream 112')
    await user.click(card().getByRole('button', { name: 'Give total flow of 112 an uncertainty' }))
    const field = card().getAllByRole('textbox', {
      name: 'Uncertainty (one standard deviation), kg/h',
    })[0] as HTMLElement
    expect(field).toHaveFocus()
    await user.keyboard('109{Enter}')
    expect(given(state())).toMatchObject({ sigma: 109, use: 'given' })
    expect(card().getByText(/which comes with Readings/)).toBeInTheDocument()
    expect(said('Total flow, stream 112')).toMatch(/at odds$/)
  })

  it('lists what is set aside, with the way back, and keeps the focus when a set is settled', async () => {
    const { user, said } = open()
    await user.click(screen.getByRole('tab', { name: /At odds/ }))
    await user.click(panel().getByRole('button', { name: 'Withdraw total flow of 112' }))
    expect(panel().getByText(/Nothing is at odds/)).toBeInTheDocument()
    expect(screen.getByRole('tabpanel')).toContainElement(document.activeElement as HTMLElement)
    await user.click(panel().getByRole('button', { name: 'Use total flow of 112 again' }))
    expect(said('Total flow, stream 112')).toMatch(/at odds$/)
  })

  it('leads from a member to its cell', async () => {
    const { user, focused } = open()
    await user.click(screen.getByRole('tab', { name: /At odds/ }))
    await user.click(panel().getByRole('button', { name: 'Mass fraction of Potassium chloride in 108' }))
    await expect.poll(() => focused()).toContain('Mass fraction of Potassium chloride, stream 108')
  })

  it('offers no way out to somebody who does not edit', async () => {
    const { user } = openBench({ records: weighed(), mayEdit: false })
    await user.click(screen.getByRole('button', { name: 'See what is at odds' }))
    expect(panel().getAllByRole('listitem')).toHaveLength(11)
    expect(panel().queryByRole('button', { name: /^Withdraw/ })).toBeNull()
  })
})

describe('fractions that do not add up', () => {
  it('are at odds until the person chooses, and the choice shows in the head of the stream', async () => {
    const { user, go, said, card } = open(saltRecords())
    await go('Mass fraction of Water, stream 101')
    await user.keyboard('80 %{Enter}')
    await go('Mass fraction of Water, stream 101')
    expect(said('Mass fraction of Water, stream 101')).toMatch(/at odds$/)
    const choice = card().getByRole('combobox', { name: 'Where they do not add up, they' })
    await user.selectOptions(choice, 'Water is by difference')
    expect(plain(said('Mass fraction of Water, stream 101'))).toBe(
      'Mass fraction of Water, stream 101: 75.00 wt %, solvable now; typed 80.00 wt %, by difference',
    )
    expect(said('Stream 101')).toBe('Stream 101, Purified brine feed; Water is by difference')
    expect(choice).toHaveFocus()
    await user.keyboard('{Control>}z{/Control}')
    expect(said('Stream 101')).toBe('Stream 101, Purified brine feed')
  })

  it('can be scaled from the list of what is at odds', async () => {
    const { user, go, said, card } = open(saltRecords())
    await go('Mass fraction of Water, stream 101')
    await user.keyboard('80 %{Enter}')
    await user.click(screen.getByRole('button', { name: 'See what is at odds' }))
    await user.selectOptions(
      panel().getByRole('combobox', { name: /fractions of 101 do not add up/ }),
      'Are scaled to 1',
    )
    expect(said('Stream 101')).toBe('Stream 101, Purified brine feed; typed fractions are scaled to 1')
    await go('Mass fraction of Water, stream 101')
    expect(card().getByText(/add up to 105\.000 %; scaled, this one is used as 76\.190 %/)).toBeInTheDocument()
  })
})
