import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { newAddress } from './post-box'

/**
 * The door as it is outside of tests: modules read the settings anew, without the flag that turns limits off. Only here.
 * Each test calls from an address of its own, since limits count by it.
 */
let door: typeof import('@/app/api/auth/[...all]/route')
let attempts: typeof import('@/lib/auth/attempts')

beforeAll(async () => {
  vi.resetModules()
  vi.stubEnv('TALLYBROOK_TEST', '')
  door = await import('@/app/api/auth/[...all]/route')
  attempts = await import('@/lib/auth/attempts')
})
afterAll(() => vi.unstubAllEnvs())

const origin = 'http://127.0.0.1:3000'
const post = (path: string, body: unknown, from: string) =>
  door.POST(
    new Request(`${origin}/api/auth${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin, 'x-forwarded-for': from },
      body: JSON.stringify(body),
    }),
  )

async function repeat(times: number, ask: (turn: number) => Promise<Response>): Promise<number[]> {
  const statuses: number[] = []
  for (let turn = 0; turn < times; turn++) statuses.push((await ask(turn)).status)
  return statuses
}

describe('outside of tests', () => {
  it('signing in is tried three times in ten seconds from one place, whatever the address', async () => {
    const tries = await repeat(4, () =>
      post('/sign-in/email', { email: newAddress(), password: 'wrong password' }, '198.51.100.1'),
    )
    expect(tries).toEqual([401, 401, 401, 429])
    const elsewhere = await post('/sign-in/email', { email: newAddress(), password: 'wrong' }, '198.51.100.2')
    expect(elsewhere.status).toBe(401)
  })

  it.each([
    ['/sign-up/email', () => ({ name: 'Ada', email: newAddress(), password: 'a long enough one' }), 200],
    ['/request-password-reset', () => ({ email: newAddress() }), 200],
    ['/send-verification-email', () => ({ email: newAddress() }), 200],
    ['/two-factor/verify-totp', () => ({ code: '123456' }), 401],
    ['/change-password', () => ({ currentPassword: 'x', newPassword: 'a long enough one' }), 401],
  ] as const)('%s is limited too', async (path, body, first) => {
    const from = `198.51.100.${10 + path.length}`
    const tries = await repeat(4, () => post(path, body(), from))
    expect(tries).toEqual([first, first, first, 429])
  })

  it('one address is tried twenty times in a quarter of an hour, from wherever', async () => {
    const email = newAddress()
    const tries = await repeat(21, (turn) =>
      post('/sign-in/email', { email: turn % 2 ? email : email.toUpperCase(), password: 'wrong' }, `203.0.113.${turn}`),
    )
    expect(tries).toEqual([...Array(20).fill(401), 429])
  }, 60_000)

  it('one address gets five mails in an hour that anybody can ask for', async () => {
    const { mailsTo } = await import('./post-box')
    const email = newAddress()
    const tries = await repeat(8, (turn) =>
      post('/sign-up/email', { name: 'Ada', email, password: 'a long enough one' }, `192.0.2.${turn}`),
    )
    expect(tries).toEqual(Array(8).fill(200))
    expect(await mailsTo(email)).toHaveLength(5)
  }, 60_000)

  it('tries are counted all, even where they come at once', async () => {
    const email = newAddress()
    const allowed = await Promise.all(Array.from({ length: 30 }, () => attempts.countAttempt('signIn', email)))
    expect(allowed.filter(Boolean)).toHaveLength(20)
    await attempts.forgetAttempts('signIn', email)
    expect(await attempts.countAttempt('signIn', email)).toBe(true)
  })
})
