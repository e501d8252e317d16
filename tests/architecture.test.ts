import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { checkHouse } from './architecture/check-house'
import { findCircles } from './architecture/find-circles'
import { listSources } from './architecture/list-sources'
import { rooms } from './architecture/rooms'

const root = path.resolve(import.meta.dirname, '..')

describe('the house', () => {
  it('has every arrow, name and size in order', () => {
    const files = listSources(root)
    expect(files.length).toBeGreaterThan(50)
    const sources = new Map(files.map((file) => [file, readFileSync(path.join(root, file), 'utf8')]))
    expect(checkHouse(sources)).toEqual([])
  })

  it('has no circle among its rooms', () => {
    const graph = new Map(rooms.map((room) => [room.name, [...room.calls, ...(room.typesFrom ?? [])]]))
    expect(findCircles(graph)).toEqual([])
  })

  it('names only rooms that there are', () => {
    const names = new Set(['*', ...rooms.map((room) => room.name)])
    expect(
      rooms.flatMap((room) => [...room.calls, ...(room.typesFrom ?? [])]).filter((name) => !names.has(name)),
    ).toEqual([])
  })
})

/** A small house in order, into which each case plants one fault. */
const inOrder = {
  'app/page.tsx':
    "import { Cell } from '@/components/cell'\nimport { get } from '@/lib/data/get'\nimport './look.css'\n",
  'components/cell.tsx':
    "'use client'\nimport { useX } from '@/hooks/use-x'\nimport type { Row } from '@/db/row'\nexport const Cell = 1\n",
  'hooks/use-x.ts': "import { solve } from '@/lib/balance/solve'\nexport const useX = solve\n",
  'lib/data/get.ts':
    "import { db } from '@/db/client'\nimport { solve } from '../balance/solve'\nexport const get = [db, solve]\n",
  'lib/balance/solve.ts': 'export const solve = 1 // never Math.random, never process.env\n',
  'lib/balance/solve.test.ts': "import { readFileSync } from 'node:fs'\nconst at = Date.now()\n",
  'lib/env.ts': 'export const env = process.env\n',
  'db/client.ts': "import { env } from '@/lib/env'\nexport const db = env\n",
  'db/row.ts': 'export type Row = 1\n',
}

const check = (planted: Record<string, string> = {}) => checkHouse(new Map(Object.entries({ ...inOrder, ...planted })))

describe('the checker', () => {
  it('finds nothing wrong in a house in order', () => {
    expect(check()).toEqual([])
  })

  it.each<[string, Record<string, string>, string]>([
    [
      'a page that queries',
      { 'app/p.ts': "import { db } from '@/db/client'" },
      'app/p.ts -> db/client.ts: app may take only types from db',
    ],
    [
      'a re-export upwards',
      { 'lib/data/up.ts': "export { Cell } from '@/components/cell'" },
      'lib/data may not import components',
    ],
    ['a type upwards', { 'lib/book/up.ts': "import type { T } from '@/app/page'" }, 'lib/book may not import app'],
    [
      'a hook with a component',
      { 'hooks/h.ts': "import { Cell } from '@/components/cell'" },
      'hooks may not import components',
    ],
    [
      'a late import of the database',
      { 'lib/export/x.ts': "const d = import('@/db/client')" },
      'lib/export may not import db',
    ],
    [
      'a type written inline',
      { 'lib/balance/t.ts': "type T = import('../errors').T", 'lib/errors.ts': '' },
      'lib/balance may not import lib/errors',
    ],
    [
      'a solver that imports ours',
      { 'lib/balance/b.ts': "import { env } from '@/lib/env'" },
      'lib/balance may not import lib/env',
    ],
    ['a solver with chance', { 'lib/balance/r.ts': 'export const r = Math.random()' }, 'uses Math.random'],
    ['a solver with a clock', { 'lib/balance/r.ts': 'export const r = Date.now()' }, 'uses Date.now'],
    [
      'a book with React',
      { 'lib/book/r.ts': "import { useState } from 'react'" },
      'lib/book/r.ts -> react: lib/book imports no React',
    ],
    [
      'a sheet with the machine',
      { 'lib/sheet/r.ts': "import fs from 'node:fs'" },
      'lib/sheet imports no React and no server code',
    ],
    ['a sheet with the machine, spelt short', { 'lib/sheet/r.ts': "import fs from 'fs'" }, 'lib/sheet/r.ts -> fs'],
    ['a solver with a network', { 'lib/balance/r.ts': "export const r = fetch('/x')" }, 'uses fetch'],
    ['a reader of settings', { 'lib/data/s.ts': 'export const s = process.env.SECRET' }, 'reads process.env'],
    ['a roundabout reader', { 'lib/data/s.ts': 'const { env } = process' }, 'reads process.env'],
    ['a file in no room', { 'lib/misc/x.ts': '' }, 'belongs to no room'],
    ['a file that is too long', { 'lib/book/long.ts': '//\n'.repeat(401) }, 'has 401 lines'],
    ['a name in camel case', { 'lib/book/toProblem.ts': '' }, 'not named in kebab-case'],
    [
      'code that imports tests',
      { 'lib/book/t.ts': "import '../../tests/h'", 'tests/h.ts': '' },
      'only tests import tests',
    ],
  ])('catches %s', (_, planted, rule) => {
    expect(check(planted).join('\n')).toContain(rule)
  })

  it('follows what a "use client" file draws in, and names the way', () => {
    const planted = {
      'components/a.tsx': "'use client'\nimport { b } from './b'",
      'components/b.ts': "import { c } from '@/lib/auth/c'\nexport const b = c",
      'lib/auth/c.ts': "import { db } from '@/db/client'\nexport const c = db",
    }
    expect(check(planted)).toEqual([
      'components/a.tsx -> components/b.ts -> lib/auth/c.ts -> db/client.ts: a "use client" file takes no server code with it',
    ])
  })

  it('lets a "use client" file call a server action and take types', () => {
    const planted = {
      'app/form.tsx': "'use client'\nimport { save } from './save'\nimport type { G } from '@/lib/data/get'",
      'app/save.ts': "'use server'\nimport { get } from '@/lib/data/get'\nexport const save = get",
    }
    expect(check(planted)).toEqual([])
  })

  it('finds a circle, and takes types and late imports for none', () => {
    const circle = {
      'lib/book/a.ts': "import './b'",
      'lib/book/b.ts': "export * from './c'",
      'lib/book/c.ts': "import { a } from './a'",
      'lib/book/d.ts': "import './e'",
      'lib/book/e.ts': "import type { D } from './d'\nconst d = import('./d')",
    }
    expect(check(circle)).toEqual([
      'lib/book/a.ts -> lib/book/b.ts -> lib/book/c.ts: these import each other in a circle',
    ])
  })

  it('refuses a file that cannot be parsed rather than passing it', () => {
    expect(() => check({ 'lib/book/x.ts': 'import {' })).toThrow('lib/book/x.ts cannot be parsed')
  })
})
