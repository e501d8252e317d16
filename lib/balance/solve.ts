import { checkOnly, uncheckedDiagnostics } from './checks/check-only'
import { redundantChecks } from './checks/redundant-checks'
import { blockedCells } from './conflicts/blocked'
import { describeConflicts } from './conflicts/describe-conflicts'
import { settle } from './conflicts/find-conflicts'
import { structureDiagnostics } from './diagnostics'
import { buildModel, ColumnKind, type Model, structureOf } from './model'
import type { MeasureName, Problem } from './problem'
import { findRoots } from './roots/find-roots'
import { columnWithRoots, flagTouching, rootValues } from './roots/root-cells'
import { rootDiagnostics } from './roots/root-diagnostics'
import { fixedRuleValue, ruleInUse } from './rows/assemble'
import { keepSettled } from './settled-of'
import type { Solution } from './solution'
import { PivotMemory } from './sparse/pivot-memory'
import { findAmplified } from './states/amplification'
import { emptyCells, fillCells } from './states/fill-cells'
import { fillWanted } from './states/fill-wanted'
import { freeScaleBlocks } from './states/free-scale'
import { pendingDiagnostics, zeroInletDiagnostics } from './states/rule-diagnostics'
import { countCells, extentResults, freedomWithin } from './states/summary'

/** Solves problems, one after another, as `solve` does. */
export type Solver = { solve(problem: Problem, wanted?: readonly MeasureName[]): Solution }

/**
 * A solver that keeps what depends only on structure (model, balance rows, order of pivots) for as long as only values
 * change, as they do while someone types. Its answers are those of `solve`: whatever is kept is tested against the
 * numbers before it is used.
 */
export function createSolver(): Solver {
  const pivots = new PivotMemory()
  let kept: { structure: string; model: Model } | undefined
  return {
    solve: (problem, wanted = []) =>
      guarded(problem, wanted, () => {
        const structure = structureOf(problem)
        const model = kept?.structure === structure ? { ...kept.model, problem } : buildModel(problem)
        if (!model) return undefined
        model.pivots = pivots
        kept = { structure, model }
        return model
      }),
  }
}

/**
 * States and values of every cell of a checked problem. Never throws for what a person typed: a failure inside gives
 * the status `gaveUp` with a diagnostic that says so. Array sizes are those of `Solution`.
 * `wanted` names measures besides the cells that are to be answered for every stream.
 */
export const solve = (problem: Problem, wanted: readonly MeasureName[] = []): Solution =>
  guarded(problem, wanted, () => buildModel(problem))

function guarded(problem: Problem, wanted: readonly MeasureName[], modelOf: () => Model | undefined): Solution {
  try {
    const model = modelOf()
    if (!model)
      return gaveUp(problem, `The flow unit ${problem.flowUnit} does not fit a book on a ${problem.basis} basis.`)
    return solveModel(model, wanted)
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    return gaveUp(
      problem,
      `The solver stopped on a fault of its own (${reason}). Nothing is shown rather than a guess.`,
    )
  }
}

function solveModel(model: Model, wanted: readonly MeasureName[]): Solution {
  const linear = settle(model)
  const roots = findRoots(model, linear)
  const settled = roots?.sure ?? linear
  const { assembly, resolved, atOdds } = settled
  const { knowledge } = resolved
  const cells = fillCells(model, knowledge, assembly.givens, atOdds, roots)
  const amplification = findAmplified(model, roots?.near ?? settled, cells)
  if (roots) amplification.push(...flagTouching(model, roots, linear.resolved.knowledge, cells))
  const counts = countCells(model, cells)
  const known = (column: number): number | undefined => columnWithRoots(knowledge, roots, column)
  const { elimination: counted } = (roots?.counted ?? settled).resolved.knowledge
  const parameterFreedom = freedomWithin(model, counted.rows, [ColumnKind.parameter])
  const extentFreedom = freedomWithin(model, counted.rows, [ColumnKind.extent, ColumnKind.parameter]) - parameterFreedom
  const several = roots && rootValues(model, roots, cells)
  const solution: Solution = {
    status: settled.sets.length > 0 ? 'atOdds' : counts.unknown > 0 ? 'open' : 'solved',
    summary: {
      ...counts,
      degreesOfFreedom: counted.free.length - parameterFreedom,
      extentFreedom,
      freeScale: freeScaleBlocks(model, linear.assembly, (s) => known(model.totalColumn[s] as number) === 0),
    },
    nStreams: model.nStreams,
    nComponents: model.nComponents,
    ...cells,
    amplification,
    blockedBy: blockedCells(model, settled, cells),
    ...(wanted.length > 0 && { wanted: fillWanted(model, settled, cells, wanted, roots) }),
    extents: extentResults(model, givenExtents(model), known),
    conflicts: describeConflicts(model, settled),
    checks: [...redundantChecks(model, linear), ...checkOnly(model, knowledge)],
    ...(settled.truncated && { conflictsTruncated: true }),
    ...(several && { roots: several }),
    diagnostics: [
      ...structureDiagnostics(model),
      ...zeroInletDiagnostics(model, knowledge),
      ...uncheckedDiagnostics(model, knowledge),
      ...pendingDiagnostics(model, assembly, roots?.left ?? []),
      ...(roots ? rootDiagnostics(model, assembly, roots, cells) : []),
    ],
  }
  return keepSettled(solution, { model, settled: linear })
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
    checks: [],
    diagnostics: [{ code: 'gaveUp', severity: 'error', text }],
  }
}
