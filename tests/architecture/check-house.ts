import { isBuiltin } from 'node:module'
import path from 'node:path'
import { findCircles } from './find-circles'
import { type ImportKind, type Module, readModule } from './read-module'
import { notPure, pureRooms, roomOf, serverOnlyFile, serverOnlyPackage } from './rooms'

/** An import as the rules see it: a file of ours, or a package. */
type Link = { target: string; isOurs: boolean; kind: ImportKind; specifier: string }
type House = Map<string, Module & { links: Link[] }>

const longest = 400
const settingsReaders =
  /^(lib\/env\.ts|lib\/local\/.*\.mjs|[\w.-]+\.config\.(ts|mjs)|instrumentation\.ts|tests\/.*|.*\.test\.tsx?)$/

/** Every broken rule of architecture: "file -> import: rule", or "file: rule". Empty for a house in order. */
export function checkHouse(sources: ReadonlyMap<string, string>): string[] {
  const house = readHouse(sources)
  const wrong: string[] = []
  for (const [file, module] of house) {
    wrong.push(...checkFile(file, module), ...checkArrows(file, module.links))
    if (module.directive === 'use client') wrong.push(...checkClient(file, house))
  }
  return [...wrong, ...checkCircles(house)].sort()
}

function readHouse(sources: ReadonlyMap<string, string>): House {
  const house: House = new Map()
  for (const [file, source] of sources) {
    const module = readModule(file, source)
    const links = module.imports.map(({ specifier, kind }) => ({
      ...resolve(file, specifier, sources),
      kind,
      specifier,
    }))
    house.set(file, { ...module, links })
  }
  return house
}

function resolve(from: string, specifier: string, sources: ReadonlyMap<string, string>) {
  const base = specifier.startsWith('@/')
    ? specifier.slice(2)
    : specifier.startsWith('.')
      ? path.posix.join(path.posix.dirname(from), specifier)
      : undefined
  if (base === undefined) return { target: specifier, isOurs: false }
  const endings = ['', '.ts', '.tsx', '.mjs', '/index.ts', '/index.tsx']
  return { target: endings.map((ending) => base + ending).find((file) => sources.has(file)) ?? base, isOurs: true }
}

function checkFile(file: string, { code, lines, links }: Module & { links: Link[] }): string[] {
  const wrong: string[] = []
  const room = roomOf(file)
  if (!room) wrong.push(`${file}: belongs to no room; put it in one, or add the room to tests/architecture/rooms.ts`)
  if (lines > longest) wrong.push(`${file}: has ${lines} lines, and a file has ${longest} at most; split it`)
  if (!/^[a-z0-9]+([.-][a-z0-9]+)*$/.test(path.posix.basename(file))) wrong.push(`${file}: is not named in kebab-case`)
  if (!settingsReaders.test(file) && /\bprocess\s*(\??\.\s*env\b|\[)|\benv\b[^=\n]*\}\s*=\s*process\b/.test(code)) {
    wrong.push(`${file}: reads process.env, and only lib/env.ts may`)
  }
  if (room?.name === 'lib/balance') {
    const impure = /\b(Math\.random|Date\.now|new Date|performance\.now|fetch(?=\()|setTimeout)\b/.exec(code)
    if (impure) wrong.push(`${file}: uses ${impure[1]}, and lib/balance has no clock, chance or network`)
  }
  if (room && pureRooms.includes(room.name)) {
    for (const { target, isOurs } of links) {
      if (!isOurs && (notPure.test(target) || isBuiltin(target)))
        wrong.push(`${file} -> ${target}: ${room.name} imports no React and no server code`)
    }
  }
  return wrong
}

function checkArrows(file: string, links: Link[]): string[] {
  const room = roomOf(file)
  if (!room || room.calls.includes('*')) return []
  return links.flatMap(({ target, isOurs, kind }) => {
    if (!isOurs) return []
    const other = roomOf(target) ?? roomOf(`${target}/`)
    // Style sheets, pictures and the like are in no room.
    if (!other || other === room || room.calls.includes(other.name)) return []
    if (other.name === 'tests') return [`${file} -> ${target}: only tests import tests`]
    if (!room.typesFrom?.includes(other.name))
      return [`${file} -> ${target}: ${room.name} may not import ${other.name}`]
    return kind === 'type' ? [] : [`${file} -> ${target}: ${room.name} may take only types from ${other.name}`]
  })
}

/** All that a "use client" file draws into the browser, step by step; a "use server" file is called, not drawn in. */
function checkClient(start: string, house: House): string[] {
  const seen = new Set([start])
  const queue: { file: string; way: string }[] = [{ file: start, way: start }]
  const wrong: string[] = []
  for (const { file, way } of queue) {
    for (const { target, isOurs, kind } of house.get(file)?.links ?? []) {
      if (kind === 'type' || seen.has(target)) continue
      seen.add(target)
      const next = house.get(target)
      if (next?.directive === 'use server') continue
      const isServerOnly = isOurs ? serverOnlyFile.test(target) : serverOnlyPackage.test(target) || isBuiltin(target)
      if (isServerOnly) wrong.push(`${way} -> ${target}: a "use client" file takes no server code with it`)
      else if (next && next.directive !== 'use client') queue.push({ file: target, way: `${way} -> ${target}` })
    }
  }
  return wrong
}

function checkCircles(house: House): string[] {
  const graph = new Map(
    [...house].map(([file, { links }]) => [
      file,
      links.filter(({ kind, target }) => kind === 'value' && house.has(target)).map(({ target }) => target),
    ]),
  )
  return findCircles(graph).map((circle) => `${circle.join(' -> ')}: these import each other in a circle`)
}
