/** Forward against reverse: a difference that is everywhere the same has a cause that every reading shares. */
import { formatFixed, formatSignificant } from '../units/format'
import {
  COMMON_PRACTICE,
  medianOf,
  robustDeviation,
  type HealthCheck,
  type HealthFinding,
  type HealthInput,
} from './finding'

/** SEMI MF1529-1104, 13.1.3: forward and reverse must agree within 5 % of the larger. */
const LARGE = 0.05
/** Below this a shared difference is of no account. Common practice, no source. */
const SMALL = 0.005
/** Of the median, over its standard error. */
const SURE = 6
const LEAST_SITES = 8

export const polarity: HealthCheck = { id: 'polarity', title: 'Forward against reverse current', look }

function look(input: HealthInput): readonly HealthFinding[] {
  return [...wholeLot(input), ...someWafers(input)]
}

function wholeLot({ readings, wafers }: HealthInput): readonly HealthFinding[] {
  const { voltage_V, current_A, voltageReverse_V, currentReverse_A } = readings
  if (!voltage_V || !current_A || !voltageReverse_V || !currentReverse_A) return []
  const rows = wafers.flatMap((wafer) => sampled(wafer.rows))
  const difference = rows.map((i) => {
    const [forward, reverse] = [voltage_V[i] / current_A[i], voltageReverse_V[i] / currentReverse_A[i]]
    return (2 * (forward - reverse)) / (forward + reverse)
  })
  const known = difference.filter(Number.isFinite)
  if (known.length < LEAST_SITES) return []
  const median = medianOf(known)
  const error = (1.2533 * robustDeviation(known, median)) / Math.sqrt(known.length)
  if (Math.abs(median) < SMALL || Math.abs(median) < SURE * error) return []
  const emf = rows.map((i) => (1e6 * (voltage_V[i] + voltageReverse_V[i])) / 2).filter(Number.isFinite)
  const stray_uV = medianOf(emf)
  const cause = causeOf(
    rows.map((i) => Math.abs(voltage_V[i])),
    known,
    emf,
  )
  const { words, nextStep } = CAUSES[cause]
  const amount = formatFixed(100 * Math.abs(median), 1)
  return [
    {
      check: 'polarity',
      severity: Math.abs(median) >= LARGE || cause === 'contact' ? 'look' : 'note',
      sentence: `Forward and reverse readings differ by ${amount} % throughout, ${median > 0 ? 'forward' : 'reverse'} being higher. ${words.replace('#', formatSignificant(stray_uV, 3))}`,
      nextStep,
      wafers: [],
      site: null,
      evidence: { medianDifference: median, standardError: error, strayVoltage_uV: stray_uV },
      source: 'SEMI MF1529-1104, 13.1.3 (agreement within 5 %)',
    },
  ]
}

type Cause = 'stray-voltage' | 'contact' | 'open'

const CAUSES: Readonly<Record<Cause, { readonly words: string; readonly nextStep: string }>> = {
  'stray-voltage': {
    words: 'The difference is a voltage of # µV whatever the site reads: a thermal EMF or an offset of the meter, which the mean of both cancels.',
    nextStep: 'Let the prober come to temperature and zero the meter before the next lot.',
  },
  contact: {
    words: 'It grows with the voltage, as a rectifying contact or a leaking junction makes it; the mean of both does not cancel that.',
    nextStep: 'Measure a site again at half the current and in the dark; if it changes, look at the contacts and at the junction before the lot is judged.',
  },
  open: {
    words: 'The voltages are too alike to tell a stray voltage (# µV, which the mean of both cancels) from a rectifying contact (which it does not).',
    nextStep: 'Measure a site again at half the current: a stray voltage doubles its share, a contact does not.',
  },
} // prettier-ignore

/** Voltages must differ by so much, one robust standard deviation, before a difference can be told from a proportion. */
const TELLING = 0.04

function causeOf(voltage_V: readonly number[], difference: readonly number[], emf_uV: readonly number[]): Cause {
  if (robustDeviation(voltage_V) < TELLING * medianOf(voltage_V)) return 'open'
  const spread = (values: readonly number[]): number => robustDeviation(values) / Math.abs(medianOf(values))
  return spread(emf_uV) < spread(difference) ? 'stray-voltage' : 'contact'
}

/** More sites tell nothing more of a median. */
const MOST_ROWS = 2000

function sampled(rows: Uint32Array): number[] {
  const every = Math.max(1, Math.ceil(rows.length / MOST_ROWS))
  return Array.from({ length: Math.ceil(rows.length / every) }, (_, k) => rows[k * every])
}

/** A wafer's own difference must be so far from the lot's. Common practice, no source. */
const APART = 0.01
const LEAST_WAFERS = 3

/** Wafers that differ between the polarities where the others do not: the prober is the same, so it is the wafer. */
function someWafers({ readings, wafers }: HealthInput): readonly HealthFinding[] {
  const { voltage_V, current_A, voltageReverse_V, currentReverse_A } = readings
  if (!voltage_V || !current_A || !voltageReverse_V || !currentReverse_A || wafers.length < LEAST_WAFERS) return []
  const each = wafers.flatMap(({ id, rows }) => {
    const known = sampled(rows).map((i) => {
      const [forward, reverse] = [voltage_V[i] / current_A[i], voltageReverse_V[i] / currentReverse_A[i]]
      return (2 * (forward - reverse)) / (forward + reverse)
    }).filter(Number.isFinite)
    const median = medianOf(known)
    const error = (1.2533 * robustDeviation(known, median)) / Math.sqrt(known.length)
    return known.length < LEAST_SITES ? [] : [{ id, row: rows[0], median, error }]
  })
  const ofLot = medianOf(each.map(({ median }) => median))
  const off = each.filter(({ median, error }) => Math.abs(median - ofLot) > Math.max(APART, SURE * error))
  if (off.length === 0 || off.length > each.length / 2) return []
  const worst = off.reduce((most, entry) => (Math.abs(entry.median - ofLot) > Math.abs(most.median - ofLot) ? entry : most))
  const amount = (share: number): string => formatFixed(100 * Math.abs(share), 1)
  return [
    {
      check: 'polarity',
      severity: 'look',
      sentence: `On ${off.length === 1 ? `wafer ${worst.id}` : `${off.length} wafers, most on ${worst.id},`} forward and reverse readings differ by ${amount(worst.median)} %, in the lot by ${amount(ofLot)} %: a rectifying contact or a leaking junction of that wafer.`,
      nextStep: 'Measure it again at half the current and in the dark; if the difference changes, don’t judge the wafer by these readings.',
      wafers: off.map(({ id }) => id),
      site: worst.row,
      evidence: { medianDifference: worst.median, standardError: worst.error, ofLot },
      source: `SEMI MF1529-1104, 13.1.3 (agreement within 5 %); finer thresholds ${COMMON_PRACTICE}`,
    },
  ]
} // prettier-ignore
