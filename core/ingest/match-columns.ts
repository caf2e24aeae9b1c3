/** Which header of a row is which of our columns: by the procedure's own mapping, else by the best score. */
import { BASE_UNITS, baseUnit, findUnit, unitNames } from '../units/unit-register'
import type { Quantity, Unit } from '../units/unit-register'
import type { FileProblem } from '../problems/problem'
import { NUMBER_KINDS, isReadingColumn } from './column-kinds'
import type { HeaderTarget } from './header-words'
import { readHeader } from './header-name'
import { matchHeader } from './match-header'
import type { HeaderMatch } from './match-header'
import type { ReadOptions } from './read-options'
import { COLUMN_IDS } from './readings'
import type { ColumnId } from './readings'
import { readTextCell } from './text-cell'

export interface MatchedColumn {
  readonly target: HeaderTarget
  /** 0-based place in the row. */
  readonly at: number
  readonly header: string
  /** null for text and counts. */
  readonly unit: Unit | null
  readonly why: string
}

export interface MatchedColumns {
  readonly columns: readonly MatchedColumn[]
  readonly problem: FileProblem | null
}

interface Candidate {
  readonly at: number
  readonly header: string
  readonly match: HeaderMatch
}

export function matchColumns(file: string, headers: readonly string[], options: ReadOptions): MatchedColumns {
  const mapped = mapColumns(file, headers, options)
  if (mapped.problem) return mapped
  const taken = new Set(mapped.columns.map((column) => column.at))
  const byTarget = new Map<HeaderTarget, Candidate[]>()
  headers.forEach((header, at) => {
    const match = taken.has(at) ? null : matchHeader(header)
    if (match === null || mapped.columns.some((column) => column.target === match.target)) return
    byTarget.set(match.target, [...(byTarget.get(match.target) ?? []), { at, header, match }])
  })
  dropLoneAngle(byTarget, mapped.columns)
  dropLongForm(byTarget, mapped.columns)
  const columns = [...mapped.columns]
  for (const [target, candidates] of byTarget) {
    const chosen = choose(file, target, candidates)
    if ('kind' in chosen) return { columns: [], problem: chosen }
    columns.push(chosen)
  }
  const problem = missingPart(file, headers, new Set(columns.map((column) => column.target)))
  return { columns: columns.sort((a, b) => a.at - b.at), problem }
}

function mapColumns(file: string, headers: readonly string[], options: ReadOptions): MatchedColumns {
  const columns: MatchedColumn[] = []
  for (const target of COLUMN_IDS) {
    const wish = options.columns?.[target]
    if (wish === undefined) continue
    const name = typeof wish === 'string' ? wish : wish.header
    const places = placesOf(name, headers)
    if (places.length === 0) {
      return refuse({
        kind: 'missing-column',
        file,
        wanted: `"${name}" (for ${target})`,
        headers: headers.filter(Boolean),
      })
    }
    if (places.length > 1) {
      return refuse({
        kind: 'ambiguous-column',
        file,
        column: target,
        candidates: places.map((at) => candidateName(headers, at)),
      })
    }
    const unit = mappedUnit(file, target, headers[places[0]]!, typeof wish === 'string' ? undefined : wish.unit)
    if (unit !== null && 'kind' in unit) return refuse(unit)
    columns.push({ target, at: places[0], header: headers[places[0]]!, unit, why: 'given in the procedure' })
  }
  return { columns, problem: null }
}

function refuse(problem: FileProblem): MatchedColumns {
  return { columns: [], problem }
}

/** Where the header stands: letter for letter, else without regard to case and blanks. */
function placesOf(name: string, headers: readonly string[]): number[] {
  const fold = (text: string) => readTextCell(text).toLowerCase().replace(/\s+/g, ' ')
  const exact = headers.flatMap((header, at) => (header === name.trim() ? [at] : []))
  return exact.length > 0 ? exact : headers.flatMap((header, at) => (fold(header) === fold(name) ? [at] : []))
}

function mappedUnit(
  file: string,
  target: ColumnId,
  header: string,
  wish: string | undefined,
): Unit | null | FileProblem {
  const quantity = NUMBER_KINDS[target]?.quantity
  if (quantity == null) return null
  if (wish === undefined) {
    // The words of a mapped header may be anything, its unit still counts.
    const named = readHeader(header).find((reading) => reading.unit !== null && fits(reading.unit, quantity))
    return named?.unit ?? baseUnit(quantity)
  }
  const unit = findUnit(wish)
  if (unit && fits(unit, quantity)) return unit
  return { kind: 'unknown-unit', file, header, unit: wish, known: unitNames(quantity) }
}

/** A sheet resistance is often written in plain ohm, which is the same unit. */
function fits(unit: Unit, quantity: Quantity): boolean {
  return unit.quantity === quantity || (quantity === 'sheet-resistance' && unit.quantity === 'resistance')
}

/** "R" without unit is a radius only beside an angle, and an angle is a place only beside a radius. */
function dropLoneAngle(byTarget: Map<HeaderTarget, Candidate[]>, mapped: readonly MatchedColumn[]): void {
  const has = (target: HeaderTarget) => byTarget.has(target) || mapped.some((column) => column.target === target)
  const isBare = (byTarget.get('r_mm') ?? []).every(({ match }) => match.score < 50 && match.unit === null)
  if (mapped.some((column) => column.target === 'r_mm')) {
    byTarget.delete('x_mm')
    byTarget.delete('y_mm')
  }
  const hasPlane = has('x_mm') && has('y_mm')
  if (hasPlane || (!has('theta_deg') && isBare)) byTarget.delete('r_mm')
  if (hasPlane || !has('r_mm')) byTarget.delete('theta_deg')
}

/** Where each direction and configuration has columns of its own, a header of that name means something else. */
function dropLongForm(byTarget: Map<HeaderTarget, Candidate[]>, mapped: readonly MatchedColumn[]): void {
  const has = (target: HeaderTarget) => byTarget.has(target) || mapped.some((column) => column.target === target)
  if (has('voltage_rev_V')) byTarget.delete('direction')
  if (has('voltage_b_V') || has('v_over_i_b_ohm')) byTarget.delete('configuration')
}

function choose(file: string, target: HeaderTarget, candidates: readonly Candidate[]): MatchedColumn | FileProblem {
  const ranked = [...candidates].sort((a, b) => b.match.score - a.match.score)
  const [best] = ranked
  const ties = ranked.filter(({ match }) => match.score === best!.match.score)
  if (ties.length > 1) {
    return {
      kind: 'ambiguous-column',
      file,
      column: target,
      candidates: ties.map(({ header, at }) => `${header} (column ${at + 1})`),
    }
  }
  const { at, header, match } = best!
  const quantity = target in NUMBER_KINDS ? NUMBER_KINDS[target as ColumnId]!.quantity : null
  if (quantity !== null && match.unknownUnit !== null) {
    return { kind: 'unknown-unit', file, header, unit: match.unknownUnit, known: unitNames(quantity) }
  }
  const unit = quantity === null ? null : (match.unit ?? baseUnit(quantity))
  return { target, at, header, unit, why: whyOf(match, quantity, ranked.slice(1)) }
}

function whyOf(match: HeaderMatch, quantity: Quantity | null, losers: readonly Candidate[]): string {
  const parts = [match.why]
  if (quantity !== null && match.score < 100) {
    const isPlainOhm = quantity === 'sheet-resistance' && match.unit?.quantity === 'resistance'
    if (match.unit === null) parts.push(`no unit in the header, taken as ${BASE_UNITS[quantity]}`)
    else if (isPlainOhm) parts.push(`${match.unit.id} taken as ${match.unit.id}/sq`)
    else parts.push(`unit ${match.unit.id} from the header`)
  }
  if (losers.length > 0) parts.push(`preferred to ${losers.map(({ header }) => `"${header}"`).join(', ')}`)
  return parts.join('; ')
}

function candidateName(headers: readonly string[], at: number): string {
  return `${headers[at]} (column ${at + 1})`
}

/** What a row of readings can't do without, and half a position is none. */
function missingPart(file: string, headers: readonly string[], has: ReadonlySet<HeaderTarget>): FileProblem | null {
  const missing = (wanted: string): FileProblem => ({
    kind: 'missing-column',
    file,
    wanted,
    headers: headers.filter(Boolean),
  })
  const ready = ['v_over_i_ohm', 'sheet_resistance_ohm_sq', 'resistivity_ohm_cm'] as const
  if (!ready.some((target) => has.has(target)) && !(has.has('current_A') && has.has('voltage_V'))) {
    if (has.has('voltage_V')) return missing('current_A')
    if (has.has('current_A')) return missing('voltage_V')
    return missing('current_A and voltage_V, or v_over_i_ohm, sheet_resistance_ohm_sq or resistivity_ohm_cm')
  }
  for (const [one, other] of [
    ['x_mm', 'y_mm'],
    ['r_mm', 'theta_deg'],
    ['die_x', 'die_y'],
  ] as const) {
    if (has.has(one) !== has.has(other)) return missing(has.has(one) ? other : one)
  }
  const isLong = has.has('configuration') || has.has('direction')
  if (isLong && !has.has('site') && !has.has('x_mm') && !has.has('r_mm')) {
    return missing('site, or x_mm and y_mm (to put together the rows of one site)')
  }
  return null
}

/** Whether a row of cells can be a header of readings: how many of our columns it names, 0 if none that holds a reading. */
export function headerStrength(headers: readonly string[], options: ReadOptions): number {
  const targets = new Set<HeaderTarget>()
  for (const header of headers) {
    const match = matchHeader(header)
    if (match) targets.add(match.target)
  }
  for (const target of COLUMN_IDS) {
    const wish = options.columns?.[target]
    if (wish !== undefined && placesOf(typeof wish === 'string' ? wish : wish.header, headers).length > 0)
      targets.add(target)
  }
  const hasReading = [...targets].some(
    (target) => (COLUMN_IDS as readonly string[]).includes(target) && isReadingColumn(target as ColumnId),
  )
  return hasReading ? targets.size : 0
}
