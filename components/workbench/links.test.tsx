import { screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { openBench } from './test-bench'

describe('connections', () => {
  it('goes round none, in, out, none by Space, and sets by I, O and Delete', async () => {
    const { user, said, go, state } = openBench()
    const name = 'Stream 112, unit T-101'
    // 112 has a source and no sink: it can enter; coming out is taken, so the round is in, none.
    await go(name)
    expect(said(name)).toBe(`${name}: in`)
    await user.keyboard(' ')
    expect(said(name)).toBe(`${name}: not connected`)
    await user.keyboard('i')
    expect(said(name)).toBe(`${name}: in`)
    await user.keyboard('{Delete}')
    expect(said(name)).toBe(`${name}: not connected`)
    const free = 'Stream 101, unit T-101'
    await go(free)
    expect(said(free)).toBe(`${free}: out`)
    await user.keyboard('{Enter}')
    expect(said(free)).toBe(`${free}: not connected`)
    await user.keyboard('{Enter}')
    expect(said(free)).toBe(`${free}: in`)
    expect(state().link.size).toBe(18)
  })

  it('says why a link is refused at its place, and moves it when told to', async () => {
    const { user, said, go } = openBench()
    await go('Stream 102, unit C-103')
    const question = await screen.findByRole('alertdialog')
    expect(question).toHaveTextContent('already enters E-102 and already comes out of T-101')
    await user.click(within(question).getByRole('button', { name: 'Let it enter C-103 instead' }))
    expect(said('Stream 102, unit C-103')).toContain(': in')
    expect(said('Stream 102, unit E-102')).toContain('not connected')
  })

  it('says at once which unit has lost its outlet', async () => {
    const { user, cell, go } = openBench()
    await go('Stream 102, unit T-101')
    await user.keyboard('{Delete}')
    const head = cell('Unit T-101')
    expect(head.getAttribute('aria-label')).toContain('no outlet')
    expect(head.getAttribute('aria-description')).toContain('T-101')
    expect(head).toHaveTextContent('no outlet')
  })

  it('changes the kind of a unit in its row head', async () => {
    const { user, go, state } = openBench()
    await go('Kind of T-101')
    await user.keyboard('sep{Enter}')
    expect([...state().unit.values()].find(({ tag }) => tag === 'T-101')).toMatchObject({ unitKind: 'separator' })
  })
})

describe('rules', () => {
  it('adds a split, which closes the table once its parts are chosen', async () => {
    const { user, strip, state } = openBench()
    await user.click(screen.getByRole('tab', { name: /Rules/ }))
    await user.click(screen.getByRole('button', { name: 'Remove rule Q1' }))
    expect(state().rule.size).toBe(0)
    expect(strip()).toContain('1 more value closes the table')
    await user.click(screen.getByRole('button', { name: 'Rule' }))
    await user.click(await screen.findByRole('menuitem', { name: 'Split' }))
    const unit = [...state().unit.values()].find(({ tag }) => tag === 'M-105')
    const stream = [...state().stream.values()].find(({ tag }) => tag === '109')
    await user.selectOptions(screen.getByRole('combobox', { name: 'Unit' }), unit?.id ?? '')
    await user.selectOptions(screen.getByRole('combobox', { name: 'Stream' }), stream?.id ?? '')
    await user.type(screen.getByRole('textbox', { name: 'Value' }), '55 %{Enter}')
    expect([...state().rule.values()][0]).toMatchObject({ ruleKind: 'split', value: 0.55 })
    expect(strip()).toContain('the table closes')
  })
})
