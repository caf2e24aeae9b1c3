/**
 * Heavy pure work that the window has done beside it, each task under its name. A task loads its part of core when it is
 * first asked for. To add one: a line in `Tasks` for its types and a line in `TASKS` for the work.
 */
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import type { SurfaceError, SurfaceErrorInput } from '../../../core/map/surface-error'
import type { SiteCheck } from '../../../core/monte-carlo/check-site'
import type { Assessed, Need } from '../../../core/plan/candidates'
import type { MapDetail, WaferSurface } from '../../../core/report/surface'
import type { BandScale } from '../../../core/report/figures/band-scale'
import type { MapSites } from '../../../core/report/figures/map-input'
import type { Procedure } from '../../../core/procedure/schema'
import type { Outline } from '../../../core/wafer/outline'

/** Input and output of each; both are copied between the page and the worker, so they are plain data. */
export interface Tasks {
  'wafer-surface': {
    readonly input: {
      readonly outline: Outline
      readonly scale: BandScale
      readonly sites: MapSites
      readonly detail: MapDetail
      readonly interpolation: Procedure['map']['interpolation']
    }
    readonly output: WaferSurface | null
  }
  'monte-carlo': {
    /** The lot with its one site, from `siteAlone`. */
    readonly input: { readonly analysis: LotAnalysis; readonly trials: number; readonly seed: number }
    readonly output: SiteCheck
  }
  'surface-error': { readonly input: SurfaceErrorInput; readonly output: SurfaceError | null }
  'site-plans': {
    readonly input: {
      readonly outline: Outline
      readonly usableRadius_mm: number
      readonly margin_mm: number
      readonly need: Need
    }
    readonly output: readonly Assessed[]
  }
}

export type TaskName = keyof Tasks
export type TaskInput<Name extends TaskName> = Tasks[Name]['input']
export type TaskOutput<Name extends TaskName> = Tasks[Name]['output']

/** Tells the share done, 0 to 1; calls that follow each other too closely are left out. */
export type TellShare = (share: number) => void

type Work<Name extends TaskName> = (input: TaskInput<Name>, tell: TellShare) => TaskOutput<Name>

export const TASKS: { readonly [Name in TaskName]: () => Promise<Work<Name>> } = {
  'wafer-surface': async () => {
    const { surfacesFor } = await import('../../../core/report/surface')
    return ({ outline, scale, sites, detail, interpolation }) =>
      surfacesFor(outline, scale, interpolation)(sites, detail)
  },
  'monte-carlo': async () => {
    const { checkSite } = await import('../../../core/monte-carlo/check-site')
    return ({ analysis, trials, seed }, tell) => checkSite(analysis, 0, { trials, seed, tell })
  },
  'surface-error': async () => {
    const { surfaceError } = await import('../../../core/map/surface-error')
    return (input) => surfaceError(input)
  },
  'site-plans': async () => {
    const { assess, candidatePlans } = await import('../../../core/plan/candidates')
    return ({ outline, usableRadius_mm, margin_mm, need }) =>
      assess(candidatePlans(usableRadius_mm, outline, margin_mm), usableRadius_mm, need)
  },
}
