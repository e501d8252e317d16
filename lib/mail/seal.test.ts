import { describe, expect, it } from 'vitest'
import { seal, unseal } from './seal'

describe('a seal', () => {
  const secret = 'x'.repeat(32)

  it('opens for its own delivery and secret alone', () => {
    const sealed = seal('token ß', 'one', secret)
    expect(sealed).not.toContain('token')
    expect(unseal(sealed, 'one', secret)).toBe('token ß')
    expect(unseal(sealed, 'two', secret)).toBeNull()
    expect(unseal(sealed, 'one', 'y'.repeat(32))).toBeNull()
    expect(unseal(`${sealed.slice(0, -2)}AA`, 'one', secret)).toBeNull()
    expect(unseal('', 'one', secret)).toBeNull()
  })

  it('is another one each time', () => {
    expect(seal('a', 'one', secret)).not.toBe(seal('a', 'one', secret))
  })
})
