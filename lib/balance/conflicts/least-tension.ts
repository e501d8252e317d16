/**
 * The least t for which moves d with |d[k]| <= t close all rows: sum of rows[r][k] d[k] = -gaps[r]. Found as the greatest
 * 1/t with moves of at most 1, by the simplex method with bounds (Dantzig 1955) on a dense table; start and every step
 * are feasible, so that there is no first phase. `worst` are the multipliers of the moves that hold t up: a combination
 * of rows with the fewest moves. undefined where the work would exceed `MOST_WORK`.
 */
export type LeastTension = { tension: number; moves: number[]; worst: Map<number, number> }

/** Entries of the table times steps. */
const MOST_WORK = 4e8
const NOTHING = 1e-11

export function leastTension(rows: readonly (readonly number[])[], gaps: readonly number[]): LeastTension | undefined {
  const table = new Table(rows, gaps)
  let work = 0
  for (;;) {
    const entering = table.entering()
    if (!entering || !table.step(entering.column, entering.direction)) return table.answer()
    work += rows.length * (table.nMoves + 1)
    if (work > MOST_WORK) return undefined
  }
}

class Table {
  readonly nMoves: number
  /** Rows with the column of 1/t last; basic columns are unit vectors. */
  private readonly rows: Float64Array<ArrayBuffer>[] = []
  private readonly basic: number[] = []
  private readonly place: Int32Array
  private readonly value: Float64Array
  private unbounded = false

  constructor(rows: readonly (readonly number[])[], gaps: readonly number[]) {
    this.nMoves = rows[0]?.length ?? 0
    this.place = new Int32Array(this.nMoves + 1).fill(-1)
    this.value = new Float64Array(this.nMoves + 1)
    const waiting = new Set(rows.map((row, r) => Float64Array.from([...row, gaps[r] as number])))
    // Complete pivoting picks the first basis: the moves are all 0 then, so that any basis will do.
    while (waiting.size > 0) {
      let best: Float64Array<ArrayBuffer> | undefined
      let column = -1
      let size = 0
      for (const row of waiting)
        for (let k = 0; k < this.nMoves; k++)
          if (Math.abs(row[k] as number) > size) {
            size = Math.abs(row[k] as number)
            best = row
            column = k
          }
      if (!best || size === 0) break
      waiting.delete(best)
      this.rows.push(best)
      this.basic.push(-1)
      this.pivot(this.rows.length - 1, column, waiting)
    }
  }

  /** The column that raises 1/t most, and which way; undefined at the optimum. */
  entering(): { column: number; direction: number } | undefined {
    const tau = this.nMoves
    const own = this.place[tau] as number
    if (own < 0) return this.unbounded || this.rows.length === 0 ? undefined : { column: tau, direction: 1 }
    const row = this.rows[own] as Float64Array
    let most = 0
    for (let k = 0; k < tau; k++) most = Math.max(most, Math.abs(row[k] as number))
    let best: { column: number; direction: number } | undefined
    let size = NOTHING * most
    for (let k = 0; k < tau; k++) {
      const gain = -(row[k] as number)
      if ((this.place[k] as number) >= 0 || Math.abs(gain) <= size || (this.value[k] as number) * Math.sign(gain) >= 1)
        continue
      size = Math.abs(gain)
      best = { column: k, direction: Math.sign(gain) }
    }
    return best
  }

  /** Moves a column as far as all bounds allow; false where nothing bounds it. */
  step(column: number, direction: number): boolean {
    const tau = this.nMoves
    let length = column === tau ? Number.POSITIVE_INFINITY : 1 - direction * (this.value[column] as number)
    let leaving = -1
    let pivot = 0
    this.rows.forEach((row, r) => {
      const rate = -(row[column] as number) * direction
      if (Math.abs(rate) <= NOTHING) return
      const its = this.basic[r] as number
      const at = this.value[its] as number
      const far =
        its === tau ? (rate > 0 ? Number.POSITIVE_INFINITY : at / -rate) : (1 - Math.sign(rate) * at) / Math.abs(rate)
      const room = Math.max(0, far)
      if (room > length + 1e-12 || (room > length - 1e-12 && Math.abs(rate) <= pivot)) return
      length = Math.min(length, room)
      leaving = r
      pivot = Math.abs(rate)
    })
    if (length === Number.POSITIVE_INFINITY) {
      this.unbounded = true
      return false
    }
    this.rows.forEach((row, r) => {
      this.value[this.basic[r] as number]! -= (row[column] as number) * direction * length
    })
    this.value[column]! += direction * length
    if (leaving >= 0) {
      const its = this.basic[leaving] as number
      if (its !== tau) this.value[its] = Math.sign(this.value[its] as number)
      this.pivot(leaving, column)
    }
    return true
  }

  answer(): LeastTension {
    const tau = this.nMoves
    const own = this.place[tau] as number
    if (own < 0) return { tension: 0, moves: new Array<number>(tau).fill(0), worst: new Map() }
    const row = this.rows[own] as Float64Array
    const tension = 1 / (this.value[tau] as number)
    const worst = new Map<number, number>()
    for (let k = 0; k < tau; k++) if (Math.abs(row[k] as number) > NOTHING) worst.set(k, row[k] as number)
    return { tension, moves: Array.from(this.value.subarray(0, tau), (value) => value * tension), worst }
  }

  /** Takes a column into the basis in place of that of row r; `also` are rows outside the table that go along. */
  private pivot(r: number, column: number, also: Iterable<Float64Array<ArrayBuffer>> = []): void {
    const own = this.rows[r] as Float64Array<ArrayBuffer>
    const over = 1 / (own[column] as number)
    for (let k = 0; k < own.length; k++) own[k]! *= over
    own[column] = 1
    const eliminate = (row: Float64Array<ArrayBuffer>): void => {
      const factor = row[column] as number
      if (row === own || factor === 0) return
      for (let k = 0; k < row.length; k++) row[k]! -= factor * (own[k] as number)
      row[column] = 0
    }
    this.rows.forEach(eliminate)
    for (const row of also) eliminate(row)
    const before = this.basic[r] as number
    if (before >= 0) this.place[before] = -1
    this.basic[r] = column
    this.place[column] = r
  }
}
