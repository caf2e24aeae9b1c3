/** Whether the current suits the layer: too little voltage drowns in noise, too much current heats and injects. */
import { formatSignificant } from '../units/format'
import { medianOf, type HealthCheck, type HealthFinding, type HealthInput } from './finding'

/** SEMI MF1529-1104, Table 1 and 11: currents by sheet resistance, voltages of 7 to 15 mV wanted, equipment for 5 to 20 mV. */
const WANTED_mV = { low: 5, high: 20 } as const
/** So far outside the result itself is in doubt. Common practice, no source. */
const FAR = 5

export const currentLevel: HealthCheck = { id: 'current-level', title: 'Current and voltage', look }

function look({ readings, wafers }: HealthInput): readonly HealthFinding[] {
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
