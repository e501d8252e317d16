/**
 * Rank of a small dense matrix whose rows the caller has scaled, by elimination with full pivoting: entries at most
 * `tolerance` count as 0. The rows given are left as they are. Never fails; no rows have rank 0.
 */
export function smallRank(rows: readonly (readonly number[])[], tolerance: number): number {
  const left = rows.map((row) => [...row])
  let rank = 0
  for (;;) {
    let best: [number, number] | undefined
    let size = tolerance
    left.forEach((row, i) => {
      row.forEach((value, j) => {
        if (Math.abs(value) > size) {
          size = Math.abs(value)
          best = [i, j]
        }
      })
    })
    if (!best) return rank
    rank++
    const [i, j] = best
    const [pivot] = left.splice(i, 1) as [number[]]
    for (const row of left) {
      const factor = (row[j] as number) / (pivot[j] as number)
      for (let k = 0; k < row.length; k++) row[k]! -= factor * (pivot[k] as number)
      row[j] = 0
    }
  }
}
