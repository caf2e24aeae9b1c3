/** sites.csv and dies.csv: a row a site or die, every number in its shortest form that reads back exactly. */
import { VERDICTS } from '../conformity/verdict'
import { writeCsv } from '../ingest/write-csv'
import { flagNames } from './flags'
import type { DieColumns, LotAnalysis } from './lot-analysis'
import { sitePositions } from './site-positions'

type Column = Parameters<typeof writeCsv>[0][number]

export function sitesCsv(analysis: LotAnalysis): string {
  const { readings, procedure, sites } = analysis
  const positions = sitePositions(readings, procedure)
  const number = (name: string, column: Float64Array | undefined): Column => ({
    name,
    cell: (row) => (column ? column[row] : NaN),
  })
  const columns: readonly Column[] = [
    { name: 'wafer', cell: (row) => readings.wafers[readings.wafer[row]].id },
    { name: 'site', cell: (row) => readings.siteNames[readings.site[row]] },
    number('x_mm', positions?.x_mm),
    number('y_mm', positions?.y_mm),
    number('v_over_i_ohm', sites.vOverI_ohm),
    number('geometry_factor', sites.geometryFactor),
    number('thickness_factor', sites.thicknessFactor),
    number('temperature_factor', sites.temperatureFactor),
    number('sheet_resistance_ohm_sq', sites.sheetResistance_ohm_sq),
    number('u_sheet_resistance_ohm_sq', sites.uSheetResistance_ohm_sq),
    number('resistivity_ohm_cm', sites.resistivity_ohm_cm),
    number('concentration_cm3', sites.concentration_cm3),
    number('dose_cm2', sites.dose_cm2),
    number('thickness_um', sites.thickness_um),
    number('conformance_probability', sites.conformanceProbability),
    { name: 'verdict', cell: (row) => VERDICTS[sites.verdict[row]] },
    { name: 'flags', cell: (row) => flagNames(sites.flags[row]) },
  ]
  return writeCsv(columns, sites.count)
}

/**
 * With no die grid the header alone. A lot judged by resistivity gets two columns more, the judged ones; its sheet
 * resistance is then resistivity over thickness, and has no uncertainty of its own.
 */
export function diesCsv({ dies, readings, quantity, procedure }: LotAnalysis): string {
  const isResistivity = quantity.id === 'resistivity'
  const thickness_cm = (procedure.wafer.thicknessUm ?? NaN) * 1e-4
  const number = (name: string, cell: (dies: DieColumns, row: number) => number): Column => ({
    name,
    cell: (row) => (dies ? cell(dies, row) : NaN),
  })
  const judged: readonly Column[] = [
    number('resistivity_ohm_cm', ({ value }, row) => value[row]),
    number('u_resistivity_ohm_cm', ({ u }, row) => u[row]),
  ]
  const columns: readonly Column[] = [
    { name: 'wafer', cell: (row) => (dies ? readings.wafers[dies.wafer[row]].id : '') },
    number('die_x', ({ dieX }, row) => dieX[row]),
    number('die_y', ({ dieY }, row) => dieY[row]),
    number('x_mm', ({ x_mm }, row) => x_mm[row]),
    number('y_mm', ({ y_mm }, row) => y_mm[row]),
    number('sheet_resistance_ohm_sq', ({ value }, row) => (isResistivity ? value[row] / thickness_cm : value[row])),
    number('u_sheet_resistance_ohm_sq', ({ u }, row) => (isResistivity ? NaN : u[row])),
    number('conformance_probability', ({ conformanceProbability }, row) => conformanceProbability[row]),
    { name: 'verdict', cell: (row) => (dies ? VERDICTS[dies.verdict[row]] : '') },
    { name: 'basis', cell: (row) => (dies?.basis[row] === 0 ? 'measured' : 'interpolated') },
    ...(isResistivity ? judged : []),
  ]
  return writeCsv(columns, dies?.count ?? 0)
}
