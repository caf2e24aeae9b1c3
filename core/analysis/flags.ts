/** What can be said of a single site's reading. Bits, so that a site may carry several and a column costs 4 bytes a site. */
export interface SiteFlag {
  readonly id: string
  readonly bit: number
  /** Whether a site so flagged still counts in statistics and verdicts. */
  readonly counts: boolean
  readonly sentence: string
}

export const SITE_FLAGS = {
  inEdgeExclusion: {
    id: 'in-edge-exclusion',
    bit: 1 << 0,
    counts: false,
    sentence: 'lies in the edge exclusion and is shown but not judged',
  },
  pinOffWafer: {
    id: 'pin-off-wafer',
    bit: 1 << 1,
    counts: false,
    sentence: 'has a pin off the wafer: no correction factor exists',
  },
  thicknessNearEdge: {
    id: 'thickness-near-edge',
    bit: 1 << 2,
    counts: true,
    sentence:
      'is so near the edge for its thickness that the product of edge and thickness factors is off by more than 0.1 %',
  },
  dualNearEdge: {
    id: 'dual-near-edge',
    bit: 1 << 3,
    counts: true,
    sentence: 'is so near the edge that the dual-configuration relation is off by more than 0.1 %',
  },
  dualRatio: {
    id: 'dual-ratio',
    bit: 1 << 4,
    counts: true,
    sentence: 'has a ratio of configurations A and B outside 1.20 to 1.35',
  },
  forwardReverse: {
    id: 'forward-reverse',
    bit: 1 << 5,
    counts: true,
    sentence: 'has forward and reverse V/I that differ by more than 5 %',
  },
  temperatureRange: {
    id: 'temperature-range',
    bit: 1 << 6,
    counts: true,
    sentence: 'was measured outside 18 to 28 °C, where the temperature correction is not established',
  },
  temperatureCoefficientRange: {
    id: 'temperature-coefficient-range',
    bit: 1 << 7,
    counts: true,
    sentence:
      'has a resistivity outside the range of the temperature coefficient; the coefficient at the end of its range was used',
  },
  layerRange: {
    id: 'layer-range',
    bit: 1 << 8,
    counts: true,
    sentence: 'has a sheet resistance that the layer model cannot invert',
  },
  mobilityRange: {
    id: 'mobility-range',
    bit: 1 << 9,
    counts: true,
    sentence: 'has a concentration outside the range of its mobility model',
  },
  reported: {
    id: 'reported',
    bit: 1 << 10,
    counts: true,
    sentence: 'is taken as the file reports it, without correction',
  },
  temperatureMissing: {
    id: 'temperature-missing',
    bit: 1 << 12,
    counts: true,
    sentence: 'has no temperature of its own and was not corrected for it',
  },
  excludedByPerson: {
    id: 'excluded-by-person',
    bit: 1 << 13,
    counts: false,
    sentence: 'was excluded by a person and is shown but not judged',
  },
  outlier: {
    id: 'outlier',
    bit: 1 << 14,
    counts: true,
    sentence: 'is an outlier among the sites of its wafer (generalized ESD test) and counts all the same',
  },
  outlierLeftOut: {
    id: 'outlier-left-out',
    bit: 1 << 15,
    counts: false,
    sentence: 'is an outlier among the sites of its wafer and was left out, as the procedure says',
  },
  noReading: { id: 'no-reading', bit: 1 << 11, counts: false, sentence: 'has no usable reading' },
} as const satisfies Record<string, SiteFlag>

/** Bits of the flags whose sites have a value but are none of the verdict's business. */
export const NOT_JUDGED =
  SITE_FLAGS.inEdgeExclusion.bit | SITE_FLAGS.excludedByPerson.bit | SITE_FLAGS.outlierLeftOut.bit

/** `in-edge-exclusion|reported`, or nothing. */
export function flagNames(flags: number): string {
  return Object.values(SITE_FLAGS)
    .filter((flag) => flags & flag.bit)
    .map((flag) => flag.id)
    .join('|')
}
