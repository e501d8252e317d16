import type { z } from 'zod'
import type { Problem } from '@/lib/balance/problem'
import type { Issue } from '@/lib/errors'
import { problemIssues } from './problem-file-issues'
import { problemSchema } from './problem-file-schema'

export { problemIssues } from './problem-file-issues'
export { problemJsonSchema } from './problem-file-schema'

export type ParsedProblem = { ok: true; problem: Problem } | { ok: false; problems: Issue[] }

/**
 * Reads a problem file that has been through JSON.parse: its shape first, then everything that the solver relies on.
 * All faults are listed, each with its place ("givens.3.unit") and one plain sentence. Values keep the units typed.
 */
export function parseProblem(json: unknown): ParsedProblem {
  const read = problemSchema.safeParse(json)
  if (!read.success) return { ok: false, problems: read.error.issues.flatMap((issue) => wordIssue(issue)) }
  const problem = read.data as Problem
  const problems = problemIssues(problem)
  return problems.length > 0 ? { ok: false, problems } : { ok: true, problem }
}

const joined = (path: readonly PropertyKey[]): string => path.map(String).join('.') || 'file'

/** One or more plain lines for what zod found. */
function wordIssue(issue: z.core.$ZodIssue): Issue[] {
  const path = joined(issue.path)
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({
        path: joined([...issue.path, key]),
        what: `"${key}" is not a known key here`,
      }))
    case 'invalid_type':
      if (issue.input === undefined && 'message' in issue && issue.message.includes('undefined'))
        return [{ path, what: 'is missing' }]
      return [{ path, what: `must be ${wordType(issue.expected)}` }]
    case 'invalid_value':
      return [{ path, what: `must be ${issue.values.map((value) => JSON.stringify(value)).join(' or ')}` }]
    case 'invalid_union':
      return 'discriminator' in issue && issue.discriminator
        ? [
            {
              path: joined([...issue.path, String(issue.discriminator)].filter((p, k, all) => p !== all[k - 1])),
              what: 'is not a known kind of rule',
            },
          ]
        : wordUnion(path)
    case 'too_small':
      if (issue.origin === 'string') return [{ path, what: 'must not be empty' }]
      if (issue.origin === 'array') return [{ path, what: `must hold at least ${issue.minimum} entries` }]
      return [{ path, what: 'must be above 0' }]
    case 'too_big':
      return [
        { path, what: issue.origin === 'string' ? `must have at most ${issue.maximum} characters` : 'is too large' },
      ]
    default:
      return [{ path, what: issue.message }]
  }
}

function wordUnion(path: string): Issue[] {
  if (path.endsWith('fractions')) return [{ path, what: 'must be "asTyped", "scale" or { "difference": component }' }]
  return [{ path, what: 'must be a finite number or { "parameter": id }' }]
}

function wordType(expected: string): string {
  if (expected === 'number') return 'a finite number'
  if (expected === 'string') return 'a text'
  if (expected === 'array') return 'a list'
  return expected === 'object' || expected === 'record' ? 'an object' : expected
}
