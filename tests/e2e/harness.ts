import { mkdirSync } from 'node:fs'
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core'
import { afterAll, inject, test } from 'vitest'
import { watchErrors } from './page-errors'

/** What a scenario is given. */
export type Stage = {
  /** A fresh browser profile's page, signed out. */
  page: Page
  baseUrl: string
  /** Another person: a page in a browser profile of their own, watched for errors like the first. */
  anotherPerson: () => Promise<Page>
}

export type ScenarioOptions = {
  /** Page errors and console errors that the scenario provokes on purpose. */
  allowErrors?: RegExp[]
  timeoutMs?: number
}

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

let launched: Promise<Browser> | undefined

/** One browser a test file; each person gets a profile of their own in it. */
function browser(): Promise<Browser> {
  launched ??= chromium.launch({ executablePath: inject('chromium'), args: flags })
  return launched
}

afterAll(async () => {
  await (await launched)?.close()
  launched = undefined
})

/**
 * One thing a person does, in a real browser. Fails on an error that nobody caught in the page; a failure leaves
 * pictures of every open page in test-results/.
 */
export function scenario(name: string, act: (stage: Stage) => Promise<void>, options: ScenarioOptions = {}): void {
  const limit = options.timeoutMs ?? 60_000
  // The limit is ours to keep: vitest's own would end the test before pictures are taken.
  test(name, { timeout: limit + 30_000 }, async () => {
    const contexts: BrowserContext[] = []
    const pages: Page[] = []
    const errors: string[] = []
    const person = async () => {
      const context = await (await browser()).newContext({
        baseURL: inject('baseUrl'),
        viewport: { width: 1440, height: 900 },
        locale: 'en-GB',
        permissions: ['clipboard-read', 'clipboard-write'],
      })
      context.setDefaultTimeout(15_000)
      contexts.push(context)
      context.on('page', (page) => {
        pages.push(page)
        watchErrors(page, options.allowErrors ?? [], errors)
      })
      return context.newPage()
    }
    try {
      await within(limit, act({ page: await person(), baseUrl: inject('baseUrl'), anotherPerson: person }))
      if (errors.length > 0) throw new Error('The page had errors that nobody caught.')
    } catch (cause) {
      await takePictures(name, pages)
      if (cause instanceof Error && errors.length > 0) cause.message += `\nErrors in the page:\n${errors.join('\n')}`
      throw cause
    } finally {
      await Promise.all(contexts.map((context) => context.close()))
    }
  })
}

/** Rejects when the work takes longer than `limit` milliseconds; where it stood is in the pictures. */
async function within(limit: number, work: Promise<void>): Promise<void> {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error(`The scenario was not over after ${limit / 1000} s.`)), limit)
  })
  try {
    await Promise.race([work, late])
  } finally {
    clearTimeout(timer)
  }
}

async function takePictures(name: string, pages: Page[]): Promise<void> {
  mkdirSync('test-results/browser', { recursive: true })
  const file = name
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, 80)
  for (const [place, page] of pages.entries()) {
    if (page.isClosed()) continue
    // A page that cannot be drawn must not hide why the scenario failed.
    await page.screenshot({ path: `test-results/browser/${file}-${place + 1}.png`, timeout: 5000 }).catch(() => {})
  }
}
