const ODD_SPACES = /[\u00a0\u1680\u2000-\u200a\u202f\u205f\u3000\t\r\n\v\f]/g
const UNSEEN = /[\u200b-\u200d\u2060\ufeff\u00ad]/g

const PLAIN = /^(?:[!-~]+(?: [!-~]+)*)?$/

/** All white space as single plain spaces, none at the ends; characters without width are left out. */
export function plainSpaces(text: string): string {
  if (PLAIN.test(text)) return text
  return text.replace(UNSEEN, '').replace(ODD_SPACES, ' ').replace(/ {2,}/g, ' ').trim()
}

const RAISED_OR_LOWERED = '₀₁₂₃₄₅₆₇₈₉'

/** Lowered digits as plain ones: "CaCO₃" is "CaCO3". */
export function plainDigits(text: string): string {
  return text.replace(/[₀-₉]/g, (digit) => String(RAISED_OR_LOWERED.indexOf(digit)))
}
