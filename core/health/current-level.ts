/** Whether the current suits the layer: too little voltage drowns in noise, too much current heats and injects. */
import { formatSignificant } from '../units/format'
import { medianOf, type HealthCheck, type HealthFinding, type HealthInput } from './finding'

/** SEMI MF1529-1104, Table 1 and 11: currents by sheet resistance, voltages of 7 to 15 mV wanted, equipment for 5 to 20 mV. */
const WANTED_mV = { low: 5, high: 20 } as const
/** So far outside the result itself is in doubt. Common practice, no source. */
const FAR = 5

export const currentLevel: HealthCheck = { id: 'current-level', title: 'Current and voltage', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const ofLot = wholeLot(input)
  return ofLot.length > 0 ? ofLot : someWafers(input)
}

function wholeLot({ readings, wafers }: HealthInput): readonly HealthFinding[] {
  const { voltage_V, current_A } = readings
  if (!voltage_V || !current_A) return []
  const rows = wafers.flatMap(({ rows: own }) => [...own.subarray(0, 400)])
  const voltage_mV = 1e3 * medianOf(rows.map((i) => Math.abs(voltage_V[i])))
  const current_mA = 1e3 * medianOf(rows.map((i) => Math.abs(current_A[i])))
  if (!(voltage_mV > 0)) return []
  const isLow = voltage_mV < WANTED_mV.low
  const isHigh = voltage_mV > WANTED_mV.high
  if (!isLow && !isHigh) return []
  const excess = isLow ? WANTED_mV.low / voltage_mV : voltage_mV / WANTED_mV.high
  const read = `${formatSignificant(voltage_mV, 3)} mV at ${formatSignificant(current_mA, 3)} mA`
  const aim_mA = (10 / voltage_mV) * current_mA
  return [
    {
      check: 'current-level',
      severity: excess > FAR ? 'look' : 'note',
      sentence: isLow
        ? `The voltage is small: ${read}; stray voltages and noise weigh more than they need.`
        : `The voltage is large: ${read}; so much current may heat the layer under the pins or inject carriers.`,
      nextStep: isLow
        ? `About ${formatSignificant(aim_mA, 2)} mA would give 10 mV.`
        : `Measure a site again at half the current: it should change by less than 0.5 %. About ${formatSignificant(aim_mA, 2)} mA would give 10 mV.`,
      wafers: [],
      site: null,
      evidence: { medianVoltage_mV: voltage_mV, medianCurrent_mA: current_mA },
      source: 'SEMI MF1529-1104, Table 1 (5 to 20 mV; 0.5 % on halving the current)',
    },
  ]
}

/** Wafers that were measured at another voltage than the lot, outside what is wanted. */
function someWafers({ readings: { voltage_V }, wafers }: HealthInput): readonly HealthFinding[] {
  if (!voltage_V) return []
  const levels = wafers.map(({ id, rows }) => ({
    id,
    row: rows[0] ?? null,
    voltage_mV: 1e3 * medianOf(Array.from(rows.subarray(0, 400), (i) => Math.abs(voltage_V[i]))),
  }))
  const excessOf = (voltage_mV: number): number => Math.max(WANTED_mV.low / voltage_mV, voltage_mV / WANTED_mV.high)
  const off = levels.filter(({ voltage_mV }) => voltage_mV > 0 && excessOf(voltage_mV) > 1)
  if (off.length === 0) return []
  const worst = off.reduce((most, entry) => (excessOf(entry.voltage_mV) > excessOf(most.voltage_mV) ? entry : most))
  return [
    {
      check: 'current-level',
      severity: excessOf(worst.voltage_mV) > FAR ? 'look' : 'note',
      sentence: `${off.length === 1 ? `Wafer ${worst.id} was` : `${off.length} wafers were`} measured at a voltage outside 5 to 20 mV, unlike the lot: ${formatSignificant(worst.voltage_mV, 3)} mV on wafer ${worst.id}.`,
      nextStep: 'Check the current that was set there, and measure again at about 10 mV.',
      wafers: off.map(({ id }) => id),
      site: worst.row,
      evidence: { voltage_mV: worst.voltage_mV, wafers: off.length },
      source: 'SEMI MF1529-1104, Table 1 (5 to 20 mV)',
    },
  ]
} // prettier-ignore
