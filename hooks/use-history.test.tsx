import { act, renderHook } from '@testing-library/react'
import { describe, expect, it, vi } from 'vitest'
import type { RecordOf } from '@/lib/book/kinds'
import { useLocalBook } from './use-local-book'

const book: RecordOf<'book'> = {
  kind: 'book',
  id: 'book-1',
  name: 'Plant',
  description: '',
  documentNumber: '',
  basis: 'mass',
  flowUnit: 'kg/h',
}

const rename = (id: string, from: string, to: string) => ({
  id,
  label: `Name: ${to}`,
  create: [],
  remove: [],
  update: [{ kind: 'book' as const, id: 'book-1', fields: { name: [from, to] as [string, string] } }],
})

describe('undo and redo of a book in this page', () => {
  const open = () => renderHook(() => useLocalBook([book], vi.fn()))
  const name = (hook: ReturnType<typeof open>) => hook.result.current.state.book.get('book-1')?.name

  it('takes edits back and brings them again, in order, without limit', () => {
    const hook = open()
    act(() => {
      for (let i = 0; i < 50; i++) hook.result.current.edit(rename(`change-${i}`, i ? `v${i - 1}` : 'Plant', `v${i}`))
    })
    expect(name(hook)).toBe('v49')
    act(() => {
      for (let i = 0; i < 50; i++) hook.result.current.history.undo()
    })
    expect(name(hook)).toBe('Plant')
    expect(hook.result.current.history.undoLabel).toBe(null)
    act(() => {
      for (let i = 0; i < 50; i++) hook.result.current.history.redo()
    })
    expect(name(hook)).toBe('v49')
    expect(hook.result.current.history.redoLabel).toBe(null)
  })

  it('forgets what could be redone once something else is edited', () => {
    const hook = open()
    act(() => void hook.result.current.edit(rename('change-a', 'Plant', 'A')))
    act(() => hook.result.current.history.undo())
    act(() => void hook.result.current.edit(rename('change-b', 'Plant', 'B')))
    expect(hook.result.current.history.redoLabel).toBe(null)
    expect(hook.result.current.history.undoLabel).toBe('Name: B')
  })

  it('refuses an edit that does not fit, in words, and changes nothing', () => {
    const hook = open()
    let said: string | null = null
    act(() => {
      said = hook.result.current.edit(rename('change-a', 'Other', 'A'))
    })
    expect(said).toContain('has been changed since, from “Other” to “Plant”')
    expect(name(hook)).toBe('Plant')
    act(() => {
      said = hook.result.current.edit(rename('change-a', 'Plant', ''))
    })
    expect(said).toContain('needs a name')
    expect(name(hook)).toBe('Plant')
  })
})
