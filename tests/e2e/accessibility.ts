import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import type { AxeResults, default as axe } from 'axe-core'
import type { Page } from 'playwright-core'

const source = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

/** Fails when axe finds a serious or critical violation in the page as it stands, naming each with its places. */
export async function expectNoSeriousViolations(page: Page): Promise<void> {
  await page.evaluate(source)
  const results = await page.evaluate(
    (): Promise<AxeResults> => (globalThis as unknown as { axe: typeof axe }).axe.run(document),
  )
  const bad = results.violations.filter(({ impact }) => impact === 'serious' || impact === 'critical')
  if (bad.length === 0) return
  const lines = bad.map(({ id, impact, help, nodes }) => {
    const places = nodes.slice(0, 5).map((node) => `    ${node.target.join(' ')}\n      ${node.failureSummary ?? ''}`)
    return `  ${impact}: ${help} (${id}), ${nodes.length} places\n${places.join('\n')}`
  })
  throw new Error(`${page.url()} has accessibility violations:\n${lines.join('\n')}`)
}
