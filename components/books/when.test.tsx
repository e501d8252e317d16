import { render, screen } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { relativeTime, When } from './when'

const now = new Date('2026-03-10T12:00:00Z')
const ago = (seconds: number) => relativeTime(new Date(now.getTime() - seconds * 1000), now)

describe('relativeTime', () => {
  it.each([
    [0, 'just now'],
    [59, 'just now'],
    [60, '1 minute ago'],
    [3599, '59 minutes ago'],
    [3600, '1 hour ago'],
    [86_399, '23 hours ago'],
    [86_400, 'yesterday'],
    [3 * 86_400, '3 days ago'],
    [31 * 86_400, 'last month'],
    [400 * 86_400, 'last year'],
    [-30, 'just now'],
  ])('%i s ago', (seconds, words) => {
    expect(ago(seconds)).toBe(words)
  })
})

describe('When', () => {
  it('keeps the exact moment under the words', () => {
    render(<When at="2020-02-03T04:05:06Z" />)
    const time = screen.getByText(/years ago/)
    expect(time).toHaveAttribute('datetime', '2020-02-03T04:05:06.000Z')
    expect(time.getAttribute('title')).toMatch(/2020/)
  })
})
