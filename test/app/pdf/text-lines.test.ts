import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { plainText, wrapped } from '../../../app/pdf/text-lines'

/** A typeface whose every character is one wide. */
const measure = (text: string) => text.length

describe('text into lines', () => {
  it('keeps numbers with their units and powers whole', () => {
    expect(wrapped('mean 92.13 Ω/sq here', 11, measure)).toEqual(['mean', '92.13 Ω/sq', 'here'])
    expect(wrapped('N is 1.43 × 10¹⁹ cm⁻³ now', 17, measure)).toEqual(['N is', '1.43 × 10¹⁹ cm⁻³', 'now'])
  })

  it('cuts a word that is too long for any line', () => {
    expect(wrapped('ab 0123456789', 4, measure)).toEqual(['ab', '0123', '4567', '89'])
  })

  it('loses no character but spaces, and makes no line too wide', () => {
    fc.assert(
      fc.property(fc.string(), fc.integer({ min: 1, max: 30 }), (text, width) => {
        const lines = wrapped(text, width, measure)
        expect(lines.join('').replaceAll(' ', '')).toBe(plainText(text).replaceAll(' ', ''))
        for (const line of lines) expect(line.length).toBeLessThanOrEqual(Math.max(width, 1))
      }),
      { numRuns: 200 },
    )
  })

  it('turns control characters into spaces', () => {
    expect(plainText('a\tb\nc\u0000d')).toBe('a b c d')
  })
})
