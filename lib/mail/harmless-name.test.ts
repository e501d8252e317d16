import { describe, expect, it } from 'vitest'
import { harmlessName } from './harmless-name'

describe('a harmless name', () => {
  it('is left as it is where it is a name', () => {
    for (const name of ['Ada Byron', 'Żółć & Søn', '王小明', "O'Neill, Jr.", 'Dr. No', '👩‍🔬 Team'])
      expect(harmlessName(name)).toBe(name)
  })

  it('is one line without hidden marks, of at most 80 letters', () => {
    expect(harmlessName('a\r\nBcc: x\u2028y\u0000\tz')).toBe('a Bcc: x y z')
    expect(harmlessName('abc\u202edcba\u2066x\u200b')).toBe('abcdcbax')
    expect([...harmlessName('😀'.repeat(200))]).toHaveLength(80)
  })

  it('holds nothing that a mail program would make a link of', () => {
    expect(harmlessName('see https://win.example/now')).toBe('see https:\u200c//win.\u200cexample/now')
    expect(harmlessName(harmlessName('www.win.example'))).toBe('www.\u200cwin.\u200cexample')
  })
})
