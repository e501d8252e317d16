import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'
import { MOVES, type Vector } from '../sparse/solve'
import { addProbe, evaluate, type Knowledge } from '../states/knowledge'
import { poolPart } from './pool'

/** A flow of a pool that cancels to less than this part of its terms is too blurred to draw relations from. */
const BLURRED = 1e-3

/** A relation must close on every sample to this part of its terms, or it would carry their blur to other streams. */
const SHARP = 1e-13

/**
 * A basis of the linear relations between a pool's component flows that hold in every solution: the annihilator of
 * samples, by elimination with complete pivoting. Samples are added until one more brings nothing new.
 */
export function relationsOf(model: Model, knowledge: Knowledge, pool: number[], components: number[]): number[][] {
  const forms = components.map((c) => poolPart(model, pool, c))
  const sample = (x: Vector, direction: boolean): number[] =>
    forms.map((form) => {
      const { value, terms } = evaluate(form, x, direction)
      if (Math.abs(value) <= MOVES * terms) return 0
      if (Math.abs(value) < BLURRED * Math.max(terms, madeOf(form, x))) blurred = true
      return value
    })
  let blurred = false
  const basis: Echelon = []
  const samples: number[][] = []
  const take = (x: Vector, direction: boolean): number[] => {
    const its = sample(x, direction)
    samples.push(its)
    return its
  }
  insert(basis, take(knowledge.particular, false))
  // The directions come after the one solution: the first that brings nothing new ends it.
  for (let q = 0; knowledge.probes.length > 0 && basis.length < components.length; q++) {
    const before = basis.length
    insert(basis, take(knowledge.probes[q] ?? addProbe(knowledge), true))
    if (basis.length === before) break
  }
  if (blurred || basis.length === 0 || basis.length === components.length) return []
  const pivots = new Set(basis.map(({ pivot }) => pivot))
  const relations: number[][] = []
  components.forEach((_, k) => {
    if (pivots.has(k)) return
    const relation = components.map(() => 0)
    relation[k] = 1
    for (const { pivot, row } of basis) relation[pivot] = -(row[k] as number)
    if (samples.every((its) => closes(relation, its))) relations.push(relation)
  })
  return relations
}

function closes(relation: readonly number[], sample: readonly number[]): boolean {
  let sum = 0
  let terms = 0
  relation.forEach((factor, k) => {
    sum += factor * (sample[k] as number)
    terms += Math.abs(factor * (sample[k] as number))
  })
  return Math.abs(sum) <= SHARP * terms
}

function madeOf(form: LinearForm, { size }: Vector): number {
  return form.columns.reduce(
    (most, j, k) => Math.max(most, Math.abs(form.coefficients[k] as number) * (size[j] as number)),
    0,
  )
}

/** Rows of a reduced row-echelon form, each with the place of its 1. */
export type Echelon = { pivot: number; row: number[] }[]

/** Takes one row into the form; false where it is nothing beside its terms, so that it follows from the others. */
export function insert(basis: Echelon, sample: readonly number[]): boolean {
  const row = [...sample]
  const terms = row.map(Math.abs)
  for (const { pivot, row: other } of basis) {
    const factor = row[pivot] as number
    other.forEach((value, k) => {
      row[k]! -= factor * value
      terms[k]! += Math.abs(factor * value)
    })
  }
  let pivot = -1
  row.forEach((value, k) => {
    if (Math.abs(value) <= 10 * MOVES * (terms[k] as number)) row[k] = 0
    else if (pivot < 0 || Math.abs(value) > Math.abs(row[pivot] as number)) pivot = k
  })
  if (pivot < 0) return false
  const head = row[pivot] as number
  const reduced = row.map((value) => value / head)
  for (const entry of basis) {
    const factor = entry.row[pivot] as number
    entry.row = entry.row.map((value, k) => {
      const off = factor * (reduced[k] as number)
      return Math.abs(value - off) <= MOVES * (Math.abs(value) + Math.abs(off)) ? 0 : value - off
    })
  }
  basis.push({ pivot, row: reduced })
  return true
}
