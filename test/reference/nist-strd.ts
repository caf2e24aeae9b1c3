/**
 * NIST Statistical Reference Datasets (StRD), certified values to 15 digits: univariate summary statistics and one-way
 * analysis of variance. The data stand in `nist/`. `digits` is how many digits of the certified value double precision
 * allows at all: the decimal data themselves are rounded when read.
 */
import { readFileSync } from 'node:fs'

export interface CertifiedSummary {
  readonly set: string
  readonly count: number
  readonly mean: string
  readonly standardDeviation: string
  readonly digits: number
}

export const STRD_UNIVARIATE: readonly CertifiedSummary[] = [
  { set: 'lew', count: 200, mean: '-177.435000000000', standardDeviation: '277.332168044316', digits: 14.9 },
  { set: 'lottery', count: 218, mean: '518.958715596330', standardDeviation: '291.699727470969', digits: 14.9 },
  { set: 'mavro', count: 50, mean: '2.00185600000000', standardDeviation: '0.000429123454003053', digits: 13 },
  { set: 'michelso', count: 100, mean: '299.852400000000', standardDeviation: '0.0790105478190518', digits: 13.7 },
  { set: 'pidigits', count: 5000, mean: '4.53480000000000', standardDeviation: '2.86733906028871', digits: 14.9 },
  { set: 'numacc1', count: 3, mean: '10000002', standardDeviation: '1', digits: 15 },
  { set: 'numacc2', count: 1001, mean: '1.2', standardDeviation: '0.1', digits: 14.9 },
  { set: 'numacc3', count: 1001, mean: '1000000.2', standardDeviation: '0.1', digits: 9.4 },
  { set: 'numacc4', count: 1001, mean: '10000000.2', standardDeviation: '0.1', digits: 8.2 },
]

export interface CertifiedAnova {
  readonly set: string
  readonly dfBetween: number
  readonly dfWithin: number
  readonly ssBetween: number
  readonly ssWithin: number
  readonly f: number
  readonly rSquared: number
  readonly residualStandardDeviation: number
  readonly digits: number
}

export const STRD_ANOVA: readonly CertifiedAnova[] = [
  {
    set: 'sirstv', dfBetween: 4, dfWithin: 20, ssBetween: 5.11462616e-2, ssWithin: 2.1663656e-1,
    f: 1.18046237440255, rSquared: 1.90999039051129e-1, residualStandardDeviation: 1.04076068334656e-1, digits: 13,
  },
  ...smls('01', 180, 1.68, 1.8, 21, 4.82758620689655e-1, 14.9),
  ...smls('02', 1800, 16.08, 18, 201, 4.71830985915493e-1, 14.9),
  ...smls('03', 18000, 160.08, 180, 2001, 4.70712773465067e-1, 14.9),
  ...smls('04', 180, 1.68, 1.8, 21, 4.82758620689655e-1, 9.8),
  ...smls('05', 1800, 16.08, 18, 201, 4.71830985915493e-1, 9.8),
  ...smls('06', 18000, 160.08, 180, 2001, 4.70712773465067e-1, 9.8),
] // prettier-ignore

/** Of the constructed sets the residual standard deviation is 0.1 throughout. */
function smls(
  number: string,
  dfWithin: number,
  ssBetween: number,
  ssWithin: number,
  f: number,
  rSquared: number,
  digits: number,
): CertifiedAnova[] {
  return [
    { set: `smls${number}`, dfBetween: 8, dfWithin, ssBetween, ssWithin, f, rSquared, residualStandardDeviation: 0.1, digits },
  ] // prettier-ignore
}

/** The rows of a data file as decimal text, without its header. */
export function strdRows(file: string): string[][] {
  const text = readFileSync(new URL(`nist/${file}.csv`, import.meta.url), 'utf8')
  return text
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(','))
}

/** Digits that agree: -log10 of the relative error, at most 15. */
export function agreeingDigits(computed: number, certified: number): number {
  return computed === certified ? 15 : Math.min(15, -Math.log10(Math.abs(computed - certified) / Math.abs(certified)))
}
