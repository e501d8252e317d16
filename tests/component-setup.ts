import '@testing-library/jest-dom/vitest'
import { cleanup } from '@testing-library/react'
import { afterEach } from 'vitest'

afterEach(cleanup)

// happy-dom has no layout; the virtualiser reads these two.
for (const [key, size] of [
  ['clientHeight', 600],
  ['clientWidth', 1200],
] as const)
  Object.defineProperty(HTMLElement.prototype, key, { configurable: true, get: () => size })
