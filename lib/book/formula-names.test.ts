import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isNamedIn, namesIn, renameIn } from './formula-names'

describe('names in a formula', () => {
  it.each([
    ['flow("101") = k * flow(Feed)', ['stream 101', 'parameter k', 'stream Feed']],
    ['part("101", NaCl) + part(A, "Mg Cl") = 2e3', ['stream 101', 'component NaCl', 'stream A', 'component Mg Cl']],
    ["share('101', W) = (a + b) / 2", ['stream 101', 'component W', 'parameter a', 'parameter b']],
    ['massShare( S1 ,W)=moleShare(S2,W)', ['stream S1', 'component W', 'stream S2', 'component W']],
    ['flow("a ) , (") = 3', ['stream a ) , (']],
    ['flow("say \\"x\\"") = 1', ['stream say "x"']],
    // Unfinished while it is being typed.
    ['flow(', []],
    ['part("101"', ['stream 101']],
    ['flow = k', ['parameter k']],
    ['"open', ['parameter open']],
    ['', []],
  ])('%s', (text, names) => {
    expect(namesIn(text).map(({ kind, name }) => `${kind} ${name}`)).toEqual(names)
  })
})

describe('a new name', () => {
  it('stands in its place only, in quotes where it must, with everything else as typed', () => {
    const text = 'flow( A ) =  A * part(B, A)   + flow("A")'
    expect(renameIn(text, 'stream', 'A', 'C1')).toBe('flow( C1 ) =  A * part(B, A)   + flow(C1)')
    expect(renameIn(text, 'component', 'A', '1-2')).toBe('flow( A ) =  A * part(B, "1-2")   + flow("A")')
    expect(renameIn(text, 'parameter', 'A', 'k_2')).toBe('flow( A ) =  k_2 * part(B, A)   + flow("A")')
    expect(renameIn(text, 'stream', 'none', '5')).toBe(text)
    expect(renameIn(text, 'stream', 'A', 'flow')).toBe('flow( "flow" ) =  A * part(B, A)   + flow("flow")')
  })

  it('cannot be a parameter where it is no plain word', () => {
    expect(renameIn('flow("1") = k', 'parameter', 'k', 'k 1')).toBeUndefined()
    expect(renameIn('flow("1") = k', 'parameter', 'k', 'share')).toBeUndefined()
    expect(renameIn('flow("1") = 2', 'parameter', 'k', 'k 1')).toBe('flow("1") = 2')
  })

  it('is the one name that takes the place of the other, whatever it is', () => {
    fc.assert(
      fc.property(fc.string({ minLength: 1, maxLength: 20 }), fc.string(), (name, noise) => {
        const text = `flow("from here") = 2 * part("from here", W) + ${JSON.stringify(noise)}`
        const renamed = renameIn(text, 'stream', 'from here', name) as string
        expect(isNamedIn(renamed, 'stream', name)).toBe(true)
        expect(isNamedIn(renamed, 'stream', 'from here')).toBe(name === 'from here')
      }),
    )
  })
})
