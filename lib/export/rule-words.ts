import type { Rule, Value } from '@/lib/balance/problem'

/** A rule as a plain sentence, with the tags of what it names. */
export function ruleInWords(rule: Rule): string {
  const sentence = bodyInWords(rule)
  const width = rule.halfWidth === undefined ? '' : ` (to within ${rule.halfWidth})`
  const use = rule.use === 'check' ? ' Kept as a check only.' : rule.use === 'withdrawn' ? ' Withdrawn: not used.' : ''
  const note = rule.note ? ` Note: ${rule.note}` : ''
  return `${sentence}${width}.${use}${note}`
}

const told = (value: Value): string => (typeof value === 'number' ? String(value) : `the parameter ${value.parameter}`)

function bodyInWords(rule: Rule): string {
  switch (rule.kind) {
    case 'split':
      return `Of what enters ${rule.unit}, the fraction ${told(rule.value)} of every component leaves in stream ${rule.stream}`
    case 'recovery':
      return `Of the ${rule.component} that enters ${rule.unit}, the fraction ${told(rule.value)} leaves in stream ${rule.stream}`
    case 'conversion':
      return `Of the ${rule.component} that enters ${rule.unit}, the fraction ${told(rule.value)} reacts`
    case 'flowRatio':
      return `The total flow of stream ${rule.stream} is ${told(rule.value)} times that of stream ${rule.of}`
    case 'componentRatio':
      return `The flow of ${rule.component} in stream ${rule.stream} is ${told(rule.value)} times that of ${rule.of.component} in stream ${rule.of.stream}`
    case 'extent':
      return `The extent of reaction ${rule.reaction} is ${told(rule.value)}`
    case 'yield':
      return `${rule.unit} forms ${told(rule.value)} mol of ${rule.product} for each mol of ${rule.from} fed`
    case 'selectivity':
      return `${rule.unit} forms ${told(rule.value)} mol of ${rule.product} for each mol of ${rule.over} formed`
    case 'excess':
      return `${rule.unit} is fed with ${rule.component} in an excess of ${told(rule.value)} over what reaction ${rule.reaction} needs for all its ${rule.limiting} (0.2 is 20 %)`
    case 'sameComposition':
      return `Streams ${rule.streams.join(', ')} have the same composition`
    case 'formula':
      return rule.text
  }
}
