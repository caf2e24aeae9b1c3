/**
 * Writes out/third-party-licences.txt: the licence of every package whose code an installer holds, that is of the packages
 * that stand in node_modules at run time and of those that a build took in (`bundled-packages.ts`). Electron's own
 * licences, Chromium's among them, are laid beside it by electron-builder. Fails for a licence that nobody has allowed,
 * and for a package that carries no text of one.
 */
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'

const ROOT = join(import.meta.dirname, '..')
const LISTS = join(ROOT, 'out/packages')
const target = process.argv[2] ?? join(ROOT, 'out/third-party-licences.txt')

/** Permissive, and met by handing on the text. */
const ALLOWED = [
  'MIT', 'ISC', 'BSD-2-Clause', 'BSD-3-Clause', 'Apache-2.0', 'Apache-2.0 AND BSL-1.0', '0BSD', 'Zlib', '(MIT AND Zlib)', 'Unlicense',
] // prettier-ignore

/** What a person has looked at, and why it may ship. */
const LOOKED_AT = {
  'dejavu-fonts-ttf': {
    declared: 'SEE LICENSE IN README.md AND LICENSE',
    licence: 'Bitstream Vera and DejaVu (public domain changes)',
    why: 'fonts that may be bundled and embedded; the text is in its LICENSE',
  },
  'png-js': { declared: undefined, licence: 'MIT', why: 'its package.json names none, its LICENSE is the MIT licence' },
}

/** They say MIT in package.json and README, and carry no text of it: the standard text with their author's name is taken. */
const WITHOUT_TEXT = ['brotli', 'dfa', 'fontkit']

/**
 * A package that is a bundle itself, and names what is in it nowhere but in the package it is made from. Names and
 * licences as the registry of npm gives them for plotly.js 4.1.1, those of its other bundles among them.
 */
const INSIDE = {
  'plotly.js-cartesian-dist-min': {
    MIT: '@plotly/point-cluster, @plotly/regl, @turf/area, @turf/centroid, @turf/meta, base64-arraybuffer, country-iso-search, culori, fast-isnumeric, gl-text, has-hover, has-passive-events, is-mobile, mouse-event-offset, native-promise-only, parse-svg-path, point-in-polygon, polybooljs, probe-image-size, regl-error2d, regl-line2d, regl-scatter2d, regl-splom, strongly-connected-components, svg-path-sdf, webgl-context, world-calendars',
    'BSD-3-Clause (Mike Bostock)':
      '@plotly/d3, @plotly/d3-sankey, d3-force, d3-format, d3-geo, d3-geo-projection, d3-hierarchy, d3-time, d3-time-format, topojson-client',
    'ISC (Mike Bostock)': 'd3-interpolate',
    Zlib: 'gl-mat4',
  },
}

function insideWords(name) {
  const lines = Object.entries(INSIDE[name] ?? {}).map(([licence, names]) => `${licence}: ${names}`)
  return lines.length > 0 ? `\n\nIt is a bundle, with some of these inside:\n${lines.join('\n')}` : ''
}

/** At the top of a package and one folder down, where a part of another origin lies. */
function licenceFiles(folder) {
  const isLicence = (file) => /^(licen[cs]e|copying|notice)/i.test(file)
  const below = readdirSync(folder, { withFileTypes: true }).filter(
    (entry) => entry.isDirectory() && entry.name !== 'node_modules',
  )
  return [
    ...readdirSync(folder).filter(isLicence),
    ...below.flatMap(({ name }) =>
      readdirSync(join(folder, name))
        .filter(isLicence)
        .map((file) => join(name, file)),
    ),
  ].filter((file) => statSync(join(folder, file)).isFile())
}

const mitText = (holder) => `Copyright (c) ${holder}

Permission is hereby granted, free of charge, to any person obtaining a copy of this software and associated documentation files (the "Software"), to deal in the Software without restriction, including without limitation the rights to use, copy, modify, merge, publish, distribute, sublicense, and/or sell copies of the Software, and to permit persons to whom the Software is furnished to do so, subject to the following conditions:

The above copyright notice and this permission notice shall be included in all copies or substantial portions of the Software.

THE SOFTWARE IS PROVIDED "AS IS", WITHOUT WARRANTY OF ANY KIND, EXPRESS OR IMPLIED, INCLUDING BUT NOT LIMITED TO THE WARRANTIES OF MERCHANTABILITY, FITNESS FOR A PARTICULAR PURPOSE AND NONINFRINGEMENT. IN NO EVENT SHALL THE AUTHORS OR COPYRIGHT HOLDERS BE LIABLE FOR ANY CLAIM, DAMAGES OR OTHER LIABILITY, WHETHER IN AN ACTION OF CONTRACT, TORT OR OTHERWISE, ARISING FROM, OUT OF OR IN CONNECTION WITH THE SOFTWARE OR THE USE OR OTHER DEALINGS IN THE SOFTWARE.`

const read = (path) => JSON.parse(readFileSync(path, 'utf8'))

/** Paths of packages below the root, such as node_modules/pdfkit. */
function shippedPaths() {
  const { packages } = read(join(ROOT, 'package-lock.json'))
  const atRunTime = Object.entries(packages).filter(([path, entry]) => path !== '' && !entry.dev && !entry.devOptional)
  if (!existsSync(LISTS)) throw new Error('nothing is built: npm run build')
  const bundled = readdirSync(LISTS).flatMap((file) => read(join(LISTS, file)))
  const optional = new Set(atRunTime.filter(([, entry]) => entry.optional).map(([path]) => path))
  const all = [...new Set([...atRunTime.map(([path]) => path), ...bundled])].sort()
  return all.filter((path) => !optional.has(path) || existsSync(join(ROOT, path)))
}

function entryOf(path) {
  const folder = join(ROOT, path)
  const { name, version, license, author, homepage, repository } = read(join(folder, 'package.json'))
  const files = licenceFiles(folder)
  const own = files.map((file) => readFileSync(join(folder, file), 'utf8').trim()).join('\n\n')
  const text = own === '' && WITHOUT_TEXT.includes(name) && license === 'MIT' ? mitText(author.name ?? author) : own
  const address = homepage ?? (typeof repository === 'string' ? repository : repository?.url) ?? ''
  return {
    name,
    version,
    declared: license,
    licence: LOOKED_AT[name]?.licence ?? license,
    text: text && text + insideWords(name),
    address,
  }
}

const entries = shippedPaths().map(entryOf)
const faults = entries.flatMap(({ name, version, declared, licence, text }) => [
  ...(ALLOWED.includes(declared) || (LOOKED_AT[name] && LOOKED_AT[name].declared === declared)
    ? []
    : [`${name} ${version}: nobody has allowed its licence, ${licence}`]),
  ...(text === '' ? [`${name} ${version}: it carries no text of its licence, ${licence}`] : []),
])
if (faults.length > 0) {
  console.error(faults.join('\n'))
  process.exit(1)
}

const rule = '='.repeat(80)
const head = `Persquare holds code and fonts of ${entries.length} packages by others, under these licences.`
const list = entries.map(({ name, version, licence }) => `${name} ${version}: ${licence}`).join('\n')
/** A text that many carry stands once, under the names of all. */
const texts = [...new Set(entries.map(({ text }) => text))].map((text) => {
  const holders = entries.filter((entry) => entry.text === text)
  const names = holders.map(({ name, version, address }) => `${name} ${version}  ${address}`).join('\n')
  return `${rule}\n${names}\n\n${text}\n`
})
writeFileSync(target, [head, '', list, '', ...texts].join('\n'))
console.log(
  `${target}: ${entries.length} packages, ${[...new Set(entries.map(({ licence }) => licence))].sort().join(', ')}`,
)
