// @ts-check

/** A failure that a person can mend: the message is a plain sentence that says what is wrong and what to do. */
export class Trouble extends Error {
  /** @param {string} message @param {{ output?: string, cause?: unknown }} [more] `output`: what a program printed */
  constructor(message, more = {}) {
    super(message, { cause: more.cause })
    this.name = 'Trouble'
    this.output = more.output ?? ''
  }
}

/** @param {string} line */
export function say(line) {
  process.stdout.write(`${line}\n`)
}

/** Says what is wrong, after the last lines of what a program printed. @param {unknown} cause */
export function sayTrouble(cause) {
  if (cause instanceof Trouble) {
    const tail = lastLines(cause.output, 40)
    if (tail) process.stderr.write(`\n${tail}\n`)
    process.stderr.write(`\n${cause.message}\n`)
    return
  }
  process.stderr.write(`\n${cause instanceof Error ? cause.stack : String(cause)}\n`)
}

/** @param {string} text @param {number} count */
export function lastLines(text, count) {
  return text.trimEnd().split('\n').slice(-count).join('\n')
}

/** "0.4 s", "1 min 5 s". @param {number} since a time from Date.now() */
export function elapsed(since) {
  const seconds = (Date.now() - since) / 1000
  if (seconds < 60) return `${seconds.toFixed(1)} s`
  return `${Math.floor(seconds / 60)} min ${Math.round(seconds % 60)} s`
}
