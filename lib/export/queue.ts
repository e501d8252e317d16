/** Runs at most `width` pieces of work at once; `length` more may wait. */
export class Queue {
  private running = 0
  private readonly waiting: (() => void)[] = []

  constructor(
    private readonly width: number,
    private readonly length: number,
  ) {}

  /** undefined where too many wait already: nothing was started. */
  run<T>(work: () => Promise<T>): Promise<T> | undefined {
    if (this.running >= this.width && this.waiting.length >= this.length) return undefined
    return this.whenFree().then(async () => {
      try {
        return await work()
      } finally {
        this.running -= 1
        this.waiting.shift()?.()
      }
    })
  }

  private whenFree(): Promise<void> {
    if (this.running < this.width) {
      this.running += 1
      return Promise.resolve()
    }
    return new Promise((resolve) => {
      this.waiting.push(() => {
        this.running += 1
        resolve()
      })
    })
  }
}
