/** A copy of at least `length`, and at least twice as long as before, so that growing costs little over all. */
export function grownInts(array: Int32Array, length: number): Int32Array<ArrayBuffer> {
  const longer = new Int32Array(Math.max(length, 2 * array.length, 16))
  longer.set(array)
  return longer
}

/** The same for floating-point numbers. */
export function grownFloats(array: Float64Array, length: number): Float64Array<ArrayBuffer> {
  const longer = new Float64Array(Math.max(length, 2 * array.length, 16))
  longer.set(array)
  return longer
}
