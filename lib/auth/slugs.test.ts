import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { isTeamSlug, slugFrom } from './slugs'

describe('the address of a team', () => {
  it.each([
    ['Ada Lovelace', 'ada-lovelace'],
    ['Zoë Müller-Žižek', 'zoe-muller-zizek'],
    ["D'Arcy O’Neil", 'darcy-oneil'],
    ['山田', 'new-team'],
    ['  -- ', 'new-team'],
    ['API', 'api-team'],
    ['x'.repeat(100), 'x'.repeat(40)],
  ])('from %s is %s', (name, slug) => {
    expect(slugFrom(name)).toBe(slug)
    expect(isTeamSlug(slug)).toBe(true)
  })

  it.each(['api', 'sign-in', 'sample', 'Kestrel', 'a--b', '-a', 'a_b', '_next', 'favicon.ico', '', 'x'.repeat(49)])(
    'cannot be "%s"',
    (slug) => expect(isTeamSlug(slug)).toBe(false),
  )

  it('cannot be the path of any page of ours', () => {
    const root = new URL('../../app', import.meta.url).pathname
    const folders = (folder: string): string[] =>
      readdirSync(folder, { withFileTypes: true })
        .filter((entry) => entry.isDirectory())
        .flatMap((entry) => (entry.name.startsWith('(') ? folders(`${folder}/${entry.name}`) : [entry.name]))
    const paths = folders(root).filter((name) => !name.startsWith('[') && !name.startsWith('_') && name !== 'styles')
    for (const path of paths) expect(isTeamSlug(path), path).toBe(false)
  })
})
