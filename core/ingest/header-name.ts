/** A header taken apart: its words, and the unit it names, in every way that could be meant. */
import { findUnit, plainText } from '../units/unit-register'
import type { Unit } from '../units/unit-register'

export interface HeaderReading {
  readonly words: readonly string[]
  /** null: the header names no unit. */
  readonly unit: Unit | null
  readonly isBracketUnit: boolean
  /** Text in brackets that is neither a unit nor words of the trade, once `words` are known not to need it. */
  readonly bracket: string | null
}

/** Words run together, as they often are in a header of few letters. A map: "constructor" may be a header, too. */
const RUN_TOGETHER = new Map(Object.entries({
  vf: 'v fwd', vr: 'v rev', if: 'i fwd', ir: 'i rev', va: 'v a', vb: 'v b', ia: 'i a', ib: 'i b', ra: 'r a', rb: 'r b',
  uf: 'u fwd', ur: 'u rev', ua: 'u a', ub: 'u b',
  vfwd: 'v fwd', vrev: 'v rev', ifwd: 'i fwd', irev: 'i rev', vpos: 'v fwd', vneg: 'v rev', ipos: 'i fwd', ineg: 'i rev',
  v23: 'v a', v24: 'v b', i14: 'i a', i13: 'i b', vab: 'v b', sheetresistance: 'sheet resistance', sheetrho: 'sheet rho',
  dieno: 'die no', diex: 'die x', diey: 'die y', xdie: 'die x', ydie: 'die y', xpos: 'x', ypos: 'y', posx: 'x', posy: 'y',
  xcoord: 'x', ycoord: 'y', xloc: 'x', yloc: 'y', waferid: 'wafer id', waferno: 'wafer no', wafernumber: 'wafer no', lotid: 'lot id',
  lotno: 'lot no', lotnumber: 'lot no', siteno: 'site no', siteid: 'site id', sitenumber: 'site no', slotno: 'slot no',
  datetime: 'date time', timestamp: 'timestamp',
})) // prettier-ignore

/** Pin pairs: SEMI MF1529 has the current on 1-4 and the voltage on 2-3 in A, the current on 1-3 and the voltage on 2-4 in B. */
const PIN_PAIRS: ReadonlyMap<string, string> = new Map(Object.entries({ '14': 'a', '23': 'a', '13': 'b', '24': 'b' }))

const BRACKETS = /\(([^()]*)\)|\[([^[\]]*)\]|\{([^{}]*)\}|<([^<>]*)>/g
const SEPARATORS = /[\s_,;:/\\.·*|=-]+/

/** The ways to read a header, the likeliest first. */
export function readHeader(header: string): readonly HeaderReading[] {
  const text = spellOut(plainText(header))
  const brackets = [...text.matchAll(BRACKETS)].map((match) => match.slice(1).find((part) => part !== undefined) ?? '')
  const outside = text.replace(BRACKETS, ' ')
  const readings: HeaderReading[] = []
  // "V/I (A) (ohm)": which of two units is the unit and which a name, the words will tell. The last is the likelier.
  for (let at = brackets.length - 1; at >= 0; at--) {
    const unit = findUnit(brackets[at])
    if (unit === null) continue
    const rest = brackets.filter((_, other) => other !== at).join(' ')
    readings.push({ words: wordsOf(`${outside} ${rest}`), unit, isBracketUnit: true, bracket: null })
  }
  if (readings.length === 0) readings.push(...suffixReadings(tokensOf(`${brackets.join(' ')} ${outside}`)))
  readings.push({ words: wordsOf(`${outside} ${brackets.join(' ')}`), unit: null, isBracketUnit: false, bracket: null })
  if (brackets.length > 0)
    readings.push({ words: wordsOf(outside), unit: null, isBracketUnit: false, bracket: brackets.join(' ') })
  return readings
}

/** A unit may be the last one, two or three tokens: `x_mm`, `rho_ohm_cm`, `Rs ohm per sq`; the longest first. */
function suffixReadings(tokens: readonly string[]): HeaderReading[] {
  const readings: HeaderReading[] = []
  for (let size = Math.min(4, tokens.length); size >= 1; size--) {
    const unit = findUnit(tokens.slice(-size).join(' '))
    if (unit)
      readings.push({ words: wordsOf(tokens.slice(0, -size).join(' ')), unit, isBracketUnit: false, bracket: null })
  }
  return readings
}

/** Signs that carry meaning to words, before the separators take them. */
function spellOut(text: string): string {
  return text
    .replace(/\b([VU])\s*\/\s*I\b/gi, ' voveri ')
    .replace(/\bV[\s_]over[\s_]I/gi, ' voveri ')
    .replace(
      /([A-Za-z])\s*[([]\s*([+-])\s*[)\]]/g,
      (_, letter: string, sign: string) => `${letter} ${sign === '+' ? 'fwd' : 'rev'} `,
    )
    .replace(
      /\b([VIU])([+-])(?=$|[\s_([{,])/gi,
      (_, letter: string, sign: string) => `${letter} ${sign === '+' ? 'fwd' : 'rev'} `,
    )
    .replace(/ρ/g, ' rho ')
    .replace(/[θϑ]/g, ' theta ')
    .replace(/[φϕ]/g, ' phi ')
    .replace(/#|№/g, ' no ')
}

function tokensOf(text: string): string[] {
  return text
    .split(SEPARATORS)
    .filter((token) => token !== '')
    .flatMap((token) => (token.length > 3 ? token.split(/(?<=[a-z])(?=[A-Z])/) : [token]))
}

function wordsOf(text: string): string[] {
  const words = tokensOf(text).flatMap((token) =>
    (RUN_TOGETHER.get(token.toLowerCase()) ?? token.toLowerCase()).split(' '),
  )
  const joined: string[] = []
  for (let at = 0; at < words.length; at++) {
    const pair = PIN_PAIRS.get(`${words[at]}${words[at + 1] ?? ''}`) ?? PIN_PAIRS.get(words[at])
    if (pair === undefined) joined.push(words[at])
    else {
      joined.push(pair)
      if (words[at].length === 1) at++
    }
  }
  return joined
}
