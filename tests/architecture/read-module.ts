import { parseSync } from 'oxc-parser'

/** How a file needs another: at load, later (`import()`, a worker), or as types alone. */
export type ImportKind = 'value' | 'later' | 'type'
export type Import = { specifier: string; kind: ImportKind }

/** What the rules ask about a file. */
export type Module = {
  imports: Import[]
  directive: 'use client' | 'use server' | undefined
  /** The source with comments and nothing else blanked out: what it does, not what it says. */
  code: string
  lines: number
}

/** Reads one source file (TypeScript or JavaScript). Throws where it cannot be parsed. */
export function readModule(file: string, source: string): Module {
  const parsed = parseSync(file, source)
  const [error] = parsed.errors
  if (error) throw new Error(`${file} cannot be parsed: ${error.message}`)
  const imports = new Map<string, Set<ImportKind>>()
  const note = (specifier: string, kind: ImportKind) => {
    const kinds = imports.get(specifier) ?? new Set()
    imports.set(specifier, kinds.add(kind))
  }
  for (const { moduleRequest, entries, start } of parsed.module.staticImports) {
    // `import type {} from` has no entries, as `import 'x'` has none: the text tells.
    const isType =
      entries.length > 0 ? entries.every((entry) => entry.isType) : /^import\s+type\b/.test(source.slice(start))
    note(moduleRequest.value, isType ? 'type' : 'value')
  }
  for (const { entries } of parsed.module.staticExports) {
    for (const { moduleRequest, isType } of entries)
      if (moduleRequest) note(moduleRequest.value, isType ? 'type' : 'value')
  }
  const code = blankOut(source, parsed.comments)
  for (const { moduleRequest } of parsed.module.dynamicImports) {
    const literal = /^(['"`])(.*)\1$/s.exec(source.slice(moduleRequest.start, moduleRequest.end))
    if (literal?.[2] !== undefined) note(literal[2], 'later')
  }
  for (const worker of code.matchAll(/new URL\(\s*(['"])([^'"]+)\1\s*,\s*import\.meta\.url\s*\)/g)) {
    if (worker[2] !== undefined) note(worker[2], 'later')
  }
  // A type written as import('…').Name is no import statement.
  for (const inline of code.matchAll(/(?<![\w.])import\(\s*(['"])([^'"]+)\1\s*\)/g)) {
    if (inline[2] !== undefined && !imports.has(inline[2])) note(inline[2], 'type')
  }
  const first = parsed.program.body[0]
  const directive = first && 'directive' in first ? first.directive : undefined
  return {
    imports: [...imports].flatMap(([specifier, kinds]) => [...kinds].map((kind) => ({ specifier, kind }))),
    directive: directive === 'use client' || directive === 'use server' ? directive : undefined,
    code,
    lines: source.split('\n').length - (source.endsWith('\n') ? 1 : 0),
  }
}

function blankOut(source: string, spans: { start: number; end: number }[]): string {
  let code = source
  for (const { start, end } of spans) {
    code = code.slice(0, start) + source.slice(start, end).replace(/[^\n]/g, ' ') + code.slice(end)
  }
  return code
}
