/** What no single key can tell: keys that need each other, exclude each other or contradict each other. */
import { isAcceptor } from '../silicon/dopants'
import type { ProcedureProblem } from '../problems/problem'
import { blameIn, type Blame, type Sections } from './blame'
import { limitChecks } from './limit-checks'
import type { Procedure } from './schema'

export function crossChecks(sections: Sections, file: string): readonly ProcedureProblem[] {
  const blame = blameIn(file)
  return [
    ...waferChecks(sections, blame),
    ...probeChecks(sections, blame),
    ...layerChecks(sections, blame),
    ...limitChecks(sections, blame),
  ]
}

type Checks = readonly ProcedureProblem[]

function waferChecks({ wafer, dieGrid }: Sections, blame: Blame): Checks {
  if (!wafer) return []
  return wafer.shape === 'disc' ? discChecks(wafer, dieGrid !== undefined, blame) : rectangleChecks(wafer, blame)
}

type Wafer = Procedure['wafer']

function discChecks(wafer: Wafer, hasDies: boolean, blame: Blame): Checks {
  const problems: ProcedureProblem[] = []
  const { diameterMm, edgeExclusionMm, fiducial, flatLengthMm } = wafer
  for (const side of ['widthMm', 'heightMm'] as const) {
    if (wafer[side] !== undefined) {
      problems.push(
        blame.bad(`wafer.${side}`, wafer[side], 'nothing for a disc; leave it out, or write "shape": "rectangle"'),
      )
    }
  }
  if (flatLengthMm !== undefined && fiducial !== 'flat') {
    problems.push(blame.bad('wafer.flatLengthMm', flatLengthMm, 'a length only together with "fiducial": "flat"'))
  }
  if (diameterMm === undefined) {
    if (edgeExclusionMm > 0 || hasDies) problems.push(blame.missing('wafer.diameterMm'))
    return problems
  }
  if (edgeExclusionMm >= diameterMm / 2) problems.push(exclusion(edgeExclusionMm, diameterMm / 2, 'radius', blame))
  if (flatLengthMm !== undefined && flatLengthMm >= diameterMm) {
    problems.push(blame.bad('wafer.flatLengthMm', flatLengthMm, `less than the diameter, ${diameterMm} mm`))
  }
  return problems
}

function rectangleChecks(wafer: Wafer, blame: Blame): Checks {
  const problems: ProcedureProblem[] = []
  const { widthMm, heightMm, diameterMm, edgeExclusionMm, flatLengthMm } = wafer
  if (diameterMm !== undefined) {
    problems.push(
      blame.bad('wafer.diameterMm', diameterMm, 'nothing for a rectangle; leave it out, or write "shape": "disc"'),
    )
  }
  if (flatLengthMm !== undefined) {
    problems.push(blame.bad('wafer.flatLengthMm', flatLengthMm, 'nothing for a rectangle; leave it out'))
  }
  if (widthMm === undefined) problems.push(blame.missing('wafer.widthMm'))
  if (heightMm === undefined) problems.push(blame.missing('wafer.heightMm'))
  const half = Math.min(widthMm ?? Infinity, heightMm ?? Infinity) / 2
  if (edgeExclusionMm >= half) problems.push(exclusion(edgeExclusionMm, half, 'half of the shorter side', blame))
  return problems
}

function exclusion(found: number, half: number, what: string, blame: Blame): ProcedureProblem {
  return blame.bad('wafer.edgeExclusionMm', found, `less than the ${what}, ${half} mm`)
}

/** A nominal spacing that is off the measured ones by more than this is a slip of the pen, not a worn pin. */
const SPACING_TOLERANCE = 0.2

function probeChecks({ probe }: Sections, blame: Blame): Checks {
  if (probe?.spacingMm === undefined || probe.pinSpacingsMm === undefined) return []
  const mean = probe.pinSpacingsMm.reduce((sum, spacing) => sum + spacing, 0) / 3
  if (Math.abs(probe.spacingMm - mean) <= SPACING_TOLERANCE * mean) return []
  const allowed = `within 20 % of the mean of probe.pinSpacingsMm, ${Number(mean.toPrecision(4))} mm`
  return [blame.bad('probe.spacingMm', probe.spacingMm, allowed)]
}

function layerChecks({ layer, wafer }: Sections, blame: Blame): Checks {
  if (!layer || layer.kind === 'sheet') return []
  if (layer.kind === 'film') return filmChecks(layer, blame)
  const problems = [...mobilityChecks(layer, blame)]
  if (layer.kind === 'bulk') return problems
  const { background, dopant } = layer
  if (background && isAcceptor(background.dopant) === isAcceptor(dopant)) {
    const opposite = isAcceptor(dopant) ? '"phosphorus" or "arsenic"' : '"boron"'
    problems.push(
      blame.bad(
        'layer.background.dopant',
        background.dopant,
        `${opposite}: of the opposite type to the layer's ${dopant}`,
      ),
    )
  }
  if (layer.kind === 'doped-layer') problems.push(...depthChecks(layer, wafer?.thicknessUm, blame))
  return problems
}

type Layer<Kind> = Extract<Procedure['layer'], { kind: Kind }>

/** A named profile has one of depth and length, a uniform one its depth, a tabulated one its file. */
function depthChecks(layer: Layer<'doped-layer'>, thickness_um: number | undefined, blame: Blame): Checks {
  const { profile, depthUm, diffusionLengthUm, profileFile } = layer
  const isTabulated = profile === 'tabulated'
  const problems: ProcedureProblem[] = []
  for (const key of ['depthUm', 'diffusionLengthUm'] as const) {
    const value = layer[key]
    if (value === undefined) continue
    if (isTabulated) {
      const allowed = 'nothing beside "profile": "tabulated": the file has its depths'
      problems.push(blame.bad(`layer.${key}`, value, allowed))
    } else if (thickness_um !== undefined && value >= thickness_um) {
      problems.push(blame.bad(`layer.${key}`, value, `less than wafer.thicknessUm, ${thickness_um} µm`))
    }
  }
  if (isTabulated) return profileFile === undefined ? [...problems, blame.missing('layer.profileFile')] : problems
  if (profileFile !== undefined) {
    problems.push(blame.bad('layer.profileFile', profileFile, 'a file only together with "profile": "tabulated"'))
  }
  if (diffusionLengthUm === undefined) return depthUm === undefined ? [...problems, blame.missing('layer.depthUm')] : problems // prettier-ignore
  const beside = 'nothing beside layer.depthUm: give one, the other follows from it'
  if (depthUm !== undefined) problems.push(blame.bad('layer.diffusionLengthUm', diffusionLengthUm, beside))
  else if (profile === 'uniform') {
    const allowed = 'nothing for a uniform profile, which no diffusion makes; give layer.depthUm'
    problems.push(blame.bad('layer.diffusionLengthUm', diffusionLengthUm, allowed))
  }
  return problems
}

function filmChecks(layer: Layer<'film'>, blame: Blame): Checks {
  const { resistivityOhmCm, thicknessUm } = layer
  if (resistivityOhmCm !== undefined && thicknessUm !== undefined) {
    return [
      blame.bad(
        'layer.thicknessUm',
        thicknessUm,
        'nothing beside layer.resistivityOhmCm: give one, the other is the result',
      ),
    ]
  }
  return resistivityOhmCm === undefined && thicknessUm === undefined ? [blame.missing('layer.resistivityOhmCm')] : []
}

function mobilityChecks(layer: Layer<'bulk' | 'doped-layer' | 'implant'>, blame: Blame): Checks {
  const { mobility, constantMobility } = layer
  const problems: ProcedureProblem[] = []
  if (mobility === 'constant' && constantMobility === undefined) problems.push(blame.missing('layer.constantMobility'))
  if (mobility !== 'constant' && constantMobility !== undefined) {
    const allowed = `an entry only together with "mobility": "constant", not with ${JSON.stringify(mobility)}`
    problems.push(blame.bad('layer.constantMobility', constantMobility, allowed))
  }
  return problems
}
