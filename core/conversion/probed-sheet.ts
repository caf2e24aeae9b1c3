/** From V/I to sheet resistance: the geometry factor and, with a thickness, the thickness factor. */
import { criticalEdgeDistance_mm } from '../geometry/edge-and-thickness'
import { pinPositions } from '../geometry/pin-line'
import type { Placement } from '../geometry/pin-line'
import { THICKNESS_SOURCE, thicknessFactor } from '../geometry/thickness'
import { thinSheetFactor } from '../geometry/thin-sheet'
import { CoreError } from '../problems/problem'
import { formatMm, formatSignificant } from '../units/format'
import { edgeDistance_mm } from '../wafer/outline'
import type { Outline } from '../wafer/outline'
import { calculated, calculatedQuantity } from './calculated'
import type { ConversionStep, ProbedPlace } from './conversion'

export interface ProbedSheet {
  readonly sheetResistance_ohm_sq: number
  readonly steps: readonly ConversionStep[]
}

/**
 * A layer no thicker than this on an insulating back has a thickness factor of 1 within 1e-6 under every probe whose pins are half a
 * millimetre apart or more, so the spacing needn't be known [um].
 */
export const THIN_FOR_EVERY_PROBE_UM = 100

interface Factor {
  readonly value: number
  readonly step: ConversionStep
}

/** Beyond this the product of edge and thickness factor is called doubtful, as in a lot. */
const PRODUCT_TOLERANCE = 1e-3

/**
 * Sheet resistance Rs = C F V/I, or C V/I where no thickness is given.
 *
 * @param vOverI_ohm   > 0 [ohm]
 * @param place        of the pins; see `ProbedPlace`
 * @param thickness_um of what conducts; 100 pin spacings at most [um]
 * @returns sheet resistance [ohm/sq] with its working: (pi/ln 2) V/I far from every edge and thin
 * @throws CoreError out-of-range; not-applicable where a pin is off the disc, or a spacing is needed and missing
 *
 * Assumes as the factors: `thin-sheet.ts`, `thickness.ts`. Where their product is off by more than 0.1 % the working says so.
 */
export function probedSheet({
  vOverI_ohm,
  place,
  thickness_um,
}: {
  readonly vOverI_ohm: number
  readonly place: ProbedPlace
  readonly thickness_um: number | undefined
}): ProbedSheet {
  const geometry = geometryFactorOf(place)
  const thickness = thickness_um === undefined ? null : thicknessFactorOf(place, thickness_um)
  const value = vOverI_ohm * geometry.value * (thickness?.value ?? 1)
  const factors = [calculated(geometry.value, ''), ...(thickness ? [calculated(thickness.value, '')] : [])]
  return {
    sheetResistance_ohm_sq: value,
    steps: [
      {
        symbol: 'V/I', title: 'Voltage over current', value: vOverI_ohm, unit: 'Ω', formula: 'as given', source: 'given',
      },
      geometry.step,
      ...(thickness ? [thickness.step] : []),
      {
        symbol: 'R_s',
        title: 'Sheet resistance',
        value,
        unit: 'Ω/sq',
        formula: `${factors.join(' × ')} × ${calculatedQuantity(vOverI_ohm, 'Ω')}`,
        source: 'product of the factors',
      },
    ],
  } // prettier-ignore
}

function spacingOf({ spacing_mm }: ProbedPlace): number {
  if (spacing_mm !== undefined) return spacing_mm
  const why = 'the corrections for the edge and the thickness are counted in pin spacings, and none is given'
  throw new CoreError({ kind: 'not-applicable', what: 'V/I to sheet resistance', why })
}

function outlineOf({ diameter_mm }: ProbedPlace): Outline {
  return diameter_mm === undefined ? { shape: 'infinite' } : { shape: 'disc', diameter_mm, fiducial: 'none' }
}

function placementOf(place: ProbedPlace): Placement {
  // On the infinite sheet equal spacings cancel, so any will do.
  const spacing_mm = place.diameter_mm === undefined ? (place.spacing_mm ?? 1) : spacingOf(place)
  const { x_mm, y_mm, angle_deg } = place
  return { x_mm, y_mm, orientation: { angleDeg: angle_deg }, spacings_mm: [spacing_mm, spacing_mm, spacing_mm] }
}

function geometryFactorOf(place: ProbedPlace): Factor {
  const { diameter_mm, x_mm, y_mm, angle_deg } = place
  const placement = placementOf(place)
  const { value, source } = thinSheetFactor({ outline: outlineOf(place), configuration: 'A', ...placement })
  const onDisc = `disc ${diameter_mm} mm, pins ${placement.spacings_mm[0]} mm apart at x ${x_mm}, y ${y_mm} mm, pin line ${angle_deg}°`
  return {
    value,
    step: {
      symbol: 'C',
      title: diameter_mm === undefined ? 'Geometry factor, infinite sheet' : 'Geometry factor, disc',
      value,
      unit: '',
      formula: diameter_mm === undefined ? 'π / ln 2, far from every edge' : onDisc,
      source,
    },
  }
}

function thicknessFactorOf(place: ProbedPlace, thickness_um: number): Factor {
  const isThin = thickness_um <= THIN_FOR_EVERY_PROBE_UM && place.back === 'insulating'
  if (place.spacing_mm === undefined && isThin) return thinFactor()
  const spacing_mm = spacingOf(place)
  const { value, source } = thicknessFactor({ thickness_um, spacing_mm, back: place.back })
  const ratio = formatSignificant(thickness_um / 1000 / spacing_mm, 4)
  return {
    value,
    step: {
      symbol: 'F',
      title: `Thickness factor, ${place.back} back`,
      value,
      unit: '',
      formula: `w/S = ${ratio}${productCaution(place, thickness_um, spacing_mm)}`,
      source,
    },
  }
}

function thinFactor(): Factor {
  const formula = '1 for a layer so thin, under pins 0.5 mm apart or more'
  const named = { symbol: 'F', title: 'Thickness factor, insulating back', formula, source: THICKNESS_SOURCE }
  return { value: 1, step: { ...named, value: 1, unit: '' } }
}

/** Near an edge the two factors are no plain product. */
function productCaution(place: ProbedPlace, thickness_um: number, spacing_mm: number): string {
  if (place.diameter_mm === undefined) return ''
  const pins = pinPositions(placementOf(place))
  const edge_mm = Math.min(...pins.map(({ x_mm, y_mm }) => edgeDistance_mm(outlineOf(place), x_mm, y_mm)))
  const critical_mm = criticalEdgeDistance_mm({
    thickness_um,
    spacing_mm,
    tolerance: PRODUCT_TOLERANCE,
    back: place.back,
  })
  if (edge_mm >= critical_mm) return ''
  return `; a pin is ${formatMm(edge_mm)} from the edge: within ${formatMm(critical_mm)} the product C F may be more than 0.1 % off`
}
