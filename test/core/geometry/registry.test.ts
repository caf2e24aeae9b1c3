import { describe, expect, it } from 'vitest'
import {
  createPinColumns,
  fourTerminalGradient,
  fourTerminalSum,
  TERMINALS,
} from '../../../core/geometry/four-terminal'
import { logDistanceOf, outlineGeometries, outlineGeometry } from '../../../core/geometry/registry'
import { CoreError } from '../../../core/problems/problem'
import type { Outline } from '../../../core/wafer/outline'

const OUTLINES: readonly Outline[] = [
  { shape: 'infinite' },
  { shape: 'disc', diameter_mm: 20, fiducial: 'none' },
  { shape: 'rectangle', width_mm: 20, height_mm: 14 },
]

/** Four places in no line. */
const PLACES: readonly (readonly [number, number])[] = [
  [-4, 3],
  [2, 5.5],
  [6, -1],
  [-3, -5],
]

function pairAt(outline: Outline, i: number, j: number): number[] {
  const out = new Float64Array(5)
  const [[xi, yi], [xj, yj]] = [PLACES[i]!, PLACES[j]!]
  logDistanceOf(outline)(xi, yi, xj, yj, out)
  return [...out]
}

describe('the register of outlines', () => {
  it('has one entry a shape, each with title, source and domain', () => {
    expect(new Set(outlineGeometries.map((entry) => entry.id)).size).toBe(outlineGeometries.length)
    for (const entry of outlineGeometries) {
      for (const text of [entry.title, entry.source, entry.domain]) expect(text).not.toBe('')
    }
    for (const outline of OUTLINES) expect(outlineGeometry(outline).id).toBe(outline.shape)
  })

  it.each(OUTLINES)('the log distance is symmetric, with its gradients exchanged: %o', (outline) => {
    const [there, back] = [pairAt(outline, 0, 1), pairAt(outline, 1, 0)]
    const exchanged = [back[0]!, back[3]!, back[4]!, back[1]!, back[2]!]
    there.forEach((value, n) => expect(value).toBeCloseTo(exchanged[n]!, 12))
  })

  it.each(OUTLINES)(
    'current and voltage pairs can be exchanged (reciprocity), reversed, and RC = RA - RB: %o',
    (outline) => {
      const L = (i: number, j: number) => pairAt(outline, i, j)[0]!
      const { A, B } = TERMINALS
      const exchanged = { source: A.high, sink: A.low, high: A.source, low: A.sink }
      const reversed = { source: A.sink, sink: A.source, high: A.low, low: A.high }
      const C = { source: 0, sink: 1, high: 3, low: 2 }
      expect(fourTerminalSum(exchanged, L)).toBeCloseTo(fourTerminalSum(A, L), 12)
      expect(fourTerminalSum(reversed, L)).toBeCloseTo(fourTerminalSum(A, L), 12)
      expect(fourTerminalSum(C, L)).toBeCloseTo(fourTerminalSum(A, L) - fourTerminalSum(B, L), 12)
      const pins = createPinColumns()
      PLACES.forEach(([x, y], pin) => {
        pins.x[pin] = x
        pins.y[pin] = y
      })
      expect(fourTerminalGradient(B, logDistanceOf(outline), pins)).toBeCloseTo(fourTerminalSum(B, L), 12)
    },
  )

  it('refuses an outline that it does not know', () => {
    expect(() => outlineGeometry({ shape: 'hexagon' } as unknown as Outline)).toThrow(CoreError)
  })
})
