import type { RecordOf } from '@/lib/book/kinds'
import type { RulePart } from '@/lib/book/rule-to-problem'
import type { BookView } from '../book-view'

type RuleKind = RecordOf<'rule'>['ruleKind']

export const ruleTitles: Record<RuleKind, string> = {
  split: 'Split',
  recovery: 'Recovery',
  conversion: 'Conversion',
  flowRatio: 'Ratio of flows',
  componentRatio: 'Ratio of component flows',
  extent: 'Extent of a reaction',
  yield: 'Yield',
  selectivity: 'Selectivity',
  excess: 'Excess of a reactant',
  sameComposition: 'Same composition',
  formula: 'Formula',
}

/** What each kind says, in a sentence. */
export const ruleSays: Record<RuleKind, string> = {
  split: 'This part of all that enters the splitter, of every component, goes to the outlet.',
  recovery: 'This part of the component that enters the unit leaves in the outlet.',
  conversion: 'This part of the component that enters the unit is consumed there.',
  flowRatio: 'The flow of the first stream is so many times the flow of the second.',
  componentRatio: 'The first component flow is so many times the second.',
  extent: 'The reaction runs to this extent, in the mole unit of the book.',
  yield: 'So many moles of product are formed for each mole fed.',
  selectivity: 'So many moles of the first product are formed for each mole of the second.',
  excess: 'The component enters in this excess over what the limiting one needs.',
  sameComposition: 'These streams have one composition.',
  formula: 'Any relation, for example flow("101") = 2 * flow("102") or part("108", "NaCl") = 0.1 * flow("108").',
}

export const partTitles: Partial<Record<RulePart, string>> = {
  unitId: 'Unit',
  streamId: 'Stream',
  componentId: 'Component',
  otherStreamId: 'Of stream',
  otherComponentId: 'Of component',
  reactionId: 'Reaction',
  value: 'Value',
}

/** What may be chosen for a part of a rule, narrowed by what is already chosen. */
export function choicesFor(view: BookView, rule: RecordOf<'rule'>, part: RulePart) {
  const { state } = view
  switch (part) {
    case 'unitId':
      return rule.ruleKind === 'split' ? view.plant.filter(({ unitKind }) => unitKind === 'splitter') : view.plant
    case 'streamId': {
      if (rule.unitId === null) return view.streams
      const outlets = view.streams.filter(({ id }) => state.link.get(`${id}/out`)?.unitId === rule.unitId)
      return outlets.length > 0 ? outlets : view.streams
    }
    case 'otherStreamId':
      return view.streams
    case 'componentId':
    case 'otherComponentId':
      return view.components
    case 'reactionId':
      return [...state.reaction.values()].sort((a, b) => a.position - b.position)
    default:
      return []
  }
}
