import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const alias = { '@': import.meta.dirname }
const pure = ['lib/**/*.test.ts', 'hooks/**/*.test.ts', 'tests/published/**/*.test.ts', 'tests/properties/**/*.test.ts']

export default defineConfig({
  test: {
    projects: [
      {
        resolve: { alias },
        test: {
          name: 'architecture',
          environment: 'node',
          include: ['tests/architecture.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        resolve: { alias },
        test: { name: 'unit', environment: 'node', include: pure, testTimeout: 60_000 },
      },
      {
        plugins: [react()],
        resolve: { alias },
        test: {
          name: 'component',
          environment: 'happy-dom',
          include: ['components/**/*.test.tsx', 'hooks/**/*.test.tsx', 'app/**/*.test.tsx'],
          setupFiles: ['tests/component-setup.ts'],
          testTimeout: 20_000,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'integration',
          environment: 'node',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/integration/global-setup.ts'],
          setupFiles: ['tests/integration/setup.ts'],
          fileParallelism: false,
          testTimeout: 90_000,
          hookTimeout: 90_000,
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/e2e/**/*.e2e.test.ts'],
          globalSetup: ['tests/e2e/global-setup.ts'],
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
})
