import { expect, it } from 'vitest'
import { parseProblem } from './problem-file'
import { starterNames, starters } from './starters'

it.each(starterNames)('the starter %s is a good problem file with a short name', (name) => {
  const starter = starters[name]
  expect(parseProblem(structuredClone(starter.problem))).toMatchObject({ ok: true })
  expect(starter.name.length).toBeLessThan(40)
  expect(starter.description).toMatch(/\. Invented\.$/)
})
