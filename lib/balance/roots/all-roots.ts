/** A real function given by its sign and the logarithm of its size, so that it neither overflows nor vanishes. */
export type Signed = { sign: number; log: number }

/** `touches`: the function comes to 0 without, or hardly, changing its sign. */
export type RootFound = { at: number; touches: boolean }

/** Panels grow finer towards both ends, where branches without flow pull the function to 0 many times over. */
const NEAR = [1, 3.1, 9.7, 31, 97, 313, 971, 3109, 9719, 31_013, 97_171, 300_319].map((millionths) => millionths * 1e-6)
const EDGES = [...NEAR, 0.500_713, ...NEAR.map((near) => 1 - near).reverse()]
const DEGREE = 14
const GRID = 140
/** The polynomial stands for the function where it agrees to this part of the largest value on the panel. */
const RESOLVED = 1e-8
/** Panels reach this part of themselves into the next, so that no root is lost at the join. */
const OVERLAP = 0.01
/** A smallest value below this part of the panel's largest may be a root that only touches. */
const TOUCHES = 1e-6
const NARROWEST = 1e-10

/**
 * All roots in (0, 1) of a function that is smooth but for poles, ascending: each panel is halved until a Chebyshev
 * polynomial stands for the function there, whose roots and smallest values are found on a fine grid and then sharpened
 * on the function itself. undefined where `budget` evaluations do not settle it. Roots within 1e-6 of an end are left out.
 */
export function allRoots(f: (z: number) => Signed, budget: number): RootFound[] | undefined {
  const roots: RootFound[] = []
  const panels: [number, number][] = []
  for (let k = EDGES.length - 1; k > 0; k--) panels.push([EDGES[k - 1] as number, EDGES[k] as number])
  let left = budget
  for (let panel = panels.pop(); panel; panel = panels.pop()) {
    const [from, to] = panel
    const reach = OVERLAP * (to - from)
    const [a, b] = [Math.max(from - reach, from / 2), Math.min(to + reach, (1 + to) / 2)]
    left -= DEGREE + 3
    if (left < 0) return undefined
    const proxy = standInFor(f, a, b)
    if (proxy) {
      roots.push(...within(f, proxy, a, b))
      continue
    }
    const middle = (from + to) / 2
    if (to - from > NARROWEST * Math.max(from, 1 - to)) panels.push([middle, to], [from, middle])
    // Too narrow to halve: a pole, or a root lost in rounding. It is looked at as a root, and refused if it is none.
    else roots.push({ at: middle, touches: true })
  }
  return joined(roots)
}

type Proxy = { coefficients: Float64Array; log: number }

const sizeOf = ({ sign, log }: Signed, scale: number): number => (sign === 0 ? 0 : sign * Math.exp(log - scale))
const place = (u: number, a: number, b: number): number => (a + b) / 2 + ((b - a) / 2) * u

/** Chebyshev polynomial through the extreme points of the panel; undefined where it does not stand for the function. */
function standInFor(f: (z: number) => Signed, a: number, b: number): Proxy | undefined {
  const points = Array.from({ length: DEGREE + 1 }, (_, k) => f(place(Math.cos((Math.PI * k) / DEGREE), a, b)))
  const log = points.reduce((most, { sign, log: its }) => (sign === 0 ? most : Math.max(most, its)), -Infinity)
  if (log === -Infinity) return { coefficients: new Float64Array(1), log: 0 }
  const values = points.map((point) => sizeOf(point, log))
  const coefficients = Float64Array.from({ length: DEGREE + 1 }, (_, j) => {
    let sum = 0
    for (let k = 0; k <= DEGREE; k++) {
      const ends = k === 0 || k === DEGREE ? 0.5 : 1
      sum += ends * (values[k] as number) * Math.cos((Math.PI * j * k) / DEGREE)
    }
    return ((j === 0 || j === DEGREE ? 1 : 2) * sum) / DEGREE
  })
  const proxy = { coefficients, log }
  for (const u of [-0.917, 0.143, 0.771]) {
    const gap = evaluateAt(proxy, u) - sizeOf(f(place(u, a, b)), log)
    if (!(Math.abs(gap) <= RESOLVED)) return undefined
  }
  return proxy
}

/** Clenshaw's sum. */
function evaluateAt({ coefficients }: Proxy, u: number): number {
  let b1 = 0
  let b2 = 0
  for (let j = coefficients.length - 1; j > 0; j--) {
    const b0 = 2 * u * b1 - b2 + (coefficients[j] as number)
    b2 = b1
    b1 = b0
  }
  return u * b1 - b2 + (coefficients[0] as number)
}

function within(f: (z: number) => Signed, proxy: Proxy, a: number, b: number): RootFound[] {
  const found: RootFound[] = []
  const at = (u: number): number => evaluateAt(proxy, u)
  const us = Array.from({ length: GRID + 1 }, (_, k) => -1 + (2 * k) / GRID)
  const values = us.map(at)
  const bracket = (low: number, high: number): void => {
    found.push({ at: sharpen(f, place(low, a, b), place(high, a, b)), touches: false })
  }
  for (let k = 0; k < GRID; k++) {
    const [here, next] = [values[k] as number, values[k + 1] as number]
    if (here === 0) found.push({ at: place(us[k] as number, a, b), touches: true })
    else if (here * next < 0) bracket(us[k] as number, us[k + 1] as number)
    const before = values[k - 1]
    if (before === undefined || here * next <= 0 || here * before <= 0) continue
    if (Math.abs(here) > Math.abs(next) || Math.abs(here) > Math.abs(before)) continue
    // A smallest value between grid points: two roots close to each other, one that touches, or none.
    const sign = Math.sign(here)
    const least = lowest((u) => sign * at(u), us[k - 1] as number, us[k + 1] as number)
    const value = sign * at(least)
    if (value < -TOUCHES * RESOLVED) {
      bracket(us[k - 1] as number, least)
      bracket(least, us[k + 1] as number)
    }
    if (value <= TOUCHES) found.push({ at: place(least, a, b), touches: true })
  }
  return found
}

const GOLDEN = (Math.sqrt(5) - 1) / 2

function lowest(g: (u: number) => number, low: number, high: number): number {
  let [a, b] = [low, high]
  for (let step = 0; step < 60; step++) {
    const left = b - GOLDEN * (b - a)
    const right = a + GOLDEN * (b - a)
    if (g(left) < g(right)) b = right
    else a = left
  }
  return (a + b) / 2
}

/** Bisection on the function itself where its signs differ, else the middle as it stands. */
function sharpen(f: (z: number) => Signed, low: number, high: number): number {
  let [a, b] = [low, high]
  const left = f(a).sign
  if (left === 0 || left === f(b).sign) return left === 0 ? a : (a + b) / 2
  for (let step = 0; step < 70 && b - a > 2e-16 * b; step++) {
    const middle = (a + b) / 2
    if (f(middle).sign === left) a = middle
    else b = middle
  }
  return (a + b) / 2
}

/** Ascending; a root found twice at the join of two panels is one. */
function joined(roots: RootFound[]): RootFound[] {
  const kept: RootFound[] = []
  for (const root of roots.sort((a, b) => a.at - b.at)) {
    const last = kept[kept.length - 1]
    if (last && root.at - last.at <= 1e-11 * root.at) last.touches &&= root.touches
    else kept.push({ ...root })
  }
  return kept
}
