/** Every key of a procedure, with its meaning, unit, range and default, for the report's pages and the manual. */
import { allowedWords, unitOf } from './allowed'
import { knownKeys, optionsOf, procedureShape } from './key-shape'
import type { KeyPath, KeyShape } from './key-shape'

export interface ProcedureKey {
  /** Dotted: `layer.background.dopant`. */
  readonly key: string
  readonly meaning: string
  readonly unit: string
  readonly allowed: string
  /** As JSON; null where the key is needed or simply absent by default. */
  readonly default: string | null
  /** The layer kinds that have this key; empty outside `layer`. */
  readonly layerKinds: readonly string[]
}

/** In the order of the schema. */
export function procedureKeys(): readonly ProcedureKey[] {
  const found = new Map<string, ProcedureKey>()
  for (const { path, shape, layerKind } of leaves([], procedureShape, null)) {
    const key = path.join('.')
    const before = found.get(key)
    const layerKinds = [...(before?.layerKinds ?? []), ...(layerKind === null ? [] : [layerKind])]
    found.set(key, {
      key,
      meaning: meaningOf(key),
      unit: unitOf(path),
      allowed:
        key === 'layer.kind' ? layerKinds.map((kind) => JSON.stringify(kind)).join(', ') : allowedWords(shape, path),
      default: shape.default === undefined ? null : JSON.stringify(shape.default),
      layerKinds,
    })
  }
  return [...found.values()]
}

let paths: readonly string[] | null = null
export function keyPaths(): readonly string[] {
  return (paths ??= procedureKeys().map(({ key }) => key))
}

interface Leaf {
  readonly path: KeyPath
  readonly shape: KeyShape
  readonly layerKind: string | null
}

function leaves(path: KeyPath, shape: KeyShape, layerKind: string | null): readonly Leaf[] {
  const kinds = optionsOf(shape)?.filter((option) => option.properties?.['kind'])
  if (kinds && kinds.length > 0) {
    return kinds.flatMap((kind) => leaves(path, kind, String(kind.properties?.['kind']?.const)))
  }
  if (!shape.properties) return [{ path, shape, layerKind }]
  return knownKeys(shape).flatMap((key) => leaves([...path, key], shape.properties![key], layerKind))
}

const LIMIT_MEANINGS = (what: string, on: string): Record<string, string> => ({
  [`limits.${on}.target`]: `wanted ${what}; maps of the deviation are centred on it`,
  [`limits.${on}.lower`]: `lowest ${what} in spec`,
  [`limits.${on}.upper`]: `highest ${what} in spec`,
})

const MEANINGS: Readonly<Record<string, string>> = {
  format: 'edition of the format',
  title: 'what the procedure is for',
  quantity: 'what is judged and mapped',
  'wafer.shape': 'outline of what is probed',
  'wafer.diameterMm': 'diameter of the disc; without it the sheet counts as endless',
  'wafer.widthMm': 'width of the rectangle, along x',
  'wafer.heightMm': 'height of the rectangle, along y',
  'wafer.thicknessUm': 'wafer thickness',
  'wafer.fiducial': 'mark at the bottom of the disc',
  'wafer.flatLengthMm': 'length of the primary flat',
  'wafer.edgeExclusionMm': 'width of the ring at the edge that is not judged',
  'wafer.back': 'what the wafer lies on, where the layer conducts through it',
  'probe.spacingMm': 'nominal distance between neighbouring pins',
  'probe.pinSpacingsMm': 'the three measured distances between neighbouring pins',
  'probe.orientation': 'direction of the pin line: an angle from +x, along the radius or across it',
  'probe.technique': 'one pin configuration or both, A and B',
  'layer.kind': 'what the sheet resistance is turned into',
  'layer.dopant': 'dopant of the layer or of the bulk',
  'layer.mobility': 'mobility model',
  'layer.constantMobility.electronsCm2Vs': 'electron mobility of the model "constant"',
  'layer.constantMobility.holesCm2Vs': 'hole mobility of the model "constant"',
  'layer.profile': 'how the dopant falls off with depth',
  'layer.depthUm': 'junction depth, where the profile has come down to the background',
  'layer.diffusionLengthUm':
    'in place of the junction depth, which then follows: √(D t) of a gaussian or erfc profile, decay length of an exponential one',
  'layer.profileFile': 'CSV of depths and concentrations that gives the shape of a profile "tabulated"',
  'layer.background.dopant': 'dopant of the wafer under the layer',
  'layer.background.concentrationCm3': 'its concentration',
  'layer.rangeUm': 'depth of the peak of an implant',
  'layer.straggleUm': 'standard deviation of the implant in depth',
  'layer.resistivityOhmCm': 'known resistivity of a film: gives its thickness',
  'layer.thicknessUm': 'known thickness of a film: gives its resistivity',
  'temperature.referenceC': 'temperature that results are reported at',
  'temperature.measuredC': 'temperature of the measurement, where the readings carry none',
  'temperature.coefficientPercentPerC': 'temperature coefficient of the resistance at the reference temperature',
  ...LIMIT_MEANINGS('sheet resistance of a site', 'sheetResistanceOhmSq'),
  ...LIMIT_MEANINGS('mean sheet resistance of a wafer', 'waferMeanOhmSq'),
  ...LIMIT_MEANINGS('resistivity of a site', 'resistivityOhmCm'),
  ...LIMIT_MEANINGS('mean resistivity of a wafer', 'waferMeanOhmCm'),
  'limits.uniformityPercent.upper': 'greatest non-uniformity of a wafer in spec',
  'limits.uniformityPercent.definition': 'formula of the non-uniformity',
  'limits.allowedSitesOut': 'how many sites of a wafer may lie outside the site limits before the wafer does',
  'acceptance.rule':
    'how uncertainty enters a verdict: not at all, inside a guard band, outside one, or by the risk of a false acceptance',
  'acceptance.guardFactor': 'width of the guard band over U = 2u, of the rules "stringent" and "relaxed"',
  'acceptance.maximumFalseAcceptRisk':
    'of the rule "risk": how probable it may be that an accepted value truly lies outside its limits',
  'acceptance.process.mean': 'mean of what is made, for the risks of a lot; from the lot itself without it',
  'acceptance.process.standardDeviation': 'standard deviation of the true values of what is made',
  'statistics.confidence': 'level of every confidence interval',
  'statistics.outliers.alpha': 'chance of finding an outlier on a wafer that has none',
  'statistics.outliers.leaveOut':
    'whether outliers are left out of statistics and verdicts; they are flagged either way',
  'dieGrid.pitchXMm': 'die width',
  'dieGrid.pitchYMm': 'die height',
  'dieGrid.offsetXMm': 'shift of the die grid from the wafer centre, along x',
  'dieGrid.offsetYMm': 'shift of the die grid from the wafer centre, along y',
  'map.interpolation':
    'what the surface between the sites is: a spline through them, or the likeliest surface with its standard error',
  'uncertainty.currentRel': 'standard uncertainty of the current, relative',
  'uncertainty.voltageRel': 'standard uncertainty of the voltage, relative',
  'uncertainty.thermalEmfUV':
    'standard uncertainty of stray voltages in one voltage reading; two polarities leave what changes between them',
  'uncertainty.spacingMm': 'standard uncertainty of each pin spacing, as measured',
  'uncertainty.spacingWanderMm': 'standard uncertainty of each pin spacing from touch-down to touch-down',
  'uncertainty.orientationDeg': 'standard uncertainty of the direction of the pin line',
  'uncertainty.thicknessUm': 'standard uncertainty of the wafer thickness',
  'uncertainty.temperatureC': 'standard uncertainty of the temperature',
  'uncertainty.temperatureCoefficientPercentPerC': 'standard uncertainty of the temperature coefficient',
  'uncertainty.diameterMm': 'standard uncertainty of the wafer diameter',
  'uncertainty.positionMm': 'standard uncertainty of the place on the wafer, in x and in y',
  'uncertainty.repeatabilityRel':
    'standard uncertainty of a site measured again, relative; "readings" takes it from the two polarities of the lot',
  'uncertainty.depthUm':
    'standard uncertainty of the junction depth, of the diffusion length, or at the deepest point of a profile file',
  'uncertainty.mobilityRel': 'spread of the mobility model about real silicon, relative',
  'uncertainty.reportedRel': 'standard uncertainty of a value that the file reports ready made, relative',
  'uncertainty.shared': 'the components that are the same at every site, so that averaging does not lessen them',
  'uncertainty.degreesOfFreedom': 'degrees of freedom of components that are known by few observations',
  'gaugeStudy.file': 'CSV of a gauge study of the prober; its spreads enter the uncertainty of every site',
  'gaugeStudy.probe': 'the probe of the study that the lot was measured with; without it all are pooled',
  'checkWafer.file': "CSV of a check wafer's history on this prober; an alarm in it marks the lot",
  'checkWafer.baseline': 'how many occasions, first in time, make the limits of its charts; all without it',
  'checkWafer.acceptedValue': 'the value that the check wafer is held to have; the mean of the baseline without it',
  'readings.columns': 'our column name to the header of the file, where the match is not left to the program',
  'readings.delimiter': 'what separates the columns of the file',
  'readings.decimalMark': 'decimal mark of the file',
  'reported.factor': 'constant that a reported sheet resistance was made with; V/I is recovered from it',
  $schema: 'where an editor finds the description of this format; the program does not read it',
}

/** Of what holds keys, and of keys that are one of two ways to write a value. */
const SECTION_MEANINGS: Readonly<Record<string, string>> = {
  wafer: 'what is probed',
  probe: 'the four pins and how they are used',
  'probe.orientation.angleDeg': 'angle of the pin line from +x',
  layer: 'what conducts, and what the sheet resistance is turned into',
  'layer.constantMobility': 'the two numbers of the mobility model "constant"',
  'layer.background': 'the wafer under the layer',
  temperature: 'temperature of the measurement and of the results',
  limits: 'what a site, a wafer and the lot must keep to',
  'limits.sheetResistanceOhmSq': 'limits of a site',
  'limits.waferMeanOhmSq': "limits of a wafer's mean",
  'limits.resistivityOhmCm': 'limits of a site',
  'limits.waferMeanOhmCm': "limits of a wafer's mean",
  'limits.uniformityPercent': 'limit of the non-uniformity of a wafer',
  acceptance: 'how far inside its limits a value must lie to be accepted',
  'acceptance.process': 'what is made, as known before this lot',
  statistics: 'how certain an interval is, and what is done with outliers',
  'statistics.outliers': 'sites that a normal sample would hardly hold (generalized ESD test)',
  dieGrid: 'the dies of a wafer; without it none are judged',
  map: 'how the surface between the sites is made',
  uncertainty: 'standard uncertainties of what goes into the results',
  gaugeStudy: 'a study of how far the prober itself spreads',
  checkWafer: 'a wafer measured again and again to see whether the prober still reads as it did',
  'uncertainty.degreesOfFreedom.*': 'degrees of freedom of this component',
  readings: 'how the file with the readings is read, where that is not left to the program',
  'readings.columns.*': 'header of this column in the file',
  'readings.columns.*.header': 'header of this column in the file',
  'readings.columns.*.unit': 'unit of this column, where the header does not name it',
  reported: 'how values that the file reports ready made came about',
}

/** Of a key or a section; `*` stands for a key that may be any of several. Empty where there is no such key. */
export function meaningOf(key: string): string {
  const meanings = Object.hasOwn(MEANINGS, key) ? MEANINGS : SECTION_MEANINGS
  return Object.hasOwn(meanings, key) ? meanings[key] : ''
}
