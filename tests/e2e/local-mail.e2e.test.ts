import { request } from 'node:http'
import { expect } from 'vitest'
import { expectNoSeriousViolations } from './accessibility'
import { scenario } from './harness'

/** The status of a page asked for under another name of the server, as a page on another site could make a browser do. */
function statusFor(address: string, host: string): Promise<number | undefined> {
  return new Promise((resolve, reject) => {
    request(address, { headers: { host } }, (answer) => {
      answer.resume()
      resolve(answer.statusCode)
    })
      .on('error', reject)
      .end()
  })
}

scenario('the mail of this machine is shown on this machine', async ({ page, baseUrl }) => {
  await page.goto('/local/mail')
  await page.getByRole('heading', { level: 1, name: 'Mail on this machine' }).waitFor()
  await expectNoSeriousViolations(page)
  const answer = await page.request.get('/local/mail/messages.json?to=nobody@example.com')
  expect(await answer.json()).toEqual({ messages: [] })

  for (const path of ['/local/mail', '/local/mail/messages.json']) {
    expect(await statusFor(baseUrl + path, new URL(baseUrl).host)).toBe(200)
    expect(await statusFor(baseUrl + path, 'elsewhere.example')).toBe(404)
  }
  expect((await page.request.get('/local/mail/..%2fauth-secret')).status()).toBe(404)
})
