import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from '../test-bench'

const plain = (text: string | null | undefined) => (text ?? '').replace(/\s+/g, ' ').trim()
const JOINED = 'T-101, E-102, C-103, S-104'

async function open() {
  const bench = openBench()
  await bench.user.click(screen.getByRole('tab', { name: /Boundaries/ }))
  const table = () => within(screen.getByRole('table', { name: 'Boundaries' }))
  const row = (title: string) =>
    table()
      .getByRole('rowheader', { name: new RegExp(`^${title}( ▾ marked)?$`) })
      .closest('tr')
  const cells = (title: string) =>
    [...(row(title)?.querySelectorAll('td') ?? [])].map(({ textContent }) => plain(textContent))
  const head = (tag: string) => document.querySelector(`#grid-table [role="columnheader"][aria-label^="Stream ${tag}"]`)
  return { ...bench, table, row, cells, head }
}

describe('the boundaries of the salt plant', () => {
  it('are every unit, the whole and that of the combined step, with their counts and their status in words', async () => {
    const { table, cells, row } = await open()
    expect(
      table()
        .getAllByRole('rowheader')
        .map(({ textContent }) => plain(textContent)),
    ).toEqual(['T-101', 'E-102', 'C-103', 'S-104', 'M-105', 'D-106', JOINED, 'Whole process'])
    expect(cells('T-101')).toEqual(['101 102 109', '11', '4', '3', '0', '4', '7', '0', 'Some of it follows'])
    expect(cells(JOINED)).toEqual(['101 103 105 107 108 109', '12', '4', '4', '4', '0', '12', '0', 'All of it follows'])
    expect(cells('M-105')).toEqual(['108 109 110', '12', '4', '3', '7', '−2', '11', '3', 'Some of it follows'])
    expect(plain(row('M-105')?.closest('tbody')?.textContent)).toContain(
      'repeat the others, because the streams have one composition.',
    )
    for (const unit of ['T-101', 'E-102', 'C-103', 'S-104', 'M-105', 'D-106'])
      expect(cells(unit).at(-1)).not.toBe('All of it follows')
  })

  it('mark their streams in both panes by a cap and by name; Esc takes the mark away', async () => {
    const { user, table, head } = await open()
    await user.click(table().getByRole('button', { name: JOINED }))
    expect(table().getByRole('button', { name: JOINED })).toHaveAttribute('aria-pressed', 'true')
    for (const tag of ['101', '103', '105', '107', '108', '109']) {
      expect(head(tag)).toHaveClass('grid-capped')
      expect(head(tag)?.getAttribute('aria-label')).toMatch(/crosses the boundary$/)
    }
    expect(head('102')).not.toHaveClass('grid-capped')
    await user.click(screen.getByRole('tab', { name: /Connections/ }))
    const links = within(screen.getByRole('grid', { name: /Connections/ }))
    expect(links.getByRole('gridcell', { name: 'Stream 101, unit T-101: in; crosses the boundary' })).toHaveClass(
      'grid-capped',
    )
    expect(links.getByRole('gridcell', { name: 'Stream 102, unit T-101: out' })).not.toHaveClass('grid-capped')
    expect(links.getByRole('rowheader', { name: /^Unit T-101.*inside the boundary$/ })).toHaveClass('grid-capped')
    expect(screen.getByRole('button', { name: /Boundary marked: 4 units/ })).toBeInTheDocument()
    links.getByRole('gridcell', { name: 'Stream 102, unit T-101: out' }).focus()
    await user.keyboard('{Escape}')
    expect(head('101')).not.toHaveClass('grid-capped')
  })

  it('can be drawn by hand round any units', async () => {
    const { user, cells, head } = await open()
    const group = within(screen.getByRole('group', { name: 'Choose units' }))
    await user.click(group.getByRole('checkbox', { name: 'S-104' }))
    await user.click(group.getByRole('checkbox', { name: 'M-105' }))
    expect(group.getByRole('status')).toHaveTextContent('4 streams cross it: 106, 107, 109, 110.')
    expect(cells('S-104, M-105')[0]).toBe('106 107 109 110')
    expect(head('106')).toHaveClass('grid-capped')
    expect(head('108')).not.toHaveClass('grid-capped')
  })
})
