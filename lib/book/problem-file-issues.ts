import { bookUnits, parseFlowUnit } from '@/lib/balance'
import type { Problem } from '@/lib/balance/problem'
import type { Issue } from '@/lib/errors'
import { ProblemFacts } from './problem-file-facts'
import { givenIssues } from './problem-file-givens'
import { reactionIssues, unitIssues } from './problem-file-plant'
import { ruleIssues } from './problem-file-rules'

/**
 * Everything that makes a well-formed problem unusable: unknown or doubled ids, impossible links, missing molar masses
 * and densities, unbalanced reactions, units of measure that do not fit. Empty for a problem that the solver takes.
 */
export function problemIssues(problem: Problem): Issue[] {
  const issues: Issue[] = []
  const refuse = (path: string, what: string): void => {
    issues.push({ path, what })
  }
  if (!bookUnits(problem.basis, problem.flowUnit)) {
    const known = parseFlowUnit(problem.flowUnit)
    refuse(
      'flowUnit',
      known
        ? `"${problem.flowUnit}" does not fit a ${problem.basis} basis`
        : `"${problem.flowUnit}" is no known flow unit, such as ${problem.basis === 'mass' ? 'kg/h' : 'kmol/h'}`,
    )
    return [...issues, ...doubledIds(problem)]
  }
  const facts = new ProblemFacts(problem)
  issues.push(...doubledIds(problem))
  streamIssues(facts, refuse)
  linkIssues(facts, refuse)
  unitIssues(facts, refuse)
  reactionIssues(facts, refuse)
  givenIssues(facts, refuse)
  ruleIssues(facts, refuse)
  return issues
}

function doubledIds(problem: Problem): Issue[] {
  const issues: Issue[] = []
  for (const list of ['components', 'streams', 'units', 'reactions', 'parameters', 'relations'] as const) {
    const seen = new Map<string, number>()
    problem[list]?.forEach(({ id }, index) => {
      const first = seen.get(id)
      if (first === undefined) seen.set(id, index)
      else issues.push({ path: `${list}.${index}.id`, what: `"${id}" is already the id of ${list}.${first}` })
    })
  }
  return issues
}

type Refuse = (path: string, what: string) => void

function streamIssues(facts: ProblemFacts, refuse: Refuse): void {
  facts.problem.streams.forEach(({ id, components, fractions }, index) => {
    const seen = new Set<string>()
    components?.forEach((component, k) => {
      if (!facts.components.has(component)) refuse(`streams.${index}.components.${k}`, `"${component}" is no component`)
      else if (seen.has(component)) refuse(`streams.${index}.components.${k}`, `"${component}" is listed twice`)
      seen.add(component)
    })
    if (typeof fractions !== 'object') return
    const path = `streams.${index}.fractions.difference`
    if (!facts.components.has(fractions.difference)) refuse(path, `"${fractions.difference}" is no component`)
    else if (!facts.isPresent(id, fractions.difference))
      refuse(path, `"${fractions.difference}" cannot be in stream ${id}`)
  })
}

function linkIssues(facts: ProblemFacts, refuse: Refuse): void {
  const end = { in: new Map<string, string>(), out: new Map<string, string>() }
  for (const [unit, streams] of Object.entries(facts.problem.links)) {
    if (!facts.units.has(unit)) refuse(`links.${unit}`, `"${unit}" is no unit`)
    for (const [stream, direction] of Object.entries(streams)) {
      const path = `links.${unit}.${stream}`
      if (!facts.streams.has(stream)) refuse(path, `"${stream}" is no stream`)
      const other = end[direction].get(stream)
      if (other !== undefined)
        refuse(
          path,
          direction === 'in'
            ? `stream ${stream} already goes into ${other}; a stream has one sink`
            : `stream ${stream} already comes out of ${other}; a stream has one source`,
        )
      else end[direction].set(stream, unit)
    }
  }
}
