/** Counts operations in place of time, so that the same book always gets the same answer. */
export class Work {
  /** True once something was left undone. */
  spent = false
  constructor(private left: number) {}

  /** False where this much is not left. */
  take(operations: number): boolean {
    if (operations > this.left) {
      this.spent = true
      return false
    }
    this.left -= operations
    return true
  }
}
