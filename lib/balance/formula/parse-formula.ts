import { create, type FactoryFunctionMap, type MathNode, parseDependencies } from 'mathjs/number'

/** A formula's side as read: numbers, parameters and measures under the five operations. */
export type FormulaNode =
  | { kind: 'number'; value: number }
  | { kind: 'parameter'; id: string }
  | { kind: 'measure'; name: MeasureName; stream: string; component?: string }
  | { kind: 'operation'; operator: Operator; left: FormulaNode; right: FormulaNode }

export type MeasureName = 'flow' | 'part' | 'share' | 'massShare' | 'moleShare'
export type Operator = '+' | '-' | '*' | '/' | '^'
export type ParsedFormula = { ok: true; left: FormulaNode; right: FormulaNode } | { ok: false; what: string }

const measureNames = new Set<string>(['flow', 'part', 'share', 'massShare', 'moleShare'])
const operators = new Set<string>(['+', '-', '*', '/', '^'])

let parseText: ((text: string) => MathNode) | undefined
const parser = (): ((text: string) => MathNode) => {
  parseText ??= (create(parseDependencies as FactoryFunctionMap) as unknown as { parse: (text: string) => MathNode })
    .parse
  return parseText
}

class Unreadable extends Error {}

/**
 * Reads `left = right`: one top-level "=" outside quotes, each side parsed by mathjs and its nodes allow-listed, so
 * nothing typed is ever evaluated. A text that cannot be read gives one plain sentence.
 */
export function parseFormulaText(text: string): ParsedFormula {
  const sides = splitAtEquals(text)
  if (sides.length !== 2) return { ok: false, what: 'a formula needs exactly one "=" between two sides' }
  try {
    return { ok: true, left: readSide(sides[0] as string), right: readSide(sides[1] as string) }
  } catch (error) {
    return { ok: false, what: error instanceof Error ? error.message : 'the formula cannot be read' }
  }
}

function splitAtEquals(text: string): string[] {
  const sides: string[] = ['']
  let quoted = ''
  for (let at = 0; at < text.length; at++) {
    const sign = text[at] as string
    if (quoted === '' && sign === '=') {
      sides.push('')
      continue
    }
    sides[sides.length - 1] += sign
    if (quoted !== '' && sign === '\\') sides[sides.length - 1] += text[++at] ?? ''
    else if (sign === quoted) quoted = ''
    else if (quoted === '' && (sign === '"' || sign === "'")) quoted = sign
  }
  return sides
}

function readSide(text: string): FormulaNode {
  if (text.trim() === '') throw new Unreadable('one side of the formula is empty')
  let node: MathNode
  try {
    node = parser()(text)
  } catch (error) {
    throw new Unreadable(`"${text.trim()}" cannot be read (${error instanceof Error ? error.message : 'syntax'})`, {
      cause: error,
    })
  }
  return readNode(node)
}

type AnyNode = MathNode & {
  value?: unknown
  name?: string
  content?: MathNode
  op?: string
  args?: MathNode[]
  fn?: { name?: string }
}

function readNode(given: MathNode): FormulaNode {
  const node = given as AnyNode
  switch (node.type) {
    case 'ConstantNode':
      if (typeof node.value === 'number' && Number.isFinite(node.value)) return { kind: 'number', value: node.value }
      throw new Unreadable(`"${String(node.value)}" is no number`)
    case 'ParenthesisNode':
      return readNode(node.content as MathNode)
    case 'SymbolNode':
      return { kind: 'parameter', id: node.name as string }
    case 'OperatorNode':
      return readOperation(node)
    case 'FunctionNode':
      return readMeasure(node)
    default:
      throw new Unreadable(
        'a formula holds numbers, + - * / ^, brackets, parameters and flow, part, share, massShare, moleShare only',
      )
  }
}

function readOperation(node: AnyNode): FormulaNode {
  const operator = node.op as string
  const [first, second] = node.args as MathNode[]
  if (second === undefined) {
    if (operator !== '-' && operator !== '+') throw new Unreadable(`"${operator}" is not allowed in a formula`)
    const inner = readNode(first as MathNode)
    return operator === '+'
      ? inner
      : { kind: 'operation', operator: '*', left: { kind: 'number', value: -1 }, right: inner }
  }
  if (!operators.has(operator)) throw new Unreadable(`"${operator}" is not allowed in a formula`)
  return {
    kind: 'operation',
    operator: operator as Operator,
    left: readNode(first as MathNode),
    right: readNode(second),
  }
}

function readMeasure(node: AnyNode): FormulaNode {
  const name = node.fn?.name ?? ''
  if (!measureNames.has(name))
    throw new Unreadable(`"${name}" is no function of a formula; use flow, part, share, massShare or moleShare`)
  const ids = (node.args ?? []).map((argument) => {
    const { type, name: plain, value } = argument as AnyNode
    if (type === 'SymbolNode') return plain as string
    if (type === 'ConstantNode' && typeof value === 'string') return value
    throw new Unreadable(`in ${name}(…) an id that is not a plain name must be in quotes, as in flow("101")`)
  })
  const wanted = name === 'flow' ? 1 : 2
  if (ids.length !== wanted)
    throw new Unreadable(wanted === 1 ? 'flow takes one stream' : `${name} takes a stream and a component`)
  return {
    kind: 'measure',
    name: name as MeasureName,
    stream: ids[0] as string,
    ...(wanted === 2 && { component: ids[1] as string }),
  }
}

/** Every measure and parameter that a side names, for checking ids. */
export function leavesOf(node: FormulaNode): (FormulaNode & { kind: 'parameter' | 'measure' })[] {
  if (node.kind === 'operation') return [...leavesOf(node.left), ...leavesOf(node.right)]
  return node.kind === 'number' ? [] : [node]
}
