import { blockedCells } from './conflicts/blocked'
import { describeConflicts } from './conflicts/describe-conflicts'
import { settle } from './conflicts/find-conflicts'
import { structureDiagnostics } from './diagnostics'
import { columnForm } from './measure/measure'
import { buildModel, ColumnKind, type Model } from './model'
import type { Problem } from './problem'
import { fixedRuleValue, ruleInUse } from './rows/assemble'
import type { Solution } from './solution'
import { findAmplified } from './states/amplification'
import { emptyCells, fillCells } from './states/fill-cells'
import { freeScaleBlocks } from './states/free-scale'
import { fixedValue } from './states/knowledge'
import { takenByPending } from './states/open-freedom'
import { pendingDiagnostics, zeroInletDiagnostics } from './states/rule-diagnostics'
import { countCells, extentResults, freedomWithin } from './states/summary'

/**
 * States and values of every cell of a checked problem. Never throws for what a person typed: a failure inside gives
 * the status `gaveUp` with a diagnostic that says so. Array sizes are those of `Solution`.
 */
export function solve(problem: Problem): Solution {
  try {
    const model = buildModel(problem)
    if (!model)
      return gaveUp(problem, `The flow unit ${problem.flowUnit} does not fit a book on a ${problem.basis} basis.`)
    return solveModel(model)
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    return gaveUp(
      problem,
      `The solver stopped on a fault of its own (${reason}). Nothing is shown rather than a guess.`,
    )
  }
}

function solveModel(model: Model): Solution {
  const settled = settle(model)
  const { assembly, resolved, atOdds } = settled
  const { knowledge } = resolved
  const cells = fillCells(model, knowledge, assembly.givens, atOdds)
  const amplification = findAmplified(model, settled, cells)
  const counts = countCells(model, cells)
  const known = (column: number): number | undefined => fixedValue(knowledge, columnForm(column))
  const parameterFreedom = freedomWithin(model, knowledge.elimination.rows, [ColumnKind.parameter])
  const extentFreedom =
    freedomWithin(model, knowledge.elimination.rows, [ColumnKind.extent, ColumnKind.parameter]) - parameterFreedom
  return {
    status: settled.sets.length > 0 ? 'atOdds' : counts.unknown > 0 ? 'open' : 'solved',
    summary: {
      ...counts,
      degreesOfFreedom:
        knowledge.elimination.free.length - parameterFreedom - takenByPending(model, knowledge, resolved.left),
      extentFreedom,
      freeScale: freeScaleBlocks(model, assembly, (s) => known(model.totalColumn[s] as number) === 0),
    },
    nStreams: model.nStreams,
    nComponents: model.nComponents,
    ...cells,
    amplification,
    blockedBy: blockedCells(model, settled, cells),
    extents: extentResults(model, givenExtents(model), known),
    conflicts: describeConflicts(model, settled),
    ...(settled.truncated && { conflictsTruncated: true }),
    diagnostics: [
      ...structureDiagnostics(model),
      ...zeroInletDiagnostics(model, knowledge),
      ...pendingDiagnostics(model, assembly, resolved.left),
    ],
  }
}

/** Reactions whose extent a rule in use holds at a typed value. */
function givenExtents(model: Model): Map<number, number> {
  const given = new Map<number, number>()
  for (const rule of model.problem.relations ?? []) {
    if (rule.kind !== 'extent' || !ruleInUse(rule)) continue
    const value = fixedRuleValue(model, rule.value)
    if (value !== undefined) given.set(model.reactionIndex.get(rule.reaction) as number, value)
  }
  return given
}

function gaveUp(problem: Problem, text: string): Solution {
  const empty = emptyCells({ nStreams: problem.streams.length, nComponents: problem.components.length } as Model)
  return {
    status: 'gaveUp',
    summary: { given: 0, solvable: 0, unknown: 0, atOdds: 0, degreesOfFreedom: 0, extentFreedom: 0, freeScale: [] },
    nStreams: problem.streams.length,
    nComponents: problem.components.length,
    ...empty,
    amplification: [],
    blockedBy: [],
    extents: (problem.reactions ?? []).map(({ id }) => ({ reaction: id, state: 'unknown' })),
    conflicts: [],
    diagnostics: [{ code: 'gaveUp', severity: 'error', text }],
  }
}
