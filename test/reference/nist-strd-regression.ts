/**
 * NIST Statistical Reference Datasets (StRD), linear least squares: certified coefficients, their standard deviations,
 * the residual standard deviation and R squared, to 15 digits. The data stand in `nist/`, the value first, then the
 * predictors. `degree` is that of the polynomial in the one predictor; null takes the predictors as they are.
 * `digits` is how many must agree: the data are hard for methods, not for doubles.
 */
export interface CertifiedRegression {
  readonly set: string
  readonly degree: number | null
  readonly coefficients: readonly string[]
  readonly standardErrors: readonly string[]
  readonly residualStandardDeviation: string
  readonly rSquared: string
  readonly digits: number
}

export const STRD_REGRESSION: readonly CertifiedRegression[] = [
  {
    set: 'norris', degree: 1, digits: 13,
    coefficients: ['-0.262323073774029', '1.00211681802045'],
    standardErrors: ['0.232818234301152', '0.429796848199937E-03'],
    residualStandardDeviation: '0.884796396144373', rSquared: '0.999993745883712',
  },
  {
    set: 'pontius', degree: 2, digits: 13,
    coefficients: ['0.673565789473684E-03', '0.732059160401003E-06', '-0.316081871345029E-14'],
    standardErrors: ['0.107938612033077E-03', '0.157817399981659E-09', '0.486652849992036E-16'],
    residualStandardDeviation: '0.205177424076185E-03', rSquared: '0.999999900178537',
  },
  {
    set: 'longley', degree: null, digits: 13,
    coefficients: ['-3482258.63459582', '15.0618722713733', '-0.358191792925910E-01', '-2.02022980381683', '-1.03322686717359', '-0.511041056535807E-01', '1829.15146461355'],
    standardErrors: ['890420.383607373', '84.9149257747669', '0.334910077722432E-01', '0.488399681651699', '0.214274163161675', '0.226073200069370', '455.478499142212'],
    residualStandardDeviation: '304.854073561965', rSquared: '0.995479004577296',
  },
  {
    set: 'wampler5', degree: 5, digits: 13,
    coefficients: ['1', '1', '1', '1', '1', '1'],
    standardErrors: ['21523262.4678170', '23635517.3469681', '7793435.24331583', '1014755.07550350', '56456.6512170752', '1123.24854679312'],
    residualStandardDeviation: '23601450.2379268', rSquared: '0.224668921574940E-02',
  },
] // prettier-ignore
