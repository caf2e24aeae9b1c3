/** What one header may be taken for, with a score; choosing among the headers of a row is match-columns.ts. */
import type { Unit } from '../units/unit-register'
import { readHeader } from './header-name'
import type { HeaderReading } from './header-name'
import { FAMILIES, FORWARD_WORDS, REVERSE_WORDS } from './header-words'
import type { Family, HeaderTarget } from './header-words'
import { COLUMN_IDS } from './readings'

export interface HeaderMatch {
  readonly target: HeaderTarget
  readonly score: number
  /** null: the header names none. */
  readonly unit: Unit | null
  /** The header's unit, as written, where it isn't known. */
  readonly unknownUnit: string | null
  readonly why: string
}

/** A documented name wins over every other. */
const DOCUMENTED_SCORE = 100
const UNIT_BONUS = 5
const FILLER_COST = 2

const documented = new Map<string, HeaderTarget>(COLUMN_IDS.map((id) => [id.toLowerCase(), id]))

/** The best match of a header, or null. */
export function matchHeader(header: string): HeaderMatch | null {
  const exact = documented.get(header.trim().toLowerCase())
  if (exact !== undefined) {
    return { target: exact, score: DOCUMENTED_SCORE, unit: null, unknownUnit: null, why: 'the documented name' }
  }
  if (header.length > 80) return null
  let best: (HeaderMatch & { readonly isBracketUnit: boolean }) | null = null
  for (const reading of readHeader(header)) {
    // A unit in brackets is meant as one; a bracket that isn't understood counts only if nothing else explains the header.
    if (best !== null && (best.isBracketUnit || reading.bracket !== null)) break
    for (const family of FAMILIES) {
      const match = matchFamily(reading, family)
      if (match !== null && (best === null || match.score > best.score))
        best = { ...match, isBracketUnit: reading.isBracketUnit }
    }
  }
  return best
}

function matchFamily(reading: HeaderReading, family: Family): HeaderMatch | null {
  const { unit } = reading
  if (unit !== null && !family.quantities.includes(unit.quantity)) return null
  if (reading.bracket !== null && family.quantities.length === 0) return null
  // "mA" alone may be a header of currents, "A" alone may be anything.
  if (reading.words.length === 0 && (unit === null || unit.id.length < 2)) return null
  const parts = sortWords(reading.words, family)
  if (parts === null) return null
  const weight = Object.hasOwn(family.phrases, parts.phrase) ? family.phrases[parts.phrase] : undefined
  const hasOwnUnit = unit !== null && unit.quantity === family.quantities[0]
  const namesUnit = hasOwnUnit || /ohm|Ω/i.test(reading.bracket ?? '')
  if (weight === undefined || (family.needUnit.includes(parts.phrase) && !namesUnit)) return null
  return {
    target: family.columns[parts.column],
    score: weight + (unit === null ? 0 : UNIT_BONUS) - FILLER_COST * parts.fillers,
    unit,
    unknownUnit: reading.bracket,
    why:
      parts.phrase === ''
        ? `a unit of ${family.title} alone`
        : `"${parts.phrase.replace('voveri', 'V/I')}" is a usual word for ${family.title}`,
  }
}

interface WordParts {
  readonly phrase: string
  readonly fillers: number
  /** Index into the family's columns. */
  readonly column: number
}

function sortWords(words: readonly string[], family: Family): WordParts | null {
  const rest: string[] = []
  let fillers = 0
  let isReverse: boolean | null = null
  let isB: boolean | null = null
  for (const word of words) {
    const direction = family.modifiers === 'configuration-and-direction' ? directionOf(word) : null
    const configuration = family.modifiers === 'none' ? null : configurationOf(word)
    if (direction !== null) {
      if (isReverse !== null && isReverse !== direction) return null
      isReverse = direction
    } else if (configuration !== null) {
      if (isB !== null && isB !== configuration) return null
      isB = configuration
    } else if (family.fillers.includes(word)) fillers++
    else rest.push(word)
  }
  const configurationColumn = isB ? (family.modifiers === 'configuration' ? 1 : 2) : 0
  return { phrase: rest.join(' '), fillers, column: configurationColumn + (isReverse ? 1 : 0) }
}

/** true for reverse, false for forward, null for neither. */
export function directionOf(word: string): boolean | null {
  if (REVERSE_WORDS.includes(word)) return true
  return FORWARD_WORDS.includes(word) ? false : null
}

/** true for configuration B, false for A, null for neither. */
export function configurationOf(word: string): boolean | null {
  return word === 'b' ? true : word === 'a' ? false : null
}
