/**
 * The words of the trade by which a header is known. A header matches a family if, its unit, modifiers and filler words
 * taken off, what is left is one of the family's phrases, whole: a header with a word not listed here ("voltage
 * offset", "Rs limit") is not matched, since a wrong match is worse than none. Common practice, no source.
 */
import type { Quantity } from '../units/unit-register'
import type { ColumnId } from './readings'

export interface Family {
  /** In words, for a person. */
  readonly title: string
  /** Which unit of the header fits; empty where no unit does. */
  readonly quantities: readonly Quantity[]
  /** The phrase and its weight. */
  readonly phrases: Readonly<Record<string, number>>
  /** Phrases that mean this family only with a unit of its own: "R" is one thing in ohm and another in ohm/sq. */
  readonly needUnit: readonly string[]
  readonly fillers: readonly string[]
  /** Which modifiers tell columns of the family apart. */
  readonly modifiers: 'none' | 'configuration' | 'configuration-and-direction'
  /** By configuration (A, B) and direction (forward, reverse). */
  readonly columns: readonly HeaderTarget[]
}

/** A documented column, or one that says how to read the others. */
export type HeaderTarget = ColumnId | 'date' | 'configuration' | 'direction'

export const FORWARD_WORDS: readonly string[] = ['fwd', 'forward', 'pos', 'positive', 'plus', 'f']
export const REVERSE_WORDS: readonly string[] = ['rev', 'reverse', 'reversed', 'neg', 'negative', 'minus', 'r']

const ELECTRICAL_FILLERS = [
  'measured', 'meas', 'probe', 'applied', 'source', 'sourced', 'force', 'forced', 'sense', 'sensed', 'drive', 'reading',
  'value', 'test', 'raw', 'avg', 'average', 'mean', 'site', 'config', 'configuration', 'cfg', 'conf', 'pin', 'pins', 'data',
] // prettier-ignore
const PLACE_FILLERS = [
  'position',
  'pos',
  'coordinate',
  'coord',
  'coords',
  'location',
  'loc',
  'site',
  'wafer',
  'point',
  'probe',
]
const NAME_FILLERS: readonly string[] = []

function plain(title: string, column: HeaderTarget, phrases: Readonly<Record<string, number>>): Family {
  return { title, quantities: [], phrases, needUnit: [], fillers: NAME_FILLERS, modifiers: 'none', columns: [column] }
}

function place(title: string, column: ColumnId, phrases: Readonly<Record<string, number>>): Family {
  const quantities: readonly Quantity[] = column === 'theta_deg' ? ['angle'] : ['length']
  return { title, quantities, phrases, needUnit: [], fillers: PLACE_FILLERS, modifiers: 'none', columns: [column] }
}

/** "wafer id" before "wafer no": where a file has both, the first is the name. */
function nameWords(word: string, weight: number): Record<string, number> {
  return {
    [word]: weight,
    [`${word} id`]: weight - 1,
    [`${word} name`]: weight - 2,
    [`${word} no`]: weight - 3,
    [`${word} nr`]: weight - 3,
    [`${word} number`]: weight - 3,
    [`${word} num`]: weight - 3,
    [`${word} code`]: weight - 3,
    [`${word} index`]: weight - 4,
  }
}

export const FAMILIES: readonly Family[] = [
  plain('lot', 'lot', { ...nameWords('lot', 80), ...nameWords('batch', 60) }),
  plain('wafer', 'wafer', { ...nameWords('wafer', 80), ...nameWords('wfr', 70), ...nameWords('substrate', 50) }),
  plain('slot', 'slot', {
    ...nameWords('slot', 80),
    ...nameWords('cassette slot', 75),
    ...nameWords('wafer slot', 75),
  }),
  plain('site', 'site', {
    ...nameWords('site', 80),
    ...nameWords('point', 70),
    ...nameWords('measurement', 60),
    ...nameWords('position', 50),
    ...nameWords('location', 50),
    pt: 60,
    no: 30,
    nr: 30,
  }),
  place('x position', 'x_mm', { x: 80 }),
  place('y position', 'y_mm', { y: 80 }),
  place('radius', 'r_mm', { radius: 80, radial: 70, r: 40 }),
  place('polar angle', 'theta_deg', { theta: 80, 'polar angle': 75, azimuth: 70, phi: 60, angle: 60, ang: 50 }),
  plain('die column', 'die_x', {
    'die x': 80,
    'x die': 80,
    'die col': 75,
    'die column': 75,
    'die index x': 75,
    'die x index': 75,
  }),
  plain('die row', 'die_y', { 'die y': 80, 'y die': 80, 'die row': 75, 'die index y': 75, 'die y index': 75 }),
  {
    title: 'current',
    quantities: ['current'],
    phrases: { current: 80, i: 70, curr: 70, amps: 60, amp: 60, ampere: 60, '': 30 },
    needUnit: [''],
    fillers: ELECTRICAL_FILLERS,
    modifiers: 'configuration-and-direction',
    columns: ['current_A', 'current_rev_A', 'current_b_A', 'current_rev_b_A'],
  },
  {
    title: 'voltage',
    quantities: ['voltage'],
    phrases: {
      voltage: 80,
      v: 70,
      volt: 70,
      volts: 70,
      'voltage drop': 60,
      potential: 50,
      'potential difference': 50,
      u: 50,
      '': 30,
    },
    needUnit: [''],
    fillers: ELECTRICAL_FILLERS,
    modifiers: 'configuration-and-direction',
    columns: ['voltage_V', 'voltage_rev_V', 'voltage_b_V', 'voltage_rev_b_V'],
  },
  {
    title: 'V/I',
    quantities: ['resistance'],
    phrases: { voveri: 80, 'voveri ratio': 78, 'ratio voveri': 78, 'v i ratio': 70, resistance: 60, r: 50, '': 20 },
    needUnit: ['resistance', 'r', ''],
    fillers: ELECTRICAL_FILLERS,
    modifiers: 'configuration',
    columns: ['v_over_i_ohm', 'v_over_i_b_ohm'],
  },
  {
    title: 'sheet resistance',
    quantities: ['sheet-resistance', 'resistance'],
    phrases: {
      'sheet resistance': 80, rs: 75, 'r s': 70, rsh: 75, 'r sh': 70, rsheet: 75, 'r sheet': 70, 'sheet res': 75, 'sheet r': 70,
      rsq: 70, 'r sq': 70, 'sheet rho': 60, 'ohms per square': 60, 'ohm per square': 60, resistance: 50, r: 45, res: 40, '': 30,
    }, // prettier-ignore
    needUnit: ['resistance', 'r', 'res', ''],
    fillers: ['measured', 'meas', 'reading', 'value', 'site', 'avg', 'average', 'mean'],
    modifiers: 'none',
    columns: ['sheet_resistance_ohm_sq'],
  },
  {
    title: 'resistivity',
    quantities: ['resistivity'],
    phrases: { resistivity: 80, rho: 75, 'specific resistance': 60, resistance: 50, r: 45, res: 50, '': 30 },
    needUnit: ['resistance', 'r', 'res', ''],
    fillers: ['measured', 'meas', 'reading', 'value', 'site', 'bulk', 'avg', 'average', 'mean'],
    modifiers: 'none',
    columns: ['resistivity_ohm_cm'],
  },
  {
    title: 'temperature',
    quantities: ['temperature'],
    phrases: {
      temperature: 80, temp: 75, 'wafer temperature': 79, 'wafer temp': 74, 'sample temperature': 78, 'sample temp': 73,
      'chuck temperature': 72, 'chuck temp': 68, 'stage temperature': 72, 'stage temp': 68, 'probe temperature': 60,
      'ambient temperature': 55, 'ambient temp': 52, 'room temperature': 55, 'room temp': 52, t: 50,
    }, // prettier-ignore
    needUnit: ['t'],
    fillers: ['measured', 'meas', 'reading', 'value', 'site'],
    modifiers: 'none',
    columns: ['temperature_C'],
  },
  plain('time', 'time', {
    time: 80, timestamp: 80, 'date time': 80, 'time stamp': 80, 'measured at': 70, 'measurement time': 70, 'meas time': 70,
    'test time': 60, 'measurement date time': 60,
  }), // prettier-ignore
  plain('date', 'date', { date: 80, 'measurement date': 70, 'meas date': 70, 'test date': 60 }),
  {
    ...plain('configuration', 'configuration', { config: 80, configuration: 80, cfg: 70, conf: 60 }),
    fillers: ['probe', 'pin', 'pins', 'current', 'measurement'],
  },
  {
    ...plain('direction', 'direction', { direction: 80, polarity: 80, dir: 60, sign: 50 }),
    fillers: ['current', 'probe', 'measurement'],
  },
]
