/** Text that is HTML already. Made by `html` alone, so that nothing a person typed can pass for it. */
export class Markup {
  private constructor(readonly source: string) {}

  static join(pieces: readonly Markup[]): Markup {
    return new Markup(pieces.map(({ source }) => source).join('\n'))
  }

  /** Template tag: what is put in is escaped, unless it is markup itself. Attributes must stand in double quotes. */
  static html(text: TemplateStringsArray, ...values: (string | Markup)[]): Markup {
    const filled = text.map((piece, place) => {
      const value = values[place]
      return piece + (value instanceof Markup ? value.source : escapeHtml(value ?? ''))
    })
    return new Markup(filled.join(''))
  }
}

export const html = Markup.html

const entities: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character] ?? '')
}
