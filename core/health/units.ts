/** Values that are off by just the factor of a wrong unit or column. */
import { formatNumber, formatSignificant } from '../units/format'
import {
  COMMON_PRACTICE,
  medianOf,
  type HealthCheck,
  type HealthFinding,
  type HealthInput,
  type Severity,
} from './finding'

/** How near a factor must come to count as that factor: a lot misses its target by less. */
const NEAR = 0.12
const PI_OVER_LN2 = Math.PI / Math.LN2

export const unitSuspicion: HealthCheck = { id: 'units', title: 'Units and columns', look }

function look(input: HealthInput): readonly HealthFinding[] {
  return [...againstTarget(input), ...amongWafers(input), ...places(input)]
}

interface Suspect {
  readonly factor: number
  readonly words: string
}

const SUSPECTS: readonly Suspect[] = [
  ...[-9, -6, -3, 3, 6, 9].map((power) => ({ factor: 10 ** power, words: `10^${power}, as a wrong unit of current or voltage makes it` })),
  { factor: PI_OVER_LN2, words: 'π/ln 2, as where a sheet resistance is read as V/I' },
  { factor: 1 / PI_OVER_LN2, words: 'ln 2/π, as where a V/I is read as a sheet resistance' },
] // prettier-ignore

function againstTarget({ expected, value, wafers, unit }: HealthInput): readonly HealthFinding[] {
  if (!(expected > 0)) return []
  const median = medianOf(wafers.flatMap(({ rows }) => [...rows.subarray(0, 400)].map((i) => value[i])))
  const suspect = SUSPECTS.find(({ factor }) => Math.abs(median / expected / factor - 1) < NEAR)
  if (!suspect) return []
  return [
    {
      check: 'units',
      severity: 'stops',
      sentence: `The lot reads ${formatNumber(median, unit)} ${unit} where ${formatNumber(expected, unit)} ${unit} is expected: apart by a factor of ${suspect.words}.`,
      nextStep: 'Check the units and the names of the columns under Files, and what the prober exports.',
      wafers: [],
      site: null,
      evidence: { median, expected, factor: suspect.factor },
      source: COMMON_PRACTICE,
    },
  ]
}

/** What a wafer among others may be off by. A tenth or ten may be the process; a thousand is not. */
const AMONG: readonly { readonly factor: number; readonly words: string; readonly severity: Severity }[] = [
  { factor: 1e6, words: 'a million times off', severity: 'stops' },
  { factor: 1e3, words: 'a thousand times off', severity: 'stops' },
  { factor: 100, words: 'a hundred times off', severity: 'look' },
  { factor: 10, words: 'ten times off', severity: 'look' },
  { factor: PI_OVER_LN2, words: 'π/ln 2 off', severity: 'look' },
]
/** In the decimal logarithm. */
const NEAR_AMONG = 0.02

function amongWafers({ value, wafers, unit }: HealthInput): readonly HealthFinding[] {
  const medians = wafers.map(({ rows }) => medianOf(Array.from(rows.subarray(0, 400), (i) => value[i])))
  const whole = medianOf(medians)
  // Two wafers can't tell which of them is off; the median of both is neither.
  const isPair = wafers.length === 2
  return AMONG.flatMap(({ factor, words, severity }): HealthFinding[] => {
    const reference = isPair ? Math.min(...medians) : whole
    const off = wafers.filter((_, k) => Math.abs(Math.abs(Math.log10(medians[k] / reference)) - Math.log10(factor)) < NEAR_AMONG)
    if (off.length === 0 || off.length > wafers.length / 2) return []
    const named = off.length === 1 ? `Wafer ${off[0].id} reads` : `${off.length} wafers read`
    const other = isPair ? 'the other' : 'the others'
    return [
      {
        check: 'units',
        severity,
        sentence: `${named} ${words} ${other} (${formatNumber(reference, unit)} ${unit}): a file with another unit, range or column?`,
        nextStep: 'Check the units and columns of the files, and the current that was set.',
        wafers: off.map(({ id }) => id),
        site: off[0].rows[0] ?? null,
        evidence: { median: reference, wafers: off.length, factor },
        source: COMMON_PRACTICE,
      },
    ]
  })
} // prettier-ignore

/** Plans reach at least this share of the usable radius. Common practice, no source. */
const LEAST_REACH = 0.2
const INCH_mm = 25.4

function places({ x_mm, y_mm, outline, edgeExclusion_mm, wafers }: HealthInput): readonly HealthFinding[] {
  if (!x_mm || !y_mm || outline.shape !== 'disc') return []
  const radius_mm = outline.diameter_mm / 2 - edgeExclusion_mm
  let reach_mm = 0
  let sites = 0
  for (const { rows } of wafers) {
    sites = Math.max(sites, rows.length)
    for (const i of rows) reach_mm = Math.max(reach_mm, Math.hypot(x_mm[i], y_mm[i]) || 0)
  }
  if (sites < 9 || reach_mm === 0 || reach_mm > LEAST_REACH * radius_mm) return []
  const unit = [['inches', INCH_mm], ['centimetres', 10]].find(([, factor]) => {
    const scaled = reach_mm * (factor as number)
    return scaled > 0.6 * radius_mm && scaled <= 1.02 * (outline.diameter_mm / 2)
  })
  const guess = unit ? ` Read as ${unit[0]} they would fill it.` : ''
  return [
    {
      check: 'units',
      severity: 'look',
      sentence: `All sites lie within ${formatSignificant(reach_mm, 3)} mm of the centre of a ${outline.diameter_mm} mm wafer.${guess}`,
      nextStep: 'Check the unit of the positions, and the diameter in the procedure.',
      wafers: [],
      site: null,
      evidence: { reach_mm, usableRadius_mm: radius_mm },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore
