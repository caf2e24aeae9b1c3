/** Configuration A over B against what geometry allows at each place. */
import { thinSheetFactors } from '../geometry/thin-sheet'
import { formatFixed } from '../units/format'
import { medianOf, type HealthCheck, type HealthFinding, type HealthInput } from './finding'

/** A worn or badly placed pin moves the ratio by a few percent; what is farther off is another cause. Common practice, no source. */
const OFF = 0.06
const LEAST_SITES = 3

export const configurationRatio: HealthCheck = { id: 'configuration-ratio', title: 'Configurations A and B', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const { vOverIA_ohm, vOverIB_ohm } = input
  if (!input.isDual || !vOverIB_ohm) return []
  // Also those that gave no result: exchanged configurations give none.
  const rows = Array.from(vOverIA_ohm.keys()).filter((i) => vOverIA_ohm[i] > 0 && vOverIB_ohm[i] > 0)
  const expected = expectedRatios(input, rows)
  const known = rows.map((i, k) => ({ i, found: vOverIA_ohm[i] / vOverIB_ohm[i], expected: expected[k] }))
  const off = known.filter(({ found, expected: e }) => Math.abs(found / e - 1) > OFF)
  if (off.length < LEAST_SITES) return []
  const median = medianOf(known.map(({ found, expected: e }) => found / e))
  const isSwapped = medianOf(known.map(({ found }) => found)) < 1
  const { i, found, expected: e } = off.reduce((worst, entry) => (Math.abs(entry.found / entry.expected - 1) > Math.abs(worst.found / worst.expected - 1) ? entry : worst))
  const ratio = `${formatFixed(found, 3)} where the pins and the edge allow ${formatFixed(e, 3)}`
  return [
    {
      check: 'configuration-ratio',
      severity: isSwapped || off.length > known.length / 2 ? 'stops' : 'look',
      sentence: isSwapped
        ? `Configuration B reads higher than A (A/B ${ratio}): the columns of A and B look exchanged.`
        : `At ${off.length} of ${known.length} sites A/B is ${formatFixed(100 * OFF, 0)} % or more off what geometry allows, as far as ${ratio}.`,
      nextStep: isSwapped
        ? 'Check which column is configuration A: current through the outer pins.'
        : 'Look at the probe: a missing or bent pin, or a site nearer to the edge than its position says; then measure these sites again.',
      wafers: [...new Set(off.map((entry) => input.readings.wafers[input.readings.wafer[entry.i]].id))],
      site: i,
      evidence: { sites: off.length, medianOverExpected: median, worst: found, expectedThere: e },
      source: 'SEMI MF1529-1104; exact factors of both configurations at each place',
    },
  ]
} // prettier-ignore

/** R_A/R_B = C_B/C_A. */
function expectedRatios({ outline, spacings_mm, orientation, x_mm, y_mm }: HealthInput, rows: readonly number[]): Float64Array {
  const place = {
    x_mm: Float64Array.from(rows, (i) => x_mm?.[i] ?? 0),
    y_mm: Float64Array.from(rows, (i) => y_mm?.[i] ?? 0),
  }
  const sheet = x_mm && y_mm ? outline : ({ shape: 'infinite' } as const)
  const common = { outline: sheet, spacings_mm, orientation, ...place }
  const a = thinSheetFactors({ ...common, configuration: 'A' }).factor
  const b = thinSheetFactors({ ...common, configuration: 'B' }).factor
  return a.map((factor, k) => b[k] / factor)
} // prettier-ignore
