import { readdirSync } from 'node:fs'
import path from 'node:path'

const notOurs = new Set(['node_modules', 'coverage', 'test-results', 'public', 'migrations', 'fixtures'])

/** Every source file of the checkout, as paths from its top; hidden and generated folders left out. */
export function listSources(root: string, folder = ''): string[] {
  return readdirSync(path.join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const file = path.posix.join(folder, entry.name)
    if (entry.isDirectory()) return entry.name.startsWith('.') || notOurs.has(entry.name) ? [] : listSources(root, file)
    return /\.(ts|tsx|mjs)$/.test(entry.name) && entry.name !== 'next-env.d.ts' ? [file] : []
  })
}
