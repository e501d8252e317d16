import { spawnSync } from 'node:child_process'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'

const root = join(import.meta.dirname, '../..')
const run = (files: string[], input?: string) =>
  spawnSync('npx', ['tsx', 'lib/cli/solve.ts', ...files], {
    cwd: root,
    encoding: 'utf8',
    ...(input !== undefined && { input }),
  })

const salt = 'tests/fixtures/demo/demo-a-salt.book.json'
const book = {
  format: 'tallybrook/1',
  name: 'piped',
  basis: 'mass',
  flowUnit: 'kg/h',
  components: [{ id: 'A' }],
  streams: [{ id: '1' }],
  units: [],
  links: {},
}

describe('npm run solve', () => {
  it('prints one result a line for good files and one line a fault for bad ones, and exits 2', () => {
    const { stdout, stderr, status } = run(
      [salt, 'no-such-file.json', '-'],
      JSON.stringify({ ...book, basis: 'weight', shade: 1 }),
    )
    expect(status).toBe(2)
    const lines = stdout.trim().split('\n')
    expect(lines).toHaveLength(1)
    expect(JSON.parse(lines[0] as string)).toMatchObject({ format: 'tallybrook-result/1', status: 'solved' })
    const faults = stderr.trim().split('\n')
    expect(faults).toHaveLength(3)
    expect(faults[0]).toMatch(/^no-such-file\.json: file: cannot be read/)
    expect(faults).toContain('-: basis: must be "mass" or "mole"')
    expect(faults).toContain('-: shade: "shade" is not a known key here')
  })

  it('reads standard input, accepts --all-boundaries, exits 0', () => {
    const { stdout, stderr, status } = run(['--all-boundaries', '-'], JSON.stringify(book))
    expect([status, stderr]).toEqual([0, ''])
    expect(JSON.parse(stdout)).toMatchObject({
      name: 'piped',
      boundaries: [],
      // A stream of one component is all of it.
      workings: [{ step: 1, kind: 'stream', stream: '1', unknowns: 0, equations: 0 }],
      checks: [],
    })
    expect(Array.isArray(JSON.parse(stdout).measureNext)).toBe(true)
  })

  it('says in one line that a file is no JSON', () => {
    const { stdout, stderr, status } = run(['-'], '{"format":\n oops')
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr.trim().split('\n')).toHaveLength(1)
    expect(stderr).toMatch(/^-: file: is not JSON/)
  })
})
