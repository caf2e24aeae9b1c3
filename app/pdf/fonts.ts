/** The typefaces that are embedded: DejaVu Sans Condensed has Ω, µ, the superscripts and figures of one width. */
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import type { FontId } from '../../core/report/drawing'

const FILES: Readonly<Record<FontId, string>> = {
  regular: 'DejaVuSansCondensed.ttf',
  bold: 'DejaVuSansCondensed-Bold.ttf',
  mono: 'DejaVuSansMono.ttf',
}

export function fontFile(font: FontId): string {
  const manifest = createRequire(import.meta.url).resolve('dejavu-fonts-ttf/package.json')
  return join(dirname(manifest), 'ttf', FILES[font])
}

/** Three sizes carry the whole report. */
export const TITLE_PT = 15
export const TEXT_PT = 8.6
export const SMALL_PT = 7.2

/** Baseline to baseline, as a multiple of the size. */
export const LEADING = 1.36
