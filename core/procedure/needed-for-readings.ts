/** What a procedure lacks for the readings it is used with; the procedure alone can't tell. */
import type { ProcedureProblem } from '../problems/problem'
import { blameIn } from './blame'
import type { Procedure } from './schema'

export interface ReadingsGive {
  /** Some site has V and I or V/I (or a reported value with the constant it was made with), so factors are applied. */
  readonly vOverI: boolean
  /** Some site has a reported resistivity. */
  readonly resistivity: boolean
}

/**
 * The keys that must be added: a probe spacing where V/I is corrected for an edge or a thickness, a thickness where a
 * bulk wafer's resistivity isn't reported ready made.
 */
export function neededForReadings(
  procedure: Procedure,
  gives: ReadingsGive,
  file: string,
): readonly ProcedureProblem[] {
  const { wafer, probe, layer } = procedure
  const blame = blameIn(file)
  const problems: ProcedureProblem[] = []
  const hasOutline = wafer.shape === 'rectangle' || wafer.diameterMm !== undefined
  const hasThickness = layer.kind === 'bulk' && wafer.thicknessUm !== undefined
  const hasSpacing = probe.spacingMm !== undefined || probe.pinSpacingsMm !== undefined
  if (gives.vOverI && (hasOutline || hasThickness) && !hasSpacing) problems.push(blame.missing('probe.spacingMm'))
  if (layer.kind === 'bulk' && wafer.thicknessUm === undefined && !gives.resistivity) {
    problems.push(blame.missing('wafer.thicknessUm'))
  }
  return problems
}
