import { describe, expect, it } from 'vitest'
import { BASE_UNITS, baseUnit, findUnit, toBase, unitNames, units } from '../../../core/units/unit-register'
import type { Quantity } from '../../../core/units/unit-register'

function inBase(value: number, spelling: string): number {
  return toBase(value, findUnit(spelling)!)
}

describe('the unit register', () => {
  it('every unit is found by its own id, and the base of each quantity is 1', () => {
    for (const unit of units) expect(findUnit(unit.id)).toBe(unit)
    for (const quantity of Object.keys(BASE_UNITS) as Quantity[]) {
      expect(toBase(1, baseUnit(quantity))).toBe(1)
      expect(unitNames(quantity)).toContain(BASE_UNITS[quantity])
    }
  })

  it.each([
    ['nV', 1, 1e-9],
    ['µV', 1, 1e-6],
    ['mA', 3.51, 0.00351],
    ['um', 25, 0.025],
    ['cm', 1, 10],
    ['in', 1, 25.4],
    ['mil', 1000, 25.4],
    ['kΩ', 1, 1000],
    ['mΩ/□', 1, 0.001],
    ['Ω·m', 1, 100],
    ['µΩ·cm', 1, 1e-6],
    ['K', 296.15, 23],
    ['°F', 32, 0],
    ['°F', 212, 100],
    ['rad', Math.PI, 180],
  ])('%s: %d is %d of the base unit', (spelling, value, base) => expect(inBase(value, spelling)).toBeCloseTo(base, 11))

  it.each(['ohm/sq', 'Ω/□', 'Ohms/square', 'ohm per sq', 'ohm_sq', 'Ω/sq.', 'OHM/SQ', 'ohms per square'])(
    '%s',
    (spelling) => {
      expect(findUnit(spelling)?.id).toBe('ohm/sq')
    },
  )

  it('milli and mega are told by the capital letter, and not guessed where all are capitals', () => {
    expect(findUnit('mohm')?.scale).toBe(1e-3)
    expect(findUnit('Mohm')?.scale).toBe(1e6)
    expect(findUnit('MOhm')?.scale).toBe(1e6)
    expect(findUnit('MOHM')).toBeNull()
    expect(findUnit('MΩ/□')?.id).toBe('Mohm/sq')
  })

  it.each(['', ' ', 'kV/m', 'furlong', 'ohm/sq/sq', 'ohm.mm', '%'])('%j is no unit we know', (spelling) =>
    expect(findUnit(spelling)).toBeNull(),
  )
})
