import { describe, expect, it } from 'vitest'
import { DOPANTS } from '../../../core/silicon/dopants'
import { prepareConcentrations } from '../../../core/silicon/concentration-table'
import { mobilityIds, mobilityModel } from '../../../core/silicon/mobility/registry'
import { concentration_cm3, concentrationSensitivity } from '../../../core/silicon/resistivity'

const cases = mobilityIds.flatMap((id) => DOPANTS.map((dopant) => [id, dopant] as const))

describe('the table against the one-value functions', () => {
  it.each(cases)('%s, %s: concentration within 1e-10, sensitivity within 1e-7', (id, dopant) => {
    const mobility = mobilityModel(id, { electrons_cm2_per_Vs: 1300, holes_cm2_per_Vs: 500 })
    const settings = { dopant, mobility, temperature_K: 296.15 }
    const prepared = prepareConcentrations(settings)
    const { min, max } = prepared.range_ohm_cm
    // A stride that has nothing to do with the table's.
    const count = 311
    const column = Float64Array.from({ length: count }, (_, i) =>
      Math.min(max, min * Math.pow(max / min, i / (count - 1))),
    )
    const into = { concentration_cm3: new Float64Array(count), sensitivity: new Float64Array(count) }
    prepared.fill(column, into)
    let [worst, worstSensitivity] = [0, 0]
    column.forEach((resistivity_ohm_cm, row) => {
      const query = { ...settings, resistivity_ohm_cm }
      worst = Math.max(worst, Math.abs((into.concentration_cm3[row] ?? NaN) / concentration_cm3(query) - 1))
      worstSensitivity = Math.max(
        worstSensitivity,
        Math.abs((into.sensitivity[row] ?? NaN) / concentrationSensitivity(query) - 1),
      )
    })
    expect(worst).toBeLessThan(1e-10)
    expect(worstSensitivity).toBeLessThan(1e-7)
  })
})

it('reads a compensated material as the one-value functions do', () => {
  const settings = {
    dopant: 'arsenic',
    mobility: mobilityModel('mf723'),
    temperature_K: 296.15,
    otherImpurity_cm3: 3e18,
  } as const
  const prepared = prepareConcentrations(settings)
  const column = Float64Array.of(0.1, 0.01, 6e-3, 2e-3, 5e-4)
  const into = { concentration_cm3: new Float64Array(5), sensitivity: new Float64Array(5) }
  prepared.fill(column, into)
  column.forEach((resistivity_ohm_cm, row) => {
    const query = { ...settings, resistivity_ohm_cm }
    expect((into.concentration_cm3[row] ?? NaN) / concentration_cm3(query)).toBeCloseTo(1, 9)
    expect(into.sensitivity[row]).toBeCloseTo(concentrationSensitivity(query), 6)
  })
})
