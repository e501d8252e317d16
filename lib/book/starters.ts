import type { Problem } from '@/lib/balance/problem'
import biogas from './starters/biogas.json'
import blackMass from './starters/black-mass.json'
import citrus from './starters/citrus.json'
import salt from './starters/salt.json'
import whey from './starters/whey.json'

/** Books to begin from. All plants, numbers and names in them are invented. */
export const starterNames = ['salt', 'citrus', 'black-mass', 'biogas', 'whey'] as const
export type StarterName = (typeof starterNames)[number]

/** `problem` has passed its checks: a test sees to it. */
export type Starter = { name: string; description: string; problem: Problem }

const starter = (problem: { name: string }, description: string): Starter => ({
  name: problem.name,
  description,
  problem: problem as Problem,
})

export const starters: Readonly<Record<StarterName, Starter>> = {
  salt: starter(
    salt,
    'Brine pre-concentration and salt crystallisation with liquor recycle and bitterns purge. Invented.',
  ),
  citrus: starter(
    citrus,
    'Citrus-peel press, limonene recovery and dried-peel feed, with molasses add-back. Invented.',
  ),
  'black-mass': starter(
    blackMass,
    'Reductive leach of battery black mass with wash-filtrate recycle, two reactions. Invented.',
  ),
  biogas: starter(biogas, 'Guard bed, drier and two-stage membrane with permeate recycle and off-gas purge. Invented.'),
  whey: starter(whey, 'Whey protein filtration with diafiltration, over-measured, with one bad meter. Invented.'),
}
