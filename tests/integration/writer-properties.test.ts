import fc from 'fast-check'
import { expect, it } from 'vitest'
import { apply, type Change, invert } from '@/lib/book/change'
import { check } from '@/lib/book/check'
import { givenId, newId } from '@/lib/book/ids'
import type { BookRecord, FieldValue, Kind } from '@/lib/book/kinds'
import { type BookState, recordsOf, stateOf } from '@/lib/book/state'
import { listChanges } from '@/lib/data/book/list-changes'
import {
  absence,
  change,
  component,
  flow,
  link,
  rowsOf,
  snapshot,
  sorted,
  stream,
  unit,
  update,
  write,
} from './records'
import { makeBook, makeTeam, value } from './world'

/** A random edit as a few numbers: what to do, to which record, with what. Read against the state it meets. */
type Step = { what: number; pick: number; other: number; text: string; number: number }
const step: fc.Arbitrary<Step> = fc.record({
  what: fc.nat(9),
  pick: fc.nat(1000),
  other: fc.nat(1000),
  text: fc.string({ unit: 'grapheme', maxLength: 12 }),
  number: fc.double({ noNaN: true, noDefaultInfinity: true }).map((n) => (n === 0 ? 0 : n)),
})

const nth = <K extends Kind>(state: BookState, kind: K, n: number) => {
  const all = [...state[kind].values()]
  return all.length > 0 ? all[n % all.length] : undefined
}

/** Some are refused, by design: the mirror refuses them too. */
function edit(state: BookState, { what, pick, other, text, number }: Step): Partial<Change> {
  const s = nth(state, 'stream', pick)
  const c = nth(state, 'component', other)
  const u = nth(state, 'unit', other)
  const everyCase = nth(state, 'case', 0)
  const tag = `${text}-${pick % 7}`
  if (what === 0) return { create: [stream(tag)] }
  if (what === 1) return { create: [component(tag)] }
  if (what === 2) return { create: [unit(tag)] }
  if (what === 3 && s && c) return { create: [absence(s.id, c.id)] }
  if (what === 4 && s && u) return { create: [link(s.id, pick % 2 === 0 ? 'in' : 'out', u.id)] }
  if (what === 5 && s && everyCase) {
    const place = givenId(everyCase.id, s.id, 'flow', null)
    const there = state.given.get(place)
    if (!there) return { create: [{ ...flow(everyCase.id, s.id, number), text }] }
    const fields: Record<string, [FieldValue, FieldValue]> = { value: [there.value, number], text: [there.text, text] }
    return { update: [update('given', place, fields)] }
  }
  if (what === 6 && s) return { update: [update('stream', s.id, { tag: [s.tag, tag], note: [s.note, text] })] }
  if (what === 7 && s && c) {
    const fields: Record<string, [FieldValue, FieldValue]> = {
      fractions: [s.fractions, s.fractions === 'difference' ? 'scale' : 'difference'],
      differenceComponentId: [s.differenceComponentId, s.fractions === 'difference' ? null : c.id],
    }
    return { update: [update('stream', s.id, fields)] }
  }
  if (what === 8 && s) {
    const hangs = recordsOf(state).filter((r: BookRecord) => 'streamId' in r && r.streamId === s.id)
    return { remove: pick % 5 === 0 ? [s] : [...hangs, s] } // now and then it forgets what hangs on it
  }
  return {}
}

it('rows, memory and history of a book are what apply makes of its changes', async () => {
  const at = await makeTeam()
  const { engineer } = at.people
  await fc.assert(
    fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 25 }), async (steps) => {
      const book = await makeBook(at)
      let mirror = stateOf((await snapshot(engineer, book)).records)
      const first = mirror
      const taken: Change[] = []
      for (const one of steps) {
        const made = change(edit(mirror, one))
        const [result] = await write(engineer, book, made)
        const applied = apply(mirror, made)
        const stands = applied.ok && check(applied.state, made).length === 0
        expect(result?.ok).toBe(stands)
        if (!applied.ok || !stands) continue
        mirror = applied.state
        taken.push(made)
      }
      const expected = sorted(recordsOf(mirror))
      expect(await rowsOf(book)).toEqual(expected)
      expect(sorted((await snapshot(engineer, book)).records)).toEqual(expected)

      let replayed = first
      for (const { change: listed } of value(await listChanges(engineer, { book, after: 1 })).changes) {
        const again = apply(replayed, listed)
        if (!again.ok) throw new Error('A stored change does not apply')
        replayed = again.state
      }
      expect(sorted(recordsOf(replayed))).toEqual(expected)

      for (const made of taken.reverse())
        expect(await write(engineer, book, invert(made, newId()))).toMatchObject([{ ok: true }])
      expect(await rowsOf(book)).toEqual(sorted(recordsOf(first)))
    }),
    { numRuns: 25 },
  )
}, 120_000)
