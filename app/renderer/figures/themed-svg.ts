/** A drawing made for paper, in the inks of the page. */
import { ALERT, FAINT, INK, PAPER, QUIET_INK, RULE } from '../../../core/report/figures/ink'

const PAGE_INKS: readonly (readonly [paper: string, page: string])[] = [
  [INK, 'var(--ink)'],
  [QUIET_INK, 'var(--quiet)'],
  [RULE, 'var(--rule)'],
  [FAINT, 'var(--blank)'],
  [PAPER, 'var(--ground)'],
  [ALERT, 'var(--out)'],
  ['#a9a59c', 'color-mix(in srgb, var(--quiet) 55%, var(--ground))'],
]

/** Only whole attributes change, so that no text can be mistaken for an ink. */
export function themedSvg(svg: string): string {
  return PAGE_INKS.reduce((text, [paper, page]) => text.replaceAll(`="${paper}"`, `="${page}"`), svg)
}
