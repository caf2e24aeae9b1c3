import { readFileSync, readdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { CELSIUS_ZERO_K, ELEMENTARY_CHARGE_C, STANDARD_TEMPERATURE_K } from '../../../core/units/constants'

describe('SI 9th brochure (2019) and CODATA 2018', () => {
  it('has the exact values', () => {
    expect(ELEMENTARY_CHARGE_C * 1e19).toBeCloseTo(1.602176634, 12)
    expect(CELSIUS_ZERO_K).toBe(273.15)
    expect(STANDARD_TEMPERATURE_K).toBeCloseTo(296.15, 12)
  })
})

it('is the only place in core where the digits of a physical constant stand', () => {
  const core = join(dirname(fileURLToPath(import.meta.url)), '../../../core')
  const sources = readdirSync(core, { recursive: true, encoding: 'utf8' }).filter((path) => path.endsWith('.ts'))
  const digits = /1\.602|1\.380|8\.617/
  const found = sources.filter((path) => digits.test(readFileSync(join(core, path), 'utf8')))
  expect(found.map((path) => path.replaceAll('\\', '/'))).toEqual(['units/constants.ts'])
})
