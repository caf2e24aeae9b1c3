import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, expect, it } from 'vitest'

const ROOT = join(import.meta.dirname, '../..')
const folder = mkdtempSync(join(tmpdir(), 'persquare-licences-'))
const target = join(folder, 'licences.txt')
afterAll(() => rmSync(folder, { recursive: true, force: true }))

it('every package that ships has a licence that is allowed, and its text', () => {
  const said = execFileSync(process.execPath, [join(ROOT, 'build/gather-licences.mjs'), target], {
    cwd: ROOT,
    encoding: 'utf8',
  })
  const [, count, licences] = /: (\d+) packages, (.*)\n/.exec(said)!
  // Both lists: what stands in node_modules at run time, and what only a build took in.
  const text = readFileSync(target, 'utf8')
  for (const name of [
    'pdfkit',
    'zod',
    'papaparse',
    'd3-contour',
    'dejavu-fonts-ttf',
    '@vue/runtime-core',
    'pinia',
    'plotly.js-cartesian-dist-min',
    'pdfjs-dist',
    '@stdlib/math-base-special-erfc',
  ]) {
    expect(text, name).toMatch(new RegExp(`^${name} \\d`, 'm'))
  }
  expect(Number(count)).toBeGreaterThan(100)
  expect(licences).not.toMatch(/GPL|UNLICENSED|undefined/)
  expect(text).toContain('Bitstream Vera')
})
