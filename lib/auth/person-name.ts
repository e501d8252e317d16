const longestName = 100

/** What is wrong with a person's name, as a sentence; undefined when nothing is. */
export function nameProblem(name: string): string | undefined {
  const trimmed = name.trim()
  if (trimmed === '') return 'Type your name: it is shown beside what you do.'
  if (trimmed.length > longestName) return `This name is longer than ${longestName} characters.`
  if (/[\p{Cc}\p{Cs}\p{Zl}\p{Zp}]/u.test(trimmed)) return 'This name holds a character that cannot be shown.'
  return undefined
}
