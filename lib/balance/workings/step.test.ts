import { expect, it } from 'vitest'
import { sameUse, type Use } from './step'

it('tells two ratios of groups in one stream apart, however their groups are ordered', () => {
  const use = (parts: string[]): Use => ({ equation: 'given', stream: '1', quantity: 'groupMassRatio', parts })
  expect(sameUse(use(['A', 'B']))).toBe(sameUse(use(['B', 'A'])))
  expect(sameUse(use(['A', 'B']))).not.toBe(sameUse(use(['A'])))
})
