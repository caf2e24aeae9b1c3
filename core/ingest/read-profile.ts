/** A depth profile, as a measurement or a process simulation writes it: CSV with a column of depths and one of concentrations. */
import type { ProfileProblem } from '../problems/problem'
import { quote, quotedList } from '../problems/quote'
import { decodeText } from './decode-text'
import { decimalCode, explainNumber, parseNumber, type DecimalMark } from './parse-number'
import { profileColumns, type ProfileColumn } from './profile-header'
import type { InputFile } from './read-files'
import {
  decimalMarkOf, isPassedOver, MAX_TABLE_PROBLEMS, SEARCHED_ROWS, TABLE_DELIMITERS, type RowFault,
} from './small-table' // prettier-ignore
import { splitRows, type Rows } from './split-rows'

export interface DepthProfile {
  /** The file's name. */
  readonly file: string
  readonly bytes: number
  readonly sha256: string
  /** As the file has them. */
  readonly headers: { readonly depth: string; readonly concentration: string }
  /** From the surface down, rising. */
  readonly depth_um: Float64Array
  readonly concentration_cm3: Float64Array
}

export interface ReadProfile {
  /** null when there is any problem: a profile with holes is another profile. */
  readonly profile: DepthProfile | null
  readonly problems: readonly ProfileProblem[]
}

const MAX_BYTES = 5_000_000
const MAX_POINTS = 20_000
const LEAST_POINTS = 4

/** Lines that begin with # or % are comments. Nothing here throws for a bad file. */
export function readProfile({ name, bytes, sha256 }: InputFile): ReadProfile {
  const refused = (why: string): ReadProfile => ({
    profile: null,
    problems: [{ kind: 'bad-profile', file: name, why }],
  })
  if (bytes.length > MAX_BYTES) return refused(`it has ${bytes.length} bytes, more than ${MAX_BYTES}`)
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) return refused(`it is no text; it looks like ${decoded.looksLike}`)
  const table = findTable(decoded.text())
  if (typeof table === 'string') return refused(table)
  const { depth_um, concentration_cm3, faults } = readPoints(table)
  if (faults.length > 0) {
    return { profile: null, problems: faults.map((fault) => ({ kind: 'bad-profile', file: name, ...fault })) }
  }
  const { length } = depth_um
  if (length < LEAST_POINTS) return refused(`it has ${length} points, and needs at least ${LEAST_POINTS}`)
  if (length > MAX_POINTS) return refused(`it has ${length} points, more than ${MAX_POINTS}`)
  const headers = { depth: table.depth.header, concentration: table.concentration.header }
  const columns = {
    depth_um: Float64Array.from(depth_um),
    concentration_cm3: Float64Array.from(concentration_cm3),
  }
  return { profile: { file: name, bytes: bytes.length, sha256, headers, ...columns }, problems: [] }
}

interface Table {
  readonly rows: Rows
  /** Of the header. */
  readonly row: number
  readonly decimalMark: DecimalMark
  readonly depth: ProfileColumn
  readonly concentration: ProfileColumn
}

/** Or why there is none. */
function findTable(text: string): Table | string {
  let nearest = `no line names a depth and a concentration, such as depth_nm,concentration_cm3`
  for (const delimiter of TABLE_DELIMITERS) {
    const rows = splitRows(text, delimiter, 1)
    for (let row = 0; row < Math.min(rows.cells.length, SEARCHED_ROWS); row++) {
      if (isPassedOver(rows.cells[row])) continue
      const columns = profileColumns(rows.cells[row])
      if (typeof columns === 'string') nearest = columns
      else if (columns) return { rows, row, decimalMark: decimalMarkOf(rows, row, delimiter), ...columns }
    }
  }
  return nearest
}

interface Points {
  readonly depth_um: number[]
  readonly concentration_cm3: number[]
  readonly faults: RowFault[]
}

function readPoints({ rows, row, decimalMark, depth, concentration }: Table): Points {
  const points: Points = { depth_um: [], concentration_cm3: [], faults: [] }
  for (let at = row + 1; at < rows.cells.length && points.faults.length < MAX_TABLE_PROBLEMS; at++) {
    const cells = rows.cells[at]
    if (isPassedOver(cells)) continue
    const read = ({ at: column, shift }: ProfileColumn): number =>
      parseNumber(cells[column] ?? '', decimalCode(decimalMark), shift)
    const x_um = read(depth)
    const n_cm3 = read(concentration)
    const above_um = points.depth_um.length > 0 ? points.depth_um[points.depth_um.length - 1] : -1
    const why =
      whyNoNumber(x_um, cells, depth, decimalMark) ??
      whyNoNumber(n_cm3, cells, concentration, decimalMark) ??
      whyNoPoint(x_um, n_cm3, above_um)
    if (why !== null) points.faults.push({ line: rows.line(at), why })
    else {
      points.depth_um.push(x_um)
      points.concentration_cm3.push(n_cm3)
    }
  }
  return points
}

function whyNoNumber(value: number, cells: readonly string[], column: ProfileColumn, mark: DecimalMark): string | null {
  if (!Number.isNaN(value)) return null
  const cell = (cells[column.at] ?? '').trim()
  return `${quote(cell)} in column ${quotedList([column.header])} ${explainNumber(cell, mark)}`
}

function whyNoPoint(x_um: number, n_cm3: number, above_um: number): string | null {
  if (x_um < 0) return `its depth, ${x_um} um, lies above the surface`
  if (x_um > 1000) return `its depth, ${x_um} um, is more than 1000 um`
  if (!(x_um > above_um)) return `its depth, ${x_um} um, does not lie below the point before it, at ${above_um} um`
  if (!(n_cm3 > 0)) {
    return `its concentration, ${n_cm3} cm^-3, is not above 0, and between points its logarithm runs straight; leave such points out`
  }
  return n_cm3 > 1e24 ? `its concentration, ${n_cm3} cm^-3, is more than any solid has` : null
}
