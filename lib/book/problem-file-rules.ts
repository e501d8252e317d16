import { leavesOf, parseFormulaText } from '@/lib/balance'
import type { Rule } from '@/lib/balance/problem'
import type { ProblemFacts, Refuse } from './problem-file-facts'

/** Rules: known ids, units and streams that fit each other, molar masses where moles are compared. */
export function ruleIssues(facts: ProblemFacts, refuse: Refuse): void {
  facts.problem.relations?.forEach((rule, index) => {
    const path = `relations.${index}`
    let sound = true
    const fault = (key: string, what: string): void => {
      sound = false
      refuse(key ? `${path}.${key}` : path, what)
    }
    checkIds(facts, rule, fault)
    if (sound) checkFit(facts, rule, fault)
  })
}

function checkIds(facts: ProblemFacts, rule: Rule, fault: Refuse): void {
  const stream = (key: string, id: string): void => {
    if (!facts.streams.has(id)) fault(key, `"${id}" is no stream`)
  }
  const component = (key: string, id: string): void => {
    if (!facts.components.has(id)) fault(key, `"${id}" is no component`)
  }
  if ('unit' in rule && !facts.units.has(rule.unit)) fault('unit', `"${rule.unit}" is no unit`)
  if ('stream' in rule) stream('stream', rule.stream)
  if ('component' in rule) component('component', rule.component)
  if ('reaction' in rule && !facts.reactions.has(rule.reaction)) fault('reaction', `"${rule.reaction}" is no reaction`)
  if ('value' in rule && typeof rule.value === 'object' && !facts.parameters.has(rule.value.parameter))
    fault('value.parameter', `"${rule.value.parameter}" is no parameter`)
  switch (rule.kind) {
    case 'flowRatio':
      stream('of', rule.of)
      break
    case 'componentRatio':
      stream('of.stream', rule.of.stream)
      component('of.component', rule.of.component)
      break
    case 'yield':
      component('product', rule.product)
      component('from', rule.from)
      break
    case 'selectivity':
      component('product', rule.product)
      component('over', rule.over)
      break
    case 'excess':
      component('limiting', rule.limiting)
      break
    case 'sameComposition':
      rule.streams.forEach((id, k) => {
        if (rule.streams.indexOf(id) !== k) fault(`streams.${k}`, `"${id}" is listed twice`)
        stream(`streams.${k}`, id)
      })
      break
    case 'formula':
      checkFormula(facts, rule.text, fault)
      break
    default:
  }
}

function checkFormula(facts: ProblemFacts, text: string, fault: Refuse): void {
  const parsed = parseFormulaText(text)
  if (!parsed.ok) {
    fault('text', parsed.what)
    return
  }
  for (const leaf of [...leavesOf(parsed.left), ...leavesOf(parsed.right)]) {
    if (leaf.kind === 'parameter') {
      if (!facts.parameters.has(leaf.id)) fault('text', `"${leaf.id}" is no parameter`)
      continue
    }
    if (!facts.streams.has(leaf.stream)) fault('text', `"${leaf.stream}" is no stream`)
    else if (leaf.name === `${facts.problem.basis === 'mass' ? 'mole' : 'mass'}Share`)
      needMasses(facts, facts.presentIn(leaf.stream), 'text', leaf.name, fault)
    if (leaf.component !== undefined && !facts.components.has(leaf.component))
      fault('text', `"${leaf.component}" is no component`)
  }
}

function checkFit(facts: ProblemFacts, rule: Rule, fault: Refuse): void {
  const mass = facts.problem.basis === 'mass'
  switch (rule.kind) {
    case 'split':
      if (facts.units.get(rule.unit)?.kind !== 'splitter') fault('unit', `unit ${rule.unit} is no splitter`)
      else if (!facts.linked(rule.unit, 'out').includes(rule.stream))
        fault('stream', `stream ${rule.stream} is no outlet of ${rule.unit}`)
      return
    case 'recovery':
      if (rule.value !== 0) needPresent(facts, rule.stream, rule.component, 'component', fault)
      return
    case 'componentRatio':
      if (rule.value !== 0) needPresent(facts, rule.stream, rule.component, 'component', fault)
      needPresent(facts, rule.of.stream, rule.of.component, 'of.component', fault)
      return
    case 'yield':
      if (mass) needMasses(facts, [rule.product, rule.from], '', 'a yield', fault)
      return
    case 'selectivity':
      if (mass) needMasses(facts, [rule.product, rule.over], '', 'a selectivity', fault)
      return
    case 'excess': {
      const stoichiometry = facts.reactions.get(rule.reaction)?.stoichiometry ?? {}
      for (const key of ['component', 'limiting'] as const)
        if (!((stoichiometry[rule[key]] ?? 0) < 0))
          fault(key, `${rule[key]} is no reactant of reaction ${rule.reaction}`)
      if (mass) needMasses(facts, [rule.component, rule.limiting], '', 'an excess', fault)
      return
    }
    default:
  }
}

function needPresent(facts: ProblemFacts, stream: string, component: string, key: string, fault: Refuse): void {
  if (!facts.isPresent(stream, component)) fault(key, `${component} cannot be in stream ${stream}`)
}

function needMasses(facts: ProblemFacts, ids: string[], key: string, what: string, fault: Refuse): void {
  const lacking = [...new Set(ids)].filter((id) => facts.molarMass(id) === undefined)
  if (lacking.length > 0)
    fault(key, `${what} on a ${facts.problem.basis} basis needs a molar mass for ${lacking.join(', ')}`)
}
