/**
 * Plausible lots as a prober measures them: what is true of each site, before anybody writes it down. Every electrical
 * quantity is a decimal number exactly, digits times a power of ten, so that a file may give it in any unit and the
 * test still knows which double is meant.
 */
import fc from 'fast-check'

/** digits x 10^power, digits whole; what the cell says in the base unit. */
export interface Decimal {
  readonly digits: number
  readonly power: number
}

export function valueOf({ digits, power }: Decimal): number {
  return Number(`${digits}e${power}`)
}

export interface MeasuredPair {
  readonly current: Decimal
  readonly voltage: Decimal
}

export interface MeasuredSite {
  readonly wafer: string
  readonly site: string
  readonly x_mm: Decimal
  readonly y_mm: Decimal
  /** Die indices, where the lot is described by them. */
  readonly dieX: number
  readonly dieY: number
  /** All positive; signs are the writer's affair. */
  readonly a: MeasuredPair
  readonly aReverse: MeasuredPair
  readonly b: MeasuredPair
  readonly bReverse: MeasuredPair
  readonly temperature: Decimal
}

export interface MeasuredLot {
  readonly lot: string
  readonly sites: readonly MeasuredSite[]
}

const AWKWARD_NAMES = [
  '=1+1',
  '+x',
  '@x',
  '-3',
  'say "so"',
  'a,b;c',
  'µ-Ω',
  "o'clock",
  'Ünit 7',
  "'=quoted",
  'two words',
]
const waferName = fc.oneof(
  { weight: 3, arbitrary: fc.integer({ min: 1, max: 25 }).map((slot) => String(slot).padStart(2, '0')) },
  { weight: 1, arbitrary: fc.constantFrom(...AWKWARD_NAMES.map((name) => `${name}`), 'W-07', 'monitor') },
)
const siteName = (number: number) =>
  fc.oneof(
    { weight: 5, arbitrary: fc.constant(String(number)) },
    { weight: 1, arbitrary: fc.constantFrom(...AWKWARD_NAMES).map((name) => `${name} ${number}`) },
  )

const noise = fc.integer({ min: -300, max: 300 })

/** A voltage near that of configuration A or B: 5 digits that scatter by up to 1.5 %. */
function pair(current: Decimal, voltage: Decimal, share: number, scatter: number): MeasuredPair {
  const digits = Math.max(1, Math.round(voltage.digits * share) + scatter)
  return { current, voltage: { digits, power: voltage.power } }
}

/** RB/RA of equal pins far from every edge. */
const B_SHARE = Math.log(3) / Math.log(4)

function sitesOf(wafer: string, current: Decimal, level: Decimal, count: number): fc.Arbitrary<MeasuredSite[]> {
  const site = fc.record({
    scatters: fc.tuple(noise, noise, noise, noise),
    temperature: fc.integer({ min: 1950, max: 2650 }),
  })
  return fc
    .tuple(
      fc.array(site, { minLength: count, maxLength: count }),
      ...Array.from({ length: count }, (_, k) => siteName(k + 1)),
    )
    .map(([scattered, ...names]) =>
      scattered.map(({ scatters, temperature }, k) => ({
        wafer,
        site: names[k],
        ...placeOf(k),
        a: pair(current, level, 1, scatters[0]),
        aReverse: pair(current, level, 1, scatters[1]),
        b: pair(current, level, B_SHARE, scatters[2]),
        bReverse: pair(current, level, B_SHARE, scatters[3]),
        temperature: { digits: temperature, power: -2 },
      })),
    )
}

/** The centre first, then rings of eight, each ring 9.5 mm farther out. */
function placeOf(k: number): Pick<MeasuredSite, 'x_mm' | 'y_mm' | 'dieX' | 'dieY'> {
  const ring = Math.ceil(k / 8)
  const [dx, dy] = [[1, 0], [0, 1], [-1, 0], [0, -1], [1, 1], [-1, 1], [-1, -1], [1, -1]][(k + 7) % 8]
  const at = (direction: number): Decimal => ({ digits: direction * ring * 95, power: -1 })
  return { x_mm: at(dx), y_mm: at(dy), dieX: dx * ring, dieY: dy * ring }
} // prettier-ignore

const wafers = fc.uniqueArray(waferName, { minLength: 1, maxLength: 4 })
/** 1 µA to 90 mA. */
const current = fc.record({ digits: fc.integer({ min: 10, max: 99 }), power: fc.integer({ min: -7, max: -3 }) })
/** Five digits, 10 µV to 1 V. */
const level = fc.record({ digits: fc.integer({ min: 20000, max: 95000 }), power: fc.integer({ min: -9, max: -5 }) })

export const measuredLots: fc.Arbitrary<MeasuredLot> = fc
  .record({
    wafers,
    current,
    level,
    count: fc.integer({ min: 5, max: 14 }),
    lot: fc.constantFrom('TB-0417', 'TB-0522', 'TB 0522/b'),
  })
  .chain(({ wafers, current, level, count, lot }) =>
    fc
      .tuple(...wafers.map((wafer) => sitesOf(wafer, current, level, count)))
      .map((sites) => ({ lot, sites: sites.flat() })),
  )
