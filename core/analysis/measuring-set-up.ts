import type { Orientation, PinSpacings } from '../geometry/pin-line'
import type { Procedure } from '../procedure/schema'
import type { Outline } from '../wafer/outline'

/** The procedure's wafer and probe in the terms of wafer/ and geometry/. */
export interface MeasuringSetUp {
  readonly outline: Outline
  readonly spacings_mm: PinSpacings
  readonly meanSpacing_mm: number
  readonly orientation: Orientation
  /** The procedure says so and the readings have a configuration B. */
  readonly isDual: boolean
  /** null where the layer doesn't conduct through the wafer or its thickness isn't known. */
  readonly conductingThickness_um: number | null
}

export function measuringSetUp(
  { wafer, probe, layer }: Procedure,
  { hasConfigurationB }: { readonly hasConfigurationB: boolean },
): MeasuringSetUp {
  // Without an edge or a thickness nothing depends on the size of the probe: any equal spacing serves.
  const nominal_mm = probe.spacingMm ?? 1
  const spacings_mm = probe.pinSpacingsMm ?? [nominal_mm, nominal_mm, nominal_mm]
  return {
    outline: outlineOf(wafer),
    spacings_mm,
    meanSpacing_mm: (spacings_mm[0] + spacings_mm[1] + spacings_mm[2]) / 3,
    orientation: probe.orientation,
    isDual: probe.technique === 'dual' && hasConfigurationB,
    conductingThickness_um: layer.kind === 'bulk' ? (wafer.thicknessUm ?? null) : null,
  }
}

function outlineOf({ shape, diameterMm, widthMm, heightMm, fiducial, flatLengthMm }: Procedure['wafer']): Outline {
  if (shape === 'rectangle' && widthMm && heightMm) return { shape, width_mm: widthMm, height_mm: heightMm }
  if (shape === 'disc' && diameterMm) {
    return { shape, diameter_mm: diameterMm, fiducial, ...(flatLengthMm ? { flatLength_mm: flatLengthMm } : {}) }
  }
  return { shape: 'infinite' }
}
