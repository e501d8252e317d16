const longest = 80

/** Marks that turn text around or hide in it. */
const hidden = /[\u200b\u200e\u200f\u202a-\u202e\u2060-\u2069\ufeff]/gu
const controls = /[\p{Cc}\p{Cs}\p{Zl}\p{Zp}\s]+/gu

/**
 * A name that a person chose, made fit for a mail to somebody else: one line, of bounded length, with nothing hidden in
 * it, and with whatever mail programs would make a link of broken by an unseen mark. An invitation carries no spam.
 */
export function harmlessName(name: string): string {
  const line = name.replace(hidden, '').replace(controls, ' ').trim()
  const letters = [...line]
  const short = letters.length > longest ? `${letters.slice(0, longest - 1).join('')}…` : line
  return short.replace(/(?<=[\p{L}\p{N}])\.(?=[\p{L}\p{N}])/gu, '.\u200c').replace(/:(?=\/\/)/g, ':\u200c')
}
