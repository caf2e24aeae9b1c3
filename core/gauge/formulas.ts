/** The gauge study as formulas. */
import type { Formula } from '../units/formula'
import { GAUGE_SOURCE } from './gauge-study'

export const GAUGE_SPREADS = {
  title: 'Spreads of a gauge study',
  formula:
    's₁, s₂, s₃ pooled over readings in occasions, days in runs, runs; own components s₁², s₂² − s₁²/J, s₃² − s₂²/K',
  where: 'J readings an occasion, K days a run (harmonic means); a negative component is left as it is',
  source: GAUGE_SOURCE,
} as const satisfies Formula

export const PROBE_BIAS = {
  title: 'Bias of a probe',
  formula:
    'mean over wafers and runs of (mean of the probe − mean of all probes), its uncertainty s/√n, correction of the other sign',
  source: GAUGE_SOURCE,
} as const satisfies Formula
