/**
 * A lot's readings as typed columns, one entry a site and reading. Every quantity has one unit here; conversion
 * happened once, when the file was read. A column the file doesn't have is null; a cell it left empty is NaN.
 */
export interface Readings {
  /** Lot name: from the `lot` column or the preamble, else the first file's name without its ending. */
  readonly lot: string
  readonly files: readonly SourceFile[]
  /** In order of first appearance. */
  readonly wafers: readonly WaferLabel[]
  readonly count: number

  /** Index into `wafers`. */
  readonly wafer: Uint32Array
  /** Index into `siteNames`; sites are numbered 1, 2, 3... within a wafer where the file has no site column. */
  readonly site: Uint32Array
  readonly siteNames: readonly string[]
  /** Index into `files`, and the 1-based line the row began on. */
  readonly file: Uint16Array
  readonly line: Uint32Array

  /** null when the file has no positions at all: then geometry is that of the infinite sheet, and said so. */
  readonly x_mm: Float64Array | null
  readonly y_mm: Float64Array | null
  readonly dieX: Float64Array | null
  readonly dieY: Float64Array | null

  /** Configuration A: current through the outer pins 1-4, voltage on 2-3. Forward polarity. */
  readonly current_A: Float64Array | null
  readonly voltage_V: Float64Array | null
  readonly currentReverse_A: Float64Array | null
  readonly voltageReverse_V: Float64Array | null
  /** Configuration B: current through 1-3, voltage on 2-4 (SEMI MF1529). */
  readonly currentB_A: Float64Array | null
  readonly voltageB_V: Float64Array | null
  readonly currentReverseB_A: Float64Array | null
  readonly voltageReverseB_V: Float64Array | null

  readonly temperature_C: Float64Array | null
  readonly vOverI_ohm: Float64Array | null
  readonly vOverIB_ohm: Float64Array | null
  readonly sheetResistance_ohm_sq: Float64Array | null
  readonly resistivity_ohm_cm: Float64Array | null
  /** Milliseconds since 1970-01-01T00:00Z. A time without a zone is taken as UTC, and a note says so. */
  readonly time_ms: Float64Array | null
}

export interface WaferLabel {
  readonly id: string
  /** NaN where no slot is given and the wafer's name is no plain number. */
  readonly slot: number
  /** Rows of this wafer that could not be used; a wafer may have no others. */
  readonly rejectedRows: number
}

export interface SourceFile {
  readonly name: string
  readonly bytes: number
  /** Hex digest, computed by whoever read the file; core has no crypto. */
  readonly sha256: string
  readonly dialect: { readonly encoding: string; readonly delimiter: string; readonly decimalMark: '.' | ',' }
  readonly preamble: readonly { readonly key: string; readonly value: string }[]
  readonly matches: readonly ColumnMatch[]
  readonly ignoredHeaders: readonly string[]
  readonly rows: number
  readonly rejectedRows: number
}

/** What a header was taken for, and why, in words a technician can check. */
export interface ColumnMatch {
  readonly header: string
  /** 1-based position in the file. */
  readonly position: number
  readonly column: ColumnId
  readonly unit: string
  readonly why: string
}

/** The columns we document, by the names a file of our own uses; `r_mm`, `theta_deg` become x and y at ingest. */
export const COLUMN_IDS = [
  'lot', 'wafer', 'slot', 'site', 'x_mm', 'y_mm', 'r_mm', 'theta_deg', 'die_x', 'die_y',
  'current_A', 'voltage_V', 'current_rev_A', 'voltage_rev_V',
  'current_b_A', 'voltage_b_V', 'current_rev_b_A', 'voltage_rev_b_V',
  'temperature_C', 'v_over_i_ohm', 'v_over_i_b_ohm', 'sheet_resistance_ohm_sq', 'resistivity_ohm_cm', 'time',
] as const // prettier-ignore
export type ColumnId = (typeof COLUMN_IDS)[number]
