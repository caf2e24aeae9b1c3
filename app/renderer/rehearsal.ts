/**
 * A run through a made-up lot while nothing is open: the browser compiles what it has seen run, and the first real lot
 * is on the screen in half the time. Nothing of it is kept or shown.
 */
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { PROCEDURE_FORMAT, type ProcedureInput } from '../../core/procedure/schema'
import type { OpenedFile } from '../contract/host'
import { lotAnalyzer } from './analysis'
import { pageInks } from './composables/theme'
import { mapLayer } from './figures/layers'
import { lotPictures } from './figures/lot-pictures'
import { paintSmallMap } from './figures/paint-small-map'

/** A few wafers first, since the first turns are slow; then as many as a cassette holds. */
const WAFERS = [4, 25]
const RINGS = 3
const CANVAS_px = 64
const PAINTING_TURNS = 24

/** Call when the window is at rest. */
export async function rehearse(): Promise<void> {
  const found = await lotAnalyzer.rehearse(WAFERS.map(rehearsalReadings), rehearsalProcedure())
  if (found?.analysis) await paintAside(found.analysis)
}

/** A wafer a turn, so that a click is not kept waiting. */
async function paintAside(analysis: LotAnalysis): Promise<void> {
  const pictures = lotPictures(analysis)
  const layer = mapLayer(pictures, 'value')
  const context = document.createElement('canvas').getContext('2d')
  if (!layer || !context) return
  context.canvas.width = context.canvas.height = CANVAS_px
  for (let turn = 0; turn < PAINTING_TURNS; turn++) {
    paintSmallMap(context, pictures, pictures.wafers[turn % pictures.wafers.length], layer, pageInks())
    await new Promise((resolve) => requestIdleCallback(resolve))
  }
}

export function rehearsalReadings(wafers: number): OpenedFile {
  const rows = ['lot: rehearsal', '', 'wafer,slot,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V,temperature_C,time']
  for (let wafer = 1; wafer <= wafers; wafer++) {
    for (let ring = 0, site = 0; ring <= RINGS; ring++) {
      for (let k = 0; k < Math.max(1, 8 * ring); k++) {
        const angle = (2 * Math.PI * k) / (8 * ring || 1)
        const [x, y] = [30 * ring * Math.cos(angle), 30 * ring * Math.sin(angle)]
        // One wafer is high at the edge and one tilted, so that reasons are found and written, too.
        const pattern = wafer === 3 ? 0.03 * ring : wafer === 5 ? 0.0005 * x : 0.002 * ring
        const voltage = (0.0202 * (1 + pattern + 0.001 * Math.sin(3 * angle + wafer))).toPrecision(7)
        const time = `2026-01-01T00:00:${String((site * 7) % 60).padStart(2, '0')}Z`
        rows.push(`${wafer},${wafer},${++site},${x.toFixed(3)},${y.toFixed(3)},1e-3,${voltage},-1e-3,-${voltage},22.9,${time}`)
      }
    }
  }
  rows.push('1,1,99,1,1,over,0.02,-1e-3,-0.02,22.9,')
  return { name: 'rehearsal.csv', bytes: new TextEncoder().encode(rows.join('\n')) }
} // prettier-ignore

/** Of the commonest kind, with everything on. */
export function rehearsalProcedure(): OpenedFile {
  const procedure: ProcedureInput = {
    format: PROCEDURE_FORMAT,
    title: 'Rehearsal',
    wafer: { shape: 'disc', diameterMm: 200, thicknessUm: 725, fiducial: 'notch', edgeExclusionMm: 5 },
    probe: { spacingMm: 1, orientation: { angleDeg: 0 }, technique: 'single' },
    layer: {
      kind: 'doped-layer',
      dopant: 'boron',
      profile: 'gaussian',
      depthUm: 0.4,
      background: { dopant: 'phosphorus', concentrationCm3: 1e15 },
      mobility: 'masetti',
    },
    temperature: { referenceC: 23, coefficientPercentPerC: 0.1 },
    limits: {
      sheetResistanceOhmSq: { target: 91, lower: 87, upper: 95 },
      waferMeanOhmSq: { lower: 89, upper: 94 },
      uniformityPercent: { upper: 2 },
    },
    dieGrid: { pitchXMm: 10, pitchYMm: 8, offsetXMm: 0, offsetYMm: 0 },
    uncertainty: {
      currentRel: 0.0002,
      voltageRel: 0.0003,
      spacingMm: 0.005,
      thicknessUm: 1,
      temperatureC: 0.3,
      depthUm: 0.01,
    },
  }
  return { name: 'rehearsal.json', bytes: new TextEncoder().encode(JSON.stringify(procedure)) }
}
