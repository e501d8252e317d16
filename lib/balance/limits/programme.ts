/** A linear programme: minimise `cost . x` with every row kept. Variables are free unless listed. */
export type LinearProgramme = {
  cost: Float64Array
  rows: { coefficients: Float64Array; relation: '>=' | '='; rhs: number }[]
  /** Variables that cannot be negative. */
  nonNegative: readonly number[]
}

export type Optimum = { status: 'optimal'; point: Float64Array } | { status: 'infeasible' | 'unbounded' | 'failed' }

/** Solves one programme. Where it cannot tell infeasible from unbounded it may say either. */
export type SolveLp = (programme: LinearProgramme) => Optimum

/** As much of HiGHS as is used: text in, a status and columns by name out. */
type Highs = {
  solve: (text: string, options: { presolve: 'off' }) => { Status: string; Columns: Record<string, object> }
}

/** A `SolveLp` by HiGHS, which the caller loads. Without its presolve, which calls some unbounded programmes infeasible. Never throws. */
export function solveLpBy(highs: Highs): SolveLp {
  return (programme) => {
    try {
      const { Status: status, Columns: columns } = highs.solve(programmeText(programme), { presolve: 'off' })
      if (status === 'Infeasible') return { status: 'infeasible' }
      if (status === 'Unbounded' || status === 'Primal infeasible or unbounded') return { status: 'unbounded' }
      if (status !== 'Optimal') return { status: 'failed' }
      // A variable that no row speaks of is not among the columns: any value will do.
      const point = Float64Array.from(programme.cost, (_, k) =>
        Number((columns[`x${k}`] as { Primal?: number } | undefined)?.Primal ?? 0),
      )
      return point.every(Number.isFinite) ? { status: 'optimal', point } : { status: 'failed' }
    } catch {
      return { status: 'failed' }
    }
  }
}

function programmeText({ cost, rows, nonNegative }: LinearProgramme): string {
  const terms = (coefficients: Float64Array): string => {
    const parts: string[] = []
    coefficients.forEach((value, k) => {
      if (value !== 0) parts.push(`${value < 0 ? '-' : '+'} ${Math.abs(value)} x${k}`)
    })
    return parts.join('\n ')
  }
  const bounded = new Set(nonNegative)
  const free = [...cost.keys()].filter((k) => !bounded.has(k)).map((k) => ` x${k} free`)
  return [
    'Minimize',
    ` obj: ${terms(cost) || '0 x0'}`,
    'Subject To',
    ...rows.map(({ coefficients, relation, rhs }, i) => ` r${i}: ${terms(coefficients)} ${relation} ${rhs}`),
    'Bounds',
    ...free,
    'End',
  ].join('\n')
}
