import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { sourceFiles } from './build.mjs'
import { installedAgrees } from './dependencies.mjs'
import { isAtLeast } from './node-version.mjs'
import { freePort, isFree } from './ports.mjs'
import { run } from './run.mjs'
import { Trouble } from './say.mjs'
import { keptSecret } from './secret.mjs'
import { sentence, sum, tallyOf } from './test-report.mjs'

const folder = mkdtempSync(path.join(tmpdir(), 'tallybrook-unit-'))
afterAll(() => rmSync(folder, { recursive: true }))

describe('isAtLeast', () => {
  it.each([
    ['20.19.0', '20.19', true],
    ['20.9.0', '20.19', false],
    ['22.0.0', '20.19', true],
    ['18.99.9', '20.19', false],
  ])('Node %s for %s: %s', (version, least, answer) => {
    expect(isAtLeast(version, least)).toBe(answer)
  })
})

describe('installedAgrees', () => {
  const lock = {
    packages: {
      '': {},
      'node_modules/a': { version: '1.0.0' },
      'node_modules/b': { version: '2.0.0', optional: true },
    },
  }

  it('takes what is installed when nothing asked for is missing', () => {
    expect(installedAgrees(lock, { packages: { 'node_modules/a': { version: '1.0.0' } } })).toBe(true)
  })
  it('sees another version', () => {
    expect(installedAgrees(lock, { packages: { 'node_modules/a': { version: '1.0.1' } } })).toBe(false)
  })
  it('sees what is missing', () => {
    expect(installedAgrees(lock, { packages: { 'node_modules/b': { version: '2.0.0' } } })).toBe(false)
  })
})

describe('run', () => {
  it('gives back what was printed and how it ended', async () => {
    const ended = await run(process.execPath, ['-e', 'console.log("out"); console.error("err"); process.exit(3)'])
    expect(ended).toMatchObject({ code: 3, output: expect.stringMatching(/out[\s\S]*err|err[\s\S]*out/) })
  })
  it('ends what takes too long, and what that has started', async () => {
    // Were it not ended, this test would run into its own limit.
    const ended = await run('/bin/sh', ['-c', 'sleep 300 & wait'], { limitMs: 300 })
    expect(ended.code).not.toBe(0)
    expect(ended.output).toContain('without finishing')
  })
  it('says in a sentence that a program is not there', async () => {
    await expect(run('no-such-program-here', [])).rejects.toBeInstanceOf(Trouble)
  })
  it('stops when asked', async () => {
    const stopping = new AbortController()
    const running = run('/bin/sh', ['-c', 'sleep 60 & wait'], { signal: stopping.signal })
    stopping.abort()
    await expect(running).rejects.toThrow()
  })
})

describe('ports', () => {
  it('passes over one that is taken', async () => {
    const taken = createServer()
    await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve))
    const address = taken.address()
    const port = typeof address === 'object' && address ? address.port : 0
    expect(await isFree(port)).toBe(false)
    expect(await freePort(port)).not.toBe(port)
    await new Promise((resolve) => taken.close(resolve))
    expect(await freePort(port)).toBe(port)
  })
})

describe('keptSecret', () => {
  it('is made once, for the owner alone', () => {
    const file = path.join(folder, 'secret')
    const secret = keptSecret(file)
    expect(secret).toMatch(/^[0-9a-f]{64}$/)
    expect(keptSecret(file)).toBe(secret)
    expect(statSync(file).mode & 0o777).toBe(0o600)
  })
})

describe('sourceFiles', () => {
  it('has what the build is made of and leaves out what it is not', () => {
    const files = sourceFiles()
    expect(files).toContain('lib/errors.ts')
    expect(files).toContain('package-lock.json')
    expect(files.filter((file) => /\.test\.|^lib\/local\/|^tests\/|node_modules/.test(file))).toEqual([])
  })
})

describe('tallyOf', () => {
  const report = (name: string, content: object) => {
    const file = path.join(folder, name)
    writeFileSync(
      file,
      JSON.stringify({
        numPassedTests: 0,
        numFailedTests: 0,
        numPendingTests: 0,
        numTodoTests: 0,
        testResults: [],
        ...content,
      }),
    )
    return file
  }

  it('counts what vitest counts', () => {
    const testResults = [{ status: 'failed', assertionResults: [{ status: 'failed' }, { status: 'passed' }] }]
    const file = report('a', { numPassedTests: 5, numFailedTests: 1, numPendingTests: 2, numTodoTests: 1, testResults })
    expect(tallyOf(file, 1)).toEqual({ passed: 5, failed: 1, skipped: 3 })
  })
  it('counts a file that did not load', () => {
    const file = report('b', { numPassedTests: 5, testResults: [{ status: 'failed', assertionResults: [] }] })
    expect(tallyOf(file, 1)).toEqual({ passed: 5, failed: 1, skipped: 0 })
  })
  it('counts an error outside any test', () => {
    expect(tallyOf(report('c', { numPassedTests: 5 }), 1).failed).toBe(1)
  })
  it('counts a run without a test', () => {
    expect(tallyOf(report('d', {}), 0).failed).toBe(1)
  })
  it('counts a run that wrote no report', () => {
    expect(tallyOf(path.join(folder, 'none'), 0).failed).toBe(1)
  })
  it('ends in one line', () => {
    expect(
      sentence(
        sum([
          { passed: 2, failed: 0, skipped: 0 },
          { passed: 3, failed: 1, skipped: 0 },
        ]),
      ),
    ).toBe('5 passed, 1 failed')
    expect(sentence({ passed: 1, failed: 0, skipped: 2 })).toBe('1 passed, 0 failed, 2 skipped')
  })
})
