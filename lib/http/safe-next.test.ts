import { describe, expect, it } from 'vitest'
import { safeNext } from './safe-next'

describe('safeNext', () => {
  it.each(['/fennholt/books', '/fennholt/books/b1?case=main#cell', '/'])('keeps %s', (next) => {
    expect(safeNext(next)).toBe(next)
  })

  it.each([
    'https://elsewhere.example/',
    '//elsewhere.example/',
    '/\\elsewhere.example',
    '/\t/elsewhere.example',
    '/x/..//elsewhere.example',
    '/.//elsewhere.example',
    'javascript:alert(1)',
    'fennholt/books',
    '',
    undefined,
    ['/a', '/b'],
  ])('refuses %s', (next) => {
    expect(safeNext(next)).toBeNull()
  })
})
