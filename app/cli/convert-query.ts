/** The options of `persquare convert`, as the question core answers. */
import type { ConversionQuery, ConversionStart } from '../../core/conversion/conversion'
import { kelvinOf, temperatureSeries_K } from '../../core/conversion/over-temperature'
import { THIN_FOR_EVERY_PROBE_UM } from '../../core/conversion/probed-sheet'
import type { Dopant } from '../../core/silicon/dopants'
import { DOPANTS } from '../../core/silicon/dopants'
import type { MobilityModel } from '../../core/silicon/mobility-model'
import { mobilityIds, mobilityModel, type MobilityId } from '../../core/silicon/mobility/registry'
import { STANDARD_TEMPERATURE_C } from '../../core/units/constants'
import { namedOptions, numberOf, refuse } from './convert-arguments'

const STARTS = ['v-over-i', 'sheet-resistance', 'resistivity', 'concentration', 'resistance'] as const
/** They say how V/I was taken, and have no meaning with another start. */
const OF_THE_PROBE = ['diameter-mm', 'spacing-mm', 'x-mm', 'y-mm', 'angle-deg', 'back'] as const

const OPTIONS = {
  'v-over-i': { type: 'string' },
  'sheet-resistance': { type: 'string' },
  resistivity: { type: 'string' },
  concentration: { type: 'string' },
  resistance: { type: 'string' },
  'thickness-um': { type: 'string' },
  dopant: { type: 'string' },
  mobility: { type: 'string' },
  'electron-mobility': { type: 'string' },
  'hole-mobility': { type: 'string' },
  'intrinsic-density': { type: 'string' },
  'temperature-c': { type: 'string' },
  temperatures: { type: 'string' },
  'diameter-mm': { type: 'string' },
  'spacing-mm': { type: 'string' },
  'x-mm': { type: 'string' },
  'y-mm': { type: 'string' },
  'angle-deg': { type: 'string' },
  back: { type: 'string' },
  'length-um': { type: 'string' },
  'width-um': { type: 'string' },
  json: { type: 'boolean' },
} as const

type Given = ReturnType<typeof namedOptions<typeof OPTIONS>>
type Quantity = Exclude<keyof typeof OPTIONS, 'json'>

export interface ConvertOptions {
  readonly query: ConversionQuery
  readonly output: 'text' | 'json'
}

/** @throws CoreError bad-argument; out-of-range */
export function convertOptions(args: readonly string[]): ConvertOptions {
  const given = namedOptions(args, OPTIONS)
  const query: ConversionQuery = {
    start: startOf(given),
    ...optional('thickness_um', numberIn(given, 'thickness-um')),
    ...optional('dopant', dopantOf(given)),
    mobility: mobilityOf(given),
    temperature_K: kelvinOf(numberIn(given, 'temperature-c') ?? STANDARD_TEMPERATURE_C),
    ...optional('intrinsicDensity_cm3', numberIn(given, 'intrinsic-density')),
    ...optional('resistor', resistorOf(given)),
    ...optional('temperatures_K', temperaturesOf(given)),
  }
  requireDopant(query)
  return { query, output: given.json ? 'json' : 'text' }
}

/** An absent option is an absent key. */
function optional<Key extends string, Value>(key: Key, value: Value | undefined): { readonly [K in Key]?: Value } {
  return value === undefined ? {} : ({ [key]: value } as { readonly [K in Key]?: Value })
}

function numberIn(given: Given, name: Quantity): number | undefined {
  const text = given[name]
  return text === undefined ? undefined : numberOf(name, text)
}

function startOf(given: Given): ConversionStart {
  const [from, second] = STARTS.filter((name) => given[name] !== undefined)
  const all = STARTS.map((name) => `--${name}`).join(', ')
  if (from === undefined) refuse('convert', `give the one value that is known, by one of ${all}`)
  if (second !== undefined) refuse(`--${second}`, `--${from} is given already; exactly one value is converted`)
  const value = numberOf(from, given[from] ?? '')
  if (from !== 'v-over-i') refuseProbe(given, from)
  switch (from) {
    case 'v-over-i':
      return { from, vOverI_ohm: value, place: placeOf(given) }
    case 'sheet-resistance':
      return { from, sheetResistance_ohm_sq: value }
    case 'resistivity':
      return { from, resistivity_ohm_cm: value }
    case 'concentration':
      return { from, concentration_cm3: value }
    case 'resistance':
      return { from, resistance_ohm: value }
  }
}

function refuseProbe(given: Given, from: string): void {
  const idle = OF_THE_PROBE.find((name) => given[name] !== undefined)
  if (idle !== undefined) refuse(`--${idle}`, `it says how V/I was taken, and --${from} is not V/I`)
}

function placeOf(given: Given) {
  const diameter_mm = numberIn(given, 'diameter-mm')
  const spacing_mm = numberIn(given, 'spacing-mm')
  const idle = (['x-mm', 'y-mm', 'angle-deg'] as const).find((name) => given[name] !== undefined)
  if (diameter_mm === undefined && idle !== undefined) {
    refuse(`--${idle}`, 'a place matters only on a wafer of known size; give --diameter-mm')
  }
  const thickness_um = numberIn(given, 'thickness-um')
  const isNeeded = diameter_mm !== undefined || (thickness_um !== undefined && thickness_um > THIN_FOR_EVERY_PROBE_UM)
  if (isNeeded && spacing_mm === undefined) {
    refuse('--spacing-mm', 'give the pin spacing: the corrections for edge and thickness are counted in it')
  }
  const back = given.back ?? 'insulating'
  if (back !== 'insulating' && back !== 'conducting') refuse('--back', `it is insulating or conducting, not "${back}"`)
  if (given.back !== undefined && given['thickness-um'] === undefined) {
    refuse('--back', 'it matters only to the thickness factor; give --thickness-um')
  }
  return {
    ...optional('diameter_mm', diameter_mm),
    ...optional('spacing_mm', spacing_mm),
    x_mm: numberIn(given, 'x-mm') ?? 0,
    y_mm: numberIn(given, 'y-mm') ?? 0,
    angle_deg: numberIn(given, 'angle-deg') ?? 0,
    back,
  } as const
}

function dopantOf({ dopant }: Given): Dopant | undefined {
  if (dopant === undefined) return undefined
  return DOPANTS.find((known) => known === dopant) ?? refuse('--dopant', `"${dopant}" is none of ${DOPANTS.join(', ')}`)
}

/** Two mobilities are the model `constant`, named or not. */
function mobilityOf(given: Given): MobilityModel {
  const electrons_cm2_per_Vs = numberIn(given, 'electron-mobility')
  const holes_cm2_per_Vs = numberIn(given, 'hole-mobility')
  const isAnyGiven = electrons_cm2_per_Vs !== undefined || holes_cm2_per_Vs !== undefined
  const id = given.mobility ?? (isAnyGiven ? 'constant' : 'masetti')
  if (!isMobility(id)) return refuse('--mobility', `"${id}" is none of ${mobilityIds.join(', ')}`)
  if (id !== 'constant') {
    if (isAnyGiven) refuse('--mobility', `${id} has mobilities of its own; numbers are for --mobility constant`)
    return mobilityModel(id)
  }
  if (electrons_cm2_per_Vs === undefined || holes_cm2_per_Vs === undefined) {
    return refuse('--mobility', 'constant needs two numbers, --electron-mobility and --hole-mobility, in cm^2/(V s)')
  }
  const model = mobilityModel(id, { electrons_cm2_per_Vs, holes_cm2_per_Vs })
  return { ...model, source: 'the two mobilities given' }
}

function isMobility(id: string): id is MobilityId {
  return (mobilityIds as readonly string[]).includes(id)
}

function resistorOf(given: Given) {
  const length_um = numberIn(given, 'length-um')
  const width_um = numberIn(given, 'width-um')
  if (length_um !== undefined && width_um !== undefined) return { length_um, width_um }
  if (length_um !== undefined) refuse('--length-um', 'a resistor has a width too; give --width-um')
  if (width_um !== undefined) refuse('--width-um', 'a resistor has a length too; give --length-um')
  if (given.resistance !== undefined) refuse('--resistance', "give the resistor's --length-um and --width-um")
  return undefined
}

function temperaturesOf({ temperatures }: Given): readonly number[] | undefined {
  if (temperatures === undefined) return undefined
  const parts = temperatures.split(',')
  if (parts.length !== 3) refuse('--temperatures', 'it is LOW,HIGH,STEP in degrees Celsius, such as -50,150,25')
  const [low_C, high_C, step_C] = parts.map((part) => numberOf('temperatures', part.trim()))
  return temperatureSeries_K({ low_C, high_C, step_C })
}

function requireDopant({ start, dopant }: ConversionQuery): void {
  if (start.from !== 'concentration' || start.concentration_cm3 === 0 || dopant !== undefined) return
  refuse('--dopant', `give one of ${DOPANTS.join(', ')}: the mobility depends on it`)
}
