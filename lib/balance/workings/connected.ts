/** Above this many units only sizes up to `SMALL` and the whole are looked at. */
export const EVERY_UP_TO = 10
export const SMALL = 4
/** A hub with very many neighbours would make sets without end. */
const MOST_SETS = 20_000

/** For each unit those that share a stream with it, ascending. */
export function neighbours(streamsOf: readonly (readonly number[])[]): number[][] {
  const at = new Map<number, number[]>()
  streamsOf.forEach((streams, u) => {
    for (const s of streams) at.set(s, [...(at.get(s) ?? []), u])
  })
  return streamsOf.map((streams, u) =>
    [...new Set(streams.flatMap((s) => at.get(s) as number[]))].filter((v) => v !== u).sort((a, b) => a - b),
  )
}

/** Every connected set of `size` units out of those allowed, each ascending, in order of their units. */
export function connectedSets(
  next: readonly (readonly number[])[],
  allowed: readonly boolean[],
  size: number,
): number[][] {
  const sets: number[][] = []
  // Each set is grown once, from its smallest unit, by units that are neighbours of it and of none tried before.
  const grow = (set: number[], candidates: number[], seen: Set<number>, root: number): void => {
    if (set.length === size) {
      sets.push([...set].sort((a, b) => a - b))
      return
    }
    const left = [...candidates]
    while (left.length > 0 && sets.length < MOST_SETS) {
      const u = left.shift() as number
      const added = (next[u] as readonly number[]).filter((v) => v > root && allowed[v] && !seen.has(v))
      const wider = new Set(seen)
      for (const v of added) wider.add(v)
      grow([...set, u], [...left, ...added], wider, root)
    }
  }
  for (let u = 0; u < next.length && sets.length < MOST_SETS; u++) {
    if (!allowed[u]) continue
    const first = (next[u] as readonly number[]).filter((v) => v > u && allowed[v])
    grow([u], first, new Set([u, ...first]), u)
  }
  return sets.sort((a, b) => {
    for (let k = 0; k < size; k++) if (a[k] !== b[k]) return (a[k] as number) - (b[k] as number)
    return 0
  })
}
