import { describe, expect, it } from 'vitest'
import { COLUMN_IDS } from '../../../core/ingest/readings'
import { matchHeader } from '../../../core/ingest/match-header'

describe('matchHeader', () => {
  it.each(COLUMN_IDS)('the documented name %s wins over everything', (id) => {
    expect(matchHeader(id)).toMatchObject({ target: id, score: 100 })
  })

  it.each([
    ['V [mV]', 'voltage_V', 'mV'],
    ['I (uA)', 'current_A', 'uA'],
    ['I [\u00b5A]', 'current_A', 'uA'],
    ['I [\u03bcA]', 'current_A', 'uA'],
    ['I [Â\u00b5A]', 'current_A', 'uA'],
    ['U/mV', 'voltage_V', 'mV'],
    ['Current, A', 'current_A', 'A'],
    ['V- (mV)', 'voltage_rev_V', 'mV'],
    ['Vr', 'voltage_rev_V', undefined],
    ['Voltage (reverse) [mV]', 'voltage_rev_V', 'mV'],
    ['V (2-4) [mV]', 'voltage_b_V', 'mV'],
    ['I13', 'current_b_A', undefined],
    ['V_A', 'voltage_V', undefined],
    ['V_B', 'voltage_b_V', undefined],
    ['config B reverse voltage', 'voltage_rev_b_V', undefined],
    ['V/I', 'v_over_i_ohm', undefined],
    ['V/I B (mohm)', 'v_over_i_b_ohm', 'mohm'],
    ['V/I (A) (ohm)', 'v_over_i_ohm', 'ohm'],
    ['V/I (ohm) (B)', 'v_over_i_b_ohm', 'ohm'],
    ['R (V/A)', 'v_over_i_ohm', 'V/A'],
    ['R (ohm)', 'v_over_i_ohm', 'ohm'],
    ['R [ohm/sq]', 'sheet_resistance_ohm_sq', 'ohm/sq'],
    ['Rs_ohm/sq', 'sheet_resistance_ohm_sq', 'ohm/sq'],
    ['Rs (Ω/□)', 'sheet_resistance_ohm_sq', 'ohm/sq'],
    ['Sheet Resistance [kΩ/sq.]', 'sheet_resistance_ohm_sq', 'kohm/sq'],
    ['R_s (ohm/square)', 'sheet_resistance_ohm_sq', 'ohm/sq'],
    ['Rs (ohms per square)', 'sheet_resistance_ohm_sq', 'ohm/sq'],
    ['ρ (mΩ·cm)', 'resistivity_ohm_cm', 'mohm.cm'],
    ['Resistivity (Ohm-cm)', 'resistivity_ohm_cm', 'ohm.cm'],
    ['rho_ohm_m', 'resistivity_ohm_cm', 'ohm.m'],
    ['x_mm', 'x_mm', undefined],
    ['X, mm', 'x_mm', 'mm'],
    ['X Position (inch)', 'x_mm', 'in'],
    ['θ (rad)', 'theta_deg', 'rad'],
    ['Die X', 'die_x', undefined],
    ['Temp °C', 'temperature_C', 'C'],
    ['T [F]', 'temperature_C', 'F'],
    ['tempC', 'temperature_C', 'C'],
    ['Site #', 'site', undefined],
    ['WaferId', 'wafer', undefined],
    ['LOT NO.', 'lot', undefined],
  ])('%s is %s in %s', (header, target, unit) => {
    const match = matchHeader(header)
    expect(match?.target).toBe(target)
    expect(match?.unit?.id).toBe(unit)
  })

  it.each([
    'T',
    'Voltage offset',
    'Rs limit',
    'Rs std',
    'Thickness (um)',
    't (um)',
    'Time (s)',
    'Resistance',
    'Comment',
    '',
    'u_sheet_resistance_ohm_sq',
    'x'.repeat(1e5),
  ])('%j is none of ours', (header) => expect(matchHeader(header)).toBeNull())

  it('an unknown unit is carried along, not passed over', () => {
    expect(matchHeader('V [kV/m]')).toMatchObject({ target: 'voltage_V', unit: null, unknownUnit: 'kV/m' })
  })
})
