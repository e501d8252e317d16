import { redirect } from 'next/navigation'
import { describe, expect, it } from 'vitest'
import { fail, ok } from '../errors'
import { handle } from './handle'
import { makeLogger } from './logger'
import { readJson } from './read-json'

function recorder() {
  const lines: Record<string, unknown>[] = []
  const log = makeLogger('debug', { write: (line: string) => void lines.push(JSON.parse(line)) })
  return { lines, log }
}

const get = (headers: Record<string, string> = {}) => new Request('http://here.test/api/books/7?q=secret', { headers })

describe('handle', () => {
  it('answers a value as JSON and logs one line with the request id', async () => {
    const { lines, log } = recorder()
    const response = await handle(get(), 'book', () => ok({ a: 1 }), log)
    expect(response.status).toBe(200)
    expect(await response.json()).toEqual({ a: 1 })
    expect(lines).toHaveLength(1)
    expect(lines[0]).toMatchObject({ name: 'book', method: 'GET', path: '/api/books/7', status: 200, level: 'info' })
    expect(lines[0]?.requestId).toBe(response.headers.get('x-request-id'))
  })

  it('answers nothing with 204', async () => {
    const { log } = recorder()
    expect((await handle(get(), 'book', () => ok(), log)).status).toBe(204)
  })

  it('keeps a harmless request id and replaces any other', async () => {
    const { log } = recorder()
    const kept = await handle(get({ 'x-request-id': 'abc-12345678' }), 'book', () => ok(1), log)
    expect(kept.headers.get('x-request-id')).toBe('abc-12345678')
    const replaced = await handle(get({ 'x-request-id': '{"level":"error"}' }), 'book', () => ok(1), log)
    expect(replaced.headers.get('x-request-id')).toMatch(/^[0-9a-f-]{36}$/)
  })

  it('maps a refusal to its status, with issues and detail', async () => {
    const { log } = recorder()
    const refused = fail('conflict', 'Someone else changed this.', { detail: { theirs: 4, yours: 5 } })
    const response = await handle(get({ 'x-request-id': 'abc-12345678' }), 'change', () => refused, log)
    expect(response.status).toBe(409)
    expect(await response.json()).toEqual({
      error: {
        code: 'conflict',
        message: 'Someone else changed this.',
        detail: { theirs: 4, yours: 5 },
        requestId: 'abc-12345678',
      },
    })
  })

  it('logs what was thrown with its cause, and tells the caller only a plain sentence', async () => {
    const { lines, log } = recorder()
    const thrown = () => {
      throw new Error('query failed: select hidden_column', { cause: new Error('socket closed') })
    }
    const response = await handle(get({ 'x-request-id': 'abc-12345678' }), 'book', thrown, log)
    expect(response.status).toBe(500)
    const body = await response.text()
    expect(body).toContain('abc-12345678')
    expect(body).not.toContain('hidden_column')
    expect(JSON.stringify(lines[0])).toContain('socket closed')
    expect(lines.every((line) => line.requestId === 'abc-12345678')).toBe(true)
  })

  it('does not pass on what an internal refusal says', async () => {
    const { lines, log } = recorder()
    const refused = fail('internal', 'row 7 has no parent', { detail: { row: 7 } })
    const response = await handle(get(), 'book', () => refused, log)
    expect(await response.text()).not.toContain('row 7')
    expect(JSON.stringify(lines[0])).toContain('row 7 has no parent')
  })

  it('lets a redirect through', async () => {
    const { log } = recorder()
    await expect(handle(get(), 'book', () => redirect('/sign-in'), log)).rejects.toMatchObject({
      digest: expect.stringContaining('NEXT_REDIRECT'),
    })
  })

  it('adds the request id to a response made elsewhere', async () => {
    const { log } = recorder()
    const response = await handle(get(), 'book', () => Response.redirect('http://here.test/', 303), log)
    expect(response.status).toBe(303)
    expect(response.headers.get('location')).toBe('http://here.test/')
    expect(response.headers.get('x-request-id')).toBeTruthy()
  })
})

describe('logger', () => {
  it('does not write passwords, tokens or cookies', () => {
    const { lines, log } = recorder()
    log.info({ password: 'p1', body: { token: 't1' }, headers: { cookie: 'c1' } }, 'seen')
    expect(JSON.stringify(lines)).not.toMatch(/p1|t1|c1/)
  })
})

describe('readJson', () => {
  const post = (body: string, type = 'application/json') =>
    new Request('http://here.test/', { method: 'POST', body, headers: { 'content-type': type } })

  it('reads JSON', async () => {
    expect(await readJson(post('{"a":[1]}', 'application/json; charset=utf-8'))).toEqual({
      ok: true,
      value: { a: [1] },
    })
  })

  it.each([
    ['another type', post('{"a":1}', 'text/plain')],
    ['broken JSON', post('{"a":')],
    ['an empty body', post('')],
  ])('refuses %s', async (_, request) => {
    expect(await readJson(request)).toMatchObject({ ok: false, error: { code: 'badInput' } })
  })

  it('stops at the limit even when no length is told', async () => {
    const endless = new ReadableStream<Uint8Array>({ pull: (controller) => controller.enqueue(new Uint8Array(1000)) })
    const request = new Request('http://here.test/', {
      method: 'POST',
      body: endless,
      headers: { 'content-type': 'application/json' },
      duplex: 'half',
    } as RequestInit)
    expect(await readJson(request, 5000)).toMatchObject({
      ok: false,
      error: { message: expect.stringContaining('0.005 MB') },
    })
  })
})
