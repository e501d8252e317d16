import { describe, expect, it } from 'vitest'
import { type BookState, stateOf } from '@/lib/book/state'
import { StateCache } from './state-cache'

const sized = (size: number): BookState =>
  stateOf(Array.from({ length: size }, (_, i) => ({ kind: 'case' as const, id: `${i}`, name: 'x', position: i })))

describe('StateCache', () => {
  it('gives a state back under its own number only', () => {
    const cache = new StateCache()
    const state = sized(1)
    cache.put('a', 3, state)
    expect(cache.get('a', 3)).toBe(state)
    expect(cache.get('a', 2)).toBeUndefined()
    expect(cache.get('a', 4)).toBeUndefined()
    expect(cache.get('b', 3)).toBeUndefined()
  })

  it('is not set back by a slow reader', () => {
    const cache = new StateCache()
    const newer = sized(1)
    cache.put('a', 3, newer)
    cache.put('a', 2, sized(1))
    expect(cache.get('a', 3)).toBe(newer)
  })

  it('drops what was used longest ago when full', () => {
    const cache = new StateCache(10)
    cache.put('a', 1, sized(4))
    cache.put('b', 1, sized(4))
    cache.get('a', 1)
    cache.put('c', 1, sized(4))
    expect(cache.get('a', 1)).toBeDefined()
    expect(cache.get('b', 1)).toBeUndefined()
    expect(cache.get('c', 1)).toBeDefined()
  })

  it('does not keep a book that is larger than it', () => {
    const cache = new StateCache(10)
    cache.put('a', 1, sized(4))
    cache.put('b', 1, sized(11))
    expect(cache.get('a', 1)).toBeDefined()
    expect(cache.get('b', 1)).toBeUndefined()
  })
})
