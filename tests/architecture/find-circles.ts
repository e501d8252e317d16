/** The circles of a directed graph, each as the nodes of one strongly connected part (Tarjan 1972), sorted. */
export function findCircles(graph: ReadonlyMap<string, readonly string[]>): string[][] {
  const index = new Map<string, number>()
  const low = new Map<string, number>()
  const stack: string[] = []
  const onStack = new Set<string>()
  const circles: string[][] = []

  const visit = (node: string) => {
    index.set(node, index.size)
    low.set(node, index.get(node) ?? 0)
    stack.push(node)
    onStack.add(node)
    for (const next of graph.get(node) ?? []) {
      if (!index.has(next)) visit(next)
      if (onStack.has(next)) low.set(node, Math.min(low.get(node) ?? 0, low.get(next) ?? 0))
    }
    if (low.get(node) !== index.get(node)) return
    const part: string[] = []
    for (let top = stack.pop(); top !== undefined; top = stack.pop()) {
      onStack.delete(top)
      part.push(top)
      if (top === node) break
    }
    if (part.length > 1 || graph.get(node)?.includes(node)) circles.push(part.sort())
  }

  for (const node of graph.keys()) if (!index.has(node)) visit(node)
  return circles
}
