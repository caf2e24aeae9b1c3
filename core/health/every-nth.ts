/** Every n-th reading off: a contact, a range or a multiplexer that comes round again and again. */
import { formatFixed } from '../units/format'
import { COMMON_PRACTICE, type HealthCheck, type HealthFinding, type HealthInput } from './finding'
import { orderSlopes, sumOf, type OrderSlope } from './order-slopes'

const LONGEST = 8
/** Readings of a turn that are off, at least, on each wafer. */
const LEAST_TURNS = 4
const LEAST_WAFERS = 2
/** Of the value. */
const LEAST = 0.002
/** Standard errors: 35 turns are tried. */
const SURE = 8
/** Of what all wafers share besides their surfaces. */
const LEAST_SHARE = 0.6

export const everyNth: HealthCheck = { id: 'every-nth', title: 'Every n-th reading', look }

interface Turn {
  readonly period: number
  readonly phase: number
  readonly change: number
  readonly z: number
}

function look(input: HealthInput): readonly HealthFinding[] {
  const slopes = orderSlopes(input)
  const alike = slopes.filter(({ residual }) => residual.length === slopes[0].residual.length)
  if (alike.length < LEAST_WAFERS) return []
  const turns = turnsOf(alike)
  if (turns.length === 0) return []
  // The largest share first; of a turn and its multiples, the multiples explain less.
  const { period, phase, change, z } = turns.reduce((most, turn) => (Math.abs(turn.z) > Math.abs(most.z) ? turn : most))
  return [
    {
      check: 'every-nth',
      severity: 'look',
      sentence: `Every ${ORDINALS[period]} reading, counted from reading ${phase + 1} of a wafer, is ${formatFixed(100 * Math.abs(change), 1)} % ${change > 0 ? 'high' : 'low'} on ${alike.length} wafers.`,
      nextStep: 'Look for what comes round with that period: a range that switches, a probe that is cleaned, a chuck that turns; then measure a wafer in another order.',
      wafers: [],
      site: alike[0].rows[phase],
      evidence: { period, firstReading: phase + 1, relativeChange: change, z },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore

const ORDINALS = ['', '', 'second', 'third', 'fourth', 'fifth', 'sixth', 'seventh', 'eighth']

/** Turns that explain most of what the wafers share beyond their surfaces and their noise. */
function turnsOf(alike: readonly OrderSlope[]): readonly Turn[] {
  const { length } = alike[0].residual
  const shared = alike[0].residual.map((_, k) => alike.reduce((sum, { residual }) => sum + residual[k], 0) / alike.length)
  const noise = alike.reduce((sum, slope) => sum + slope.noise, 0) / alike.length
  const whole = sumOf(shared, shared)
  // No part is larger than the whole: most lots end here.
  if (whole * alike.length < (SURE * noise) ** 2) return []
  const beyondNoise = whole - (noise ** 2 * length) / alike.length
  const turns: Turn[] = []
  for (let period = 2; period <= LONGEST && period * LEAST_TURNS <= length; period++) {
    for (let phase = 0; phase < period; phase++) {
      const term = alike[0].without(Float64Array.from(alike[0].place, (place) => (place % period === phase ? 1 : 0)))
      const power = sumOf(term, term)
      // Where the surface follows the turn nearly everywhere nothing can be told.
      if (power < LEAST_TURNS / 2) continue
      const change = sumOf(shared, term) / power
      const z = (change * Math.sqrt(power * alike.length)) / noise
      const share = (change ** 2 * power) / Math.max(change ** 2 * power, beyondNoise)
      if (Math.abs(change) > LEAST && Math.abs(z) > SURE && share > LEAST_SHARE) turns.push({ period, phase, change, z })
    }
  }
  return turns
} // prettier-ignore
