/** What the browser must read before the first screen, and what waits until it is wanted. */
import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { builtPage } from '../browser/chromium'

const ASSETS = join(builtPage(), 'assets')
const kilobytes = (files: readonly string[]): number =>
  files.reduce((sum, file) => sum + statSync(join(ASSETS, file)).size / 1000, 0)

describe('the built page', () => {
  const html = readFileSync(join(builtPage(), 'index.html'), 'utf8')
  const first = [...html.matchAll(/(?:src|href)="\.\/assets\/([^"]+\.(?:js|css))"/g)].map(([, file]) => file)

  it('begins with less than 900 kB, uncompressed', () => {
    expect(first.length).toBeGreaterThan(2)
    expect(kilobytes(first)).toBeLessThan(900)
  })

  it('leaves the plotting, the reading of PDFs and the workers for later', () => {
    const later = readdirSync(ASSETS).filter((file) => file.endsWith('.js') && !first.includes(file))
    for (const part of ['plotly', 'pdf', 'analysis.worker', 'tasks.worker', 'LayerPage', 'HandOverPage', 'TrustPage']) {
      expect(later.filter((file) => file.startsWith(part)), part).not.toEqual([])
    }
    expect(kilobytes(later)).toBeLessThan(6000)
  })
}) // prettier-ignore
