import type { Page } from 'playwright-core'

/** An answer other than 2xx is told in the console by the browser itself: a refusal is no error of the page. */
const told = /^Failed to load resource: /

/** Notes exceptions that nobody caught and what the page writes as an error into the console. */
export function watchErrors(page: Page, allowed: RegExp[], errors: string[]): void {
  const note = (text: string) => {
    if (!allowed.some((pattern) => pattern.test(text))) errors.push(text)
  }
  page.on('pageerror', (error) => note(`${error.name}: ${error.message}`))
  page.on('console', (message) => {
    if (message.type() === 'error' && !told.test(message.text())) note(message.text())
  })
}
