/** Which columns of a depth profile are depth and concentration, and in what units, from the header's cells. */
import { quote, quotedList } from '../problems/quote'
import { findUnit, plainText } from '../units/unit-register'

export interface ProfileColumn {
  readonly header: string
  /** Index of the cell. */
  readonly at: number
  /** Power of ten from the column's unit to um or cm^-3. */
  readonly shift: number
}

export interface ProfileColumns {
  readonly depth: ProfileColumn
  readonly concentration: ProfileColumn
}

interface NamedColumn {
  readonly header: string
  readonly at: number
  readonly unit: string
}

const DEPTH = /^(?:depth|x|z)(?![a-z])/
const CONCENTRATION =
  /^(?:(?:net|active|total|chemical|electrical|dopant|doping|carrier|boron|phosphorus|arsenic)[\s_]+)*(?:concentration|conc|density|doping|dopant|carriers?|boron|phosphorus|arsenic|n|b|p|as)(?![a-z])/

/** Null where the cells name no such columns; a sentence where they do but can't be used. */
export function profileColumns(cells: readonly string[]): ProfileColumns | string | null {
  const depths = named(cells, DEPTH)
  const concentrations = named(cells, CONCENTRATION)
  if (depths.length === 0 || concentrations.length === 0) return null
  if (depths.length > 1) return several('depth', depths)
  if (concentrations.length > 1) return several('concentration', concentrations)
  const depth = withShift(depths[0], depthShift(depths[0].unit), 'nm, um, mm or angstrom')
  const concentration = withShift(concentrations[0], densityShift(concentrations[0].unit), 'cm^-3 or m^-3')
  if (typeof depth === 'string') return depth
  return typeof concentration === 'string' ? concentration : { depth, concentration }
}

/** What follows the name, less brackets and separators, is the unit: `depth_um`, `Depth (nm)`, `N [cm^-3]`, `x / nm`. */
function named(cells: readonly string[], name: RegExp): NamedColumn[] {
  return cells.flatMap((cell, at) => {
    const text = plainText(cell)
    const found = name.exec(text.toLowerCase())
    if (!found) return []
    const unit = text
      .slice(found[0].length)
      .replace(/[()[\]{}<>]/g, ' ')
      .replace(/^[\s_,:|-]+(?=\S)/, '')
      .trim()
    return [{ header: cell.trim(), at, unit }]
  })
}

function several(what: string, columns: readonly NamedColumn[]): string {
  return `several columns could be the ${what}: ${quotedList(columns.map(({ header }) => header))}; leave one of them in`
}

function withShift({ header, at, unit }: NamedColumn, shift: number | null, known: string): ProfileColumn | string {
  if (shift !== null) return { header, at, shift }
  const what = unit === '' ? 'names no unit' : `has a unit that is not known here, ${quote(unit)}`
  return `the header ${quote(header)} ${what}; it is ${known}`
}

function depthShift(text: string): number | null {
  const spelling = text.replace(/^\//, '').trim()
  if (/^(?:Å|angstroms?)$/i.test(spelling)) return -4
  const unit = findUnit(spelling)
  // The base of a length is mm.
  return unit?.quantity === 'length' && unit.power10 !== null ? unit.power10 + 3 : null
}

function densityShift(text: string): number | null {
  const spelling = text.toLowerCase().replace(/[\s^*·⋅._]/g, '')
  const unit = /^\/?(?:1|atoms?|at)?\/?(c?)m-?3$/.exec(spelling)
  if (!unit) return null
  return unit[1] === 'c' ? 0 : -6
}
