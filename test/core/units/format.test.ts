import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import {
  formatConcentration,
  formatFixed,
  formatMm,
  formatPercent,
  formatQuantity,
  formatScientific,
  formatSignificant,
  formatWithUncertainty,
  superscript,
} from '../../../core/units/format'

const THIN = '\u202f'

describe('plain numbers', () => {
  it('shows four significant digits and groups long ones', () => {
    expect(formatSignificant(92.1342, 4)).toBe('92.13')
    expect(formatSignificant(12340.6, 4)).toBe(`12${THIN}340`)
    expect(formatSignificant(1234.56, 4)).toBe('1235')
    expect(formatSignificant(0.0412345, 4)).toBe('0.04123')
    expect(formatSignificant(1234567, 4)).toBe(`1${THIN}235${THIN}000`)
  })

  it('never uses an exponent where none is wanted', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-9, max: 1e23, noNaN: true }), (value) => {
        expect(formatSignificant(value, 4)).not.toMatch(/e/i)
      }),
      { numRuns: 200 },
    )
  })

  it('carries rounding into the next digit', () => {
    expect(formatSignificant(99.996, 4)).toBe('100.0')
    expect(formatSignificant(0.99999, 4)).toBe('1.000')
    expect(formatScientific(9.996e18, 3)).toBe('1.00 × 10¹⁹')
  })

  it('writes a real minus sign, but no negative zero', () => {
    expect(formatMm(-63.5)).toBe('−63.5 mm')
    expect(formatMm(-0.04)).toBe('0.0 mm')
    expect(formatFixed(-12345.678, 1)).toBe(`−12${THIN}345.7`)
  })

  it('shows a dash for no value, without a unit', () => {
    expect(formatSignificant(NaN, 4)).toBe('–')
    expect(formatPercent(NaN)).toBe('–')
    expect(formatConcentration(NaN)).toBe('–')
    expect(formatWithUncertainty(NaN, 1, 'Ω/sq')).toBe('–')
  })

  it('reads back within the last shown digit', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e12, noNaN: true }), (value) => {
        const back = Number(formatSignificant(value, 4).replaceAll(THIN, ''))
        expect(Math.abs(back - value)).toBeLessThanOrEqual(value * 0.5001e-3)
      }),
      { numRuns: 200 },
    )
  })
})

describe('quantities', () => {
  it('writes concentrations and doses with superscripts', () => {
    expect(formatConcentration(1.43e19)).toBe('1.43 × 10¹⁹ cm⁻³')
    expect(formatConcentration(4.996e14, 'cm⁻²')).toBe('5.00 × 10¹⁴ cm⁻²')
    expect(superscript(-12)).toBe('⁻¹²')
  })

  it('lets the unit decide the form', () => {
    expect(formatQuantity(1.3749, '%')).toBe('1.37 %')
    expect(formatQuantity(2.5e-4, 'V')).toBe('2.500 × 10⁻⁴ V')
    expect(formatQuantity(0.0203, 'V')).toBe('0.02030 V')
    expect(formatQuantity(4.5324, '')).toBe('4.532')
    expect(formatQuantity(0, 'V')).toBe('0.000 V')
  })
})

describe('a value with its uncertainty (JCGM 100:2008, 7.2.6)', () => {
  it('shows two digits of the uncertainty and the value to the same place', () => {
    expect(formatWithUncertainty(92.1342, 0.2834, 'Ω/sq')).toBe('92.13 ± 0.28 Ω/sq')
    expect(formatWithUncertainty(92.1342, 0.0996, 'Ω/sq')).toBe('92.13 ± 0.10 Ω/sq')
    expect(formatWithUncertainty(12340.6, 123, 'Ω/sq')).toBe(`12${THIN}340 ± 120 Ω/sq`)
    expect(formatWithUncertainty(92.1342, 1.49, 'Ω/sq')).toBe('92.1 ± 1.5 Ω/sq')
  })

  // JCGM 100:2008, 7.2.2: the mass standard written as m = (100.021 47 ± 0.000 35) g.
  it('gives the digits of the example in JCGM 100, 7.2.2', () => {
    expect(formatWithUncertainty(100.02147, 0.00035, 'g')).toBe('100.02147 ± 0.00035 g')
  })

  it('brackets what a shared power of ten or a percent sign belongs to', () => {
    expect(formatWithUncertainty(1.43e19, 2.1e17, 'cm⁻³')).toBe('(1.430 ± 0.021) × 10¹⁹ cm⁻³')
    expect(formatWithUncertainty(22.4, 0.3, '°C')).toBe('(22.40 ± 0.30) °C')
  })

  it('leaves a value without uncertainty alone', () => {
    expect(formatWithUncertainty(92.1342, NaN, 'Ω/sq')).toBe('92.13 Ω/sq')
    expect(formatWithUncertainty(92.1342, 0, 'Ω/sq')).toBe('92.13 Ω/sq')
  })
})
