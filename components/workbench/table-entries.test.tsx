import { fireEvent, screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { parseTsv } from '@/lib/sheet/clipboard'
import { openBench } from './test-bench'

describe('entries of the stream table', () => {
  it('keeps a wrong entry in its cell, marked, with the reason', async () => {
    const { user, go, cell, said, state } = openBench()
    await go('Mass fraction of Water, stream 101')
    await user.keyboard('12 kg{Enter}')
    expect(said('Mass fraction of Water, stream 101')).toBe(
      'Mass fraction of Water, stream 101: “12 kg”, not understood',
    )
    const wrong = cell('Mass fraction of Water, stream 101')
    expect(wrong).toHaveAttribute('aria-invalid', 'true')
    expect(wrong.getAttribute('aria-description')).toContain('this row is a mass fraction')
    const kept = [...state().given.values()].find(({ text }) => text === '12 kg')
    expect(kept).toMatchObject({ value: null })
    await go('Mass fraction of Water, stream 101')
    const card = screen.getByRole('complementary', { name: 'Cell card' })
    expect(within(card).getByText(/this row is a mass fraction/)).toBeInTheDocument()
  })

  it('asks before it lets a component be present where it was not, and then takes the value', async () => {
    const { user, go, said, state } = openBench()
    await go('Mass fraction of Sodium chloride, stream 103')
    const absences = state().absence.size
    await user.keyboard('5{Enter}')
    expect(state().absence.size).toBe(absences)
    const question = await screen.findByRole('alertdialog')
    await user.click(within(question).getByRole('button', { name: 'Let it be present and type 5' }))
    expect(state().absence.size).toBe(absences - 1)
    expect(said('Mass fraction of Sodium chloride, stream 103')).toContain('5.00 wt %')
  })

  it('renames a stream in place, and refuses a tag that is taken where it was typed', async () => {
    const { user, go, state } = openBench()
    await go('Stream 102')
    await user.keyboard('102A{Enter}')
    expect([...state().stream.values()].map(({ tag }) => tag)).toContain('102A')
    await go('Stream 102A')
    await user.keyboard('101{Enter}')
    expect(screen.getByRole('alert')).toHaveTextContent('There is already a stream 101')
    expect(document.querySelector('.grid-editor')).toHaveValue('101')
    await user.keyboard('{Escape}')
    expect([...state().stream.values()].map(({ tag }) => tag)).toContain('102A')
  })

  it('keeps a refused tag in its cell when one goes elsewhere, and takes it once it is mended', async () => {
    const { user, go, state } = openBench()
    await go('Stream 102')
    await user.keyboard('101{Enter}')
    await go('Total flow, stream 104')
    const editor = document.querySelector<HTMLInputElement>('.grid-editor')
    expect(editor).toHaveValue('101')
    expect(editor).toBeInvalid()
    await user.click(editor as HTMLInputElement)
    await user.keyboard('B{Enter}')
    expect([...state().stream.values()].map(({ tag }) => tag)).toContain('101B')
  })

  it('sets where a stream goes by the tag of a unit, with suggestions', async () => {
    const { user, go, said } = openBench()
    await go('To, stream 103')
    await user.keyboard('t-1')
    expect(screen.getByRole('option', { name: 'T-101' })).toBeInTheDocument()
    await user.keyboard('{ArrowDown}{Enter}')
    expect(said('To, stream 103')).toBe('To, stream 103: T-101')
  })

  it('pastes a block over values as one step, and asks before it adds streams', async () => {
    const { user, go, said, state } = openBench()
    await go('Total flow, stream 101')
    const before = state().given.size
    await user.paste('60 000\r\n75 %\r\n')
    expect(state().given.size).toBe(before + 1)
    expect(said('Total flow, stream 101')).toContain('60\u00a0000 kg/h, given')
    expect(said('Mass fraction of Water, stream 101')).toContain('75.00 wt %, given')
    await user.keyboard('{Control>}z{/Control}')
    expect(state().given.size).toBe(before)
    expect(said('Total flow, stream 101')).toContain('50\u00a0000')
    await go('Total flow, stream 112')
    await user.paste('\t5')
    expect(state().stream.size).toBe(12)
    await user.click(await screen.findByRole('button', { name: 'Add 1 stream and paste' }))
    expect(state().stream.size).toBe(13)
    expect(said('Total flow, stream 113')).toContain('given')
  })

  it('copies numbers in full, with nothing for what is absent', async () => {
    const { user, go, cell } = openBench()
    await go('Mass fraction of Water, stream 103')
    await user.keyboard('{Shift>}{ArrowDown}{/Shift}')
    const put = new Map<string, string>()
    const clipboardData = { setData: (type: string, text: string) => put.set(type, text) }
    fireEvent.copy(cell('Mass fraction of Water, stream 103'), { clipboardData })
    expect(parseTsv(put.get('text/plain') ?? '')).toEqual([['100'], ['']])
    expect(put.get('text/html')).toContain('<td>100</td>')
  })

  it('moves a stream with Alt and an arrow', async () => {
    const { user, go } = openBench()
    await go('Stream 102')
    await user.keyboard('{Alt>}{ArrowLeft}{/Alt}')
    const tags = [...document.querySelectorAll('#grid-table [data-row="tag"][role=columnheader]')].map(
      (head) => head.textContent,
    )
    expect(tags.slice(0, 2)).toEqual(['102', '101'])
  })

  it('adds a pasted list of streams', async () => {
    const { user, state } = openBench()
    await user.click(screen.getByRole('button', { name: 'Add' }))
    await user.click(await screen.findByRole('menuitem', { name: 'Streams…' }))
    await user.click(await screen.findByRole('textbox', { name: 'Streams' }))
    await user.paste('201\tWash water\n202\tWash filtrate\n')
    await user.click(screen.getByRole('button', { name: 'Add 2 streams' }))
    expect(state().stream.size).toBe(14)
    expect([...state().stream.values()].find(({ tag }) => tag === '202')).toMatchObject({ name: 'Wash filtrate' })
  })
})

describe('a reader', () => {
  it('reads everything and edits nothing', async () => {
    const { user, go, said, state } = openBench({ mayEdit: false })
    const before = state()
    await go('Total flow, stream 101')
    await user.keyboard('1{Enter}{Delete}')
    await user.paste('1')
    expect(document.querySelector('.grid-editor')).toBeNull()
    expect(said('Total flow, stream 101')).toContain('50\u00a0000 kg/h, given')
    expect(state()).toBe(before)
    expect(screen.queryByRole('button', { name: 'Add' })).toBeNull()
    await user.click(document.querySelector('[aria-label^="Stream 103, unit T-101"]') as HTMLElement)
    expect(state()).toBe(before)
  })
})
