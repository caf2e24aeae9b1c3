import type { Limits } from '../conformity/limits'
import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import type { Quantity } from './lot-analysis'

const QUANTITIES = {
  'sheet-resistance': {
    id: 'sheet-resistance',
    title: 'Sheet resistance',
    symbol: 'Rs',
    unit: 'Ω/sq',
    asciiUnit: 'ohm/sq',
  },
  resistivity: { id: 'resistivity', title: 'Resistivity', symbol: 'ρ', unit: 'Ω·cm', asciiUnit: 'ohm.cm' },
} as const satisfies Record<Quantity['id'], Quantity>

/**
 * What this lot is judged by: as the procedure says; else resistivity where its limits are on resistivity, or where
 * the file reports resistivity and nothing that a sheet resistance could be made of; else sheet resistance.
 */
export function judgedQuantity(procedure: Procedure, readings: Readings): Quantity {
  if (procedure.quantity) return QUANTITIES[procedure.quantity]
  const { resistivityOhmCm, waferMeanOhmCm } = procedure.limits
  const onlyResistivity =
    !readings.voltage_V && !readings.vOverI_ohm && !readings.sheetResistance_ohm_sq && !procedure.wafer.thicknessUm
  return QUANTITIES[resistivityOhmCm || waferMeanOhmCm || onlyResistivity ? 'resistivity' : 'sheet-resistance']
}

/** The procedure's limits on the judged quantity: of a site, and of a wafer's mean. */
export function limitsOn(
  quantity: Quantity,
  procedure: Procedure,
): {
  readonly site: (Limits & { readonly target?: number | undefined }) | undefined
  readonly waferMean: Limits | undefined
} {
  const { limits } = procedure
  return quantity.id === 'resistivity'
    ? { site: limits.resistivityOhmCm, waferMean: limits.waferMeanOhmCm }
    : { site: limits.sheetResistanceOhmSq, waferMean: limits.waferMeanOhmSq }
}
