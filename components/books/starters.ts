import type { StarterId } from './types'

/** The invented plants that a book can start from, each with the sentence that helps to choose. */
export const starters: readonly { id: StarterId; name: string; text: string }[] = [
  {
    id: 'salt',
    name: 'Salt crystallisation',
    text: 'Brine evaporated and crystallised, mother liquor returned and bitterns purged; the usual recycle with a purge.',
  },
  {
    id: 'citrus',
    name: 'Citrus peel',
    text: 'Peel pressed and dried, press liquor evaporated to molasses that is added back; two recycles and a decanter.',
  },
  {
    id: 'black-mass',
    name: 'Battery black mass',
    text: 'A reductive leach with two reactions, filtration and cake wash, the wash filtrate returned to the repulp tank.',
  },
  {
    id: 'biogas',
    name: 'Biogas upgrading',
    text: 'Moles instead of mass: sulfur guard, drier and two membrane stages with a permeate recycle and an off-gas.',
  },
  {
    id: 'whey',
    name: 'Whey protein filtration',
    text: 'More readings than needed, one of them bad, and a tank whose level changes: what at odds looks like.',
  },
]
