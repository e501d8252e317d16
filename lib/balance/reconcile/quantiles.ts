/**
 * Quantiles of the chi-square and normal distributions.
 * Source of the functions: NIST Digital Library of Mathematical Functions, chapter 8 (8.7.1 series, 8.9.2 continued
 * fraction of the incomplete gamma function) and 5.11 (ln Γ).
 */

const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
]

/** ln Γ(x) for x > 0 (Lanczos, SIAM J. Numer. Anal. B 1, 1964). */
function logGamma(x: number): number {
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x)
  const z = x - 1
  const sum = LANCZOS.slice(1).reduce((total, factor, k) => total + factor / (z + k + 1), LANCZOS[0] as number)
  const t = z + 7.5
  return 0.5 * Math.log(2 * Math.PI) + (z + 0.5) * Math.log(t) - t + Math.log(sum)
}

/** Lower and upper regularised incomplete gamma functions, each to full relative precision where it is the smaller. */
function gammaParts(a: number, x: number): { lower: number; upper: number } {
  if (x <= 0) return { lower: 0, upper: 1 }
  const front = Math.exp(a * Math.log(x) - x - logGamma(a))
  if (x < a + 1) {
    let term = 1 / a
    let sum = term
    for (let k = 1; k < 10_000 && Math.abs(term) > 1e-17 * Math.abs(sum); k++) {
      term *= x / (a + k)
      sum += term
    }
    return { lower: front * sum, upper: 1 - front * sum }
  }
  // Lentz's way through the continued fraction.
  let b = x + 1 - a
  let c = 1e300
  let d = 1 / b
  let h = d
  for (let k = 1; k < 10_000; k++) {
    const factor = -k * (k - a)
    b += 2
    d = 1 / (factor * d + b)
    c = b + factor / c
    h *= d * c
    if (Math.abs(d * c - 1) < 1e-16) break
  }
  return { lower: 1 - front * h, upper: front * h }
}

/** Value that chi-square with `freedom` (> 0) degrees of freedom exceeds with probability `above` (0 to 1, both out). */
export function chiSquareAbove(above: number, freedom: number): number {
  const a = freedom / 2
  const excess = (x: number): number => gammaParts(a, x / 2).upper - above
  let low = 0
  let high = Math.max(1, freedom)
  while (excess(high) > 0) high *= 2
  for (let k = 0; k < 200 && high - low > 1e-14 * high; k++) {
    const middle = (low + high) / 2
    if (excess(middle) > 0) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** |z| that a standard normal value exceeds on both sides together with probability `above`. */
export const normalBothSides = (above: number): number => Math.sqrt(chiSquareAbove(above, 1))

/** Limit for the largest of `tests` independent tests at a level (Šidák, J. Am. Stat. Assoc. 62, 1967). */
export const sidakLimit = (level: number, tests: number): number =>
  normalBothSides(-Math.expm1(Math.log(level) / tests))
