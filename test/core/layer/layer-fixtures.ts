import type { LayerColumns, PreparedLayer } from '../../../core/layer/layer-kind'
import { isAcceptor } from '../../../core/silicon/dopants'
import type { Dopant } from '../../../core/silicon/dopants'
import { mobilityModel } from '../../../core/silicon/mobility/registry'
import type { MobilityId } from '../../../core/silicon/mobility/registry'
import type { MobilityModel } from '../../../core/silicon/mobility-model'
import { CoreError } from '../../../core/problems/problem'
import type { Problem } from '../../../core/problems/problem'

/** Columns that hold a number no layer would leave, so that an untouched entry shows. */
export function untouchedColumns(count: number): LayerColumns {
  const column = () => new Float64Array(count).fill(-1)
  return {
    resistivity_ohm_cm: column(),
    concentration_cm3: column(),
    dose_cm2: column(),
    thickness_um: column(),
    resistivitySensitivity: column(),
    concentrationSensitivity: column(),
    doseSensitivity: column(),
  }
}

export function inverted(layer: PreparedLayer, sheets: readonly number[] | Float64Array): LayerColumns {
  const into = untouchedColumns(sheets.length)
  layer.invert(Float64Array.from(sheets), into)
  return into
}

/** Values at equal ratios from min to max, without the two ends. */
export function between(min: number, max: number, count: number): Float64Array {
  return Float64Array.from({ length: count }, (_, i) => min * (max / min) ** ((i + 0.5) / count))
}

export function modelOf(id: MobilityId): MobilityModel {
  return mobilityModel(id, { electrons_cm2_per_Vs: 800, holes_cm2_per_Vs: 250 })
}

export function oppositeOf(dopant: Dopant): Dopant {
  return isAcceptor(dopant) ? 'phosphorus' : 'boron'
}

export function largestRelativeDifference(a: Float64Array, b: Float64Array): number {
  return a.reduce((worst, value, i) => Math.max(worst, Math.abs(value / b[i] - 1)), 0)
}

/** The problem a call throws; undefined where it doesn't throw a CoreError. */
export function problemOf(call: () => unknown): Problem | undefined {
  try {
    call()
  } catch (error) {
    if (error instanceof CoreError) return error.problem
    throw error
  }
  return undefined
}

/**
 * Integral over a..b by the tanh-sinh rule (H. Takahasi, M. Mori 1974): the whole range in one, points crowding at both
 * ends, halving the step until two results agree. Shares nothing with the panels of the source.
 */
export function tanhSinh(f: (x: number) => number, a: number, b: number): number {
  const sumAt = (step: number): number => {
    let sum = 0
    for (let k = -Math.ceil(3.2 / step); k * step <= 3.2; k++) {
      const s = (Math.PI / 2) * Math.sinh(k * step)
      const x = (a + b) / 2 + ((b - a) / 2) * Math.tanh(s)
      const weight = ((Math.PI / 2) * Math.cosh(k * step)) / Math.cosh(s) ** 2
      if (x > a && x < b) sum += weight * f(x)
    }
    return (sum * step * (b - a)) / 2
  }
  let previous = sumAt(1 / 8)
  for (let step = 1 / 16; step > 1e-4; step /= 2) {
    const next = sumAt(step)
    if (Math.abs(next - previous) < 1e-13 * Math.abs(next)) return next
    previous = next
  }
  return previous
}
