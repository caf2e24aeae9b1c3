/**
 * Who may import whom. The compiler's projects hold the first lock (no DOM and no Node in core); this test holds what the
 * compiler doesn't see: the order of the folders, the npm packages, the clock, the dice and the machine.
 */
import { readdirSync, readFileSync } from 'node:fs'
import { builtinModules } from 'node:module'
import { dirname, join, posix, relative, sep } from 'node:path'
import ts from 'typescript'
import { describe, expect, it } from 'vitest'

const ROOT = join(import.meta.dirname, '..')

/** Inside core a folder imports from itself and from those before it. */
const CORE_ORDER = [
  'units', 'problems', 'numeric', 'wafer', 'plan', 'geometry', 'silicon', 'layer', 'conversion', 'statistics', 'map', 'conformity',
  'ingest', 'procedure', 'gauge', 'check-wafer', 'health', 'analysis', 'monte-carlo', 'report',
] as const // prettier-ignore

const CORE_PACKAGES = [
  'papaparse', 'zod', 'd3-contour', 'd3-delaunay', 'd3-scale-chromatic', 'ml-matrix', '@stdlib/math-base-special-erfc',
  '@stdlib/math-base-special-erfcinv',
] // prettier-ignore

/** Rooms of the house: what each may import of the others (itself always), and of npm. `node` is every module of Node. */
const ROOMS: Readonly<Record<string, { readonly rooms: readonly string[]; readonly npm: readonly string[] }>> = {
  core: { rooms: [], npm: CORE_PACKAGES },
  'app/contract': { rooms: ['core'], npm: ['zod'] },
  'app/pdf': { rooms: ['core'], npm: ['node', 'pdfkit', 'dejavu-fonts-ttf'] },
  'app/host': { rooms: ['core', 'app/contract', 'app/pdf'], npm: ['node'] },
  'app/cli': { rooms: ['core', 'app/pdf', 'app/host', 'app/browser'], npm: ['node', 'papaparse'] },
  'app/main': { rooms: ['core', 'app/contract', 'app/host'], npm: ['node', 'electron'] },
  'app/preload': { rooms: ['core', 'app/contract'], npm: ['electron'] },
  'app/browser': { rooms: ['core', 'app/contract', 'app/host'], npm: ['node'] },
  'app/renderer': {
    rooms: ['core', 'app/contract'],
    npm: ['vue', 'pinia', 'plotly.js-dist-min', 'plotly.js-cartesian-dist-min', 'pdfjs-dist'],
  },
}

/** An import that only these files of a room may make. */
const ONLY_FROM: readonly { readonly from: readonly string[]; readonly room: string; readonly to: RegExp }[] = [
  // The command line needs the browser's host to start the window, and for nothing else.
  { from: ['app/cli/start.ts'], room: 'app/cli', to: /^app\/browser\// },
  // What a host does for the window is no business of a command; it shares only the way files are read and written.
  { from: ['app/cli/start.ts'], room: 'app/cli', to: /^app\/host\/(?!(read-unchanged|write-whole)$)/ },
  // The preload passes on what it is given: what is in it is in every page, so the checks stay out of it.
  { from: [], room: 'app/preload', to: /^app\/contract\/(?!(channels|commands|host)$)/ },
  // The bare parser is measured against; everything else reads files through core.
  { from: ['app/cli/bench.ts', 'app/cli/plain-script.ts'], room: 'app/cli', to: /^papaparse$/ },
]

/** What core must not touch, as it would stand in code. */
const MACHINE: readonly (readonly [what: string, pattern: RegExp])[] = [
  ['the clock', /\bDate\.now\b|\bnew Date\(\s*\)|\bDate\(\s*\)|\bperformance\b/],
  ['the dice', /\bMath\.random\b|\bcrypto\b/],
  [
    'the machine',
    /\bprocess\.|\bglobalThis\b|\bconsole\.|\bnavigator\b|\bwindow\.|\bdocument\.|\bIntl\b|\btoLocale\w*/,
  ],
  ['text run as code', /\beval\(|\bnew Function\b/],
]

const FOLDERS: Readonly<Record<string, readonly string[]>> = {
  app: ['browser', 'cli', 'contract', 'host', 'main', 'pdf', 'preload', 'renderer'],
  core: [...CORE_ORDER],
}
const MAX_LINES = 400

interface Source {
  readonly path: string
  readonly text: string
}

function sourcesUnder(folder: string): readonly Source[] {
  return readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|vue)$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name))
    .sort()
    .map((path) => ({ path: relative(ROOT, path).split(sep).join('/'), text: readFileSync(path, 'utf8') }))
}

/** The script of a Vue file; the whole of any other. */
function scriptOf({ path, text }: Source): string {
  if (!path.endsWith('.vue')) return text
  return [...text.matchAll(/<script[^>]*>([\s\S]*?)<\/script>/g)].map((found) => found[1]).join('\n')
}

function importsOf(source: Source): readonly string[] {
  const script = scriptOf(source)
  // Type imports too: they bind one folder to another as much as values do.
  const found = ts.preProcessFile(script, true, true).importedFiles.map(({ fileName }) => fileName)
  const workers = [...script.matchAll(/new URL\(\s*'([^']+\.ts)'\s*,\s*import\.meta\.url/g)].map((match) => match[1]!)
  return [...found, ...workers]
}

/** Without comments and texts in quotes, so that words about the clock are no use of it. */
function codeOf(source: Source): string {
  const scanner = ts.createScanner(ts.ScriptTarget.ES2022, true, ts.LanguageVariant.Standard, scriptOf(source))
  const parts: string[] = []
  for (let kind = scanner.scan(); kind !== ts.SyntaxKind.EndOfFileToken; kind = scanner.scan()) {
    const isText = kind === ts.SyntaxKind.StringLiteral || kind === ts.SyntaxKind.NoSubstitutionTemplateLiteral
    const isName =
      kind === ts.SyntaxKind.Identifier || (kind >= ts.SyntaxKind.FirstKeyword && kind <= ts.SyntaxKind.LastKeyword)
    const glue = isName && /\w$/.test(parts[parts.length - 1] ?? '') ? ' ' : ''
    parts.push(glue + (isText ? '""' : scanner.getTokenText()))
  }
  return parts.join('')
}

/** Where an import leads: a path in the project, `node`, or the name of an npm package. */
function targetOf(path: string, specifier: string): string {
  if (specifier.startsWith('.')) return posix.normalize(posix.join(dirname(path), specifier))
  if (specifier.startsWith('node:') || builtinModules.includes(specifier)) return 'node'
  return specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/')
}

function roomOf(path: string): string | undefined {
  return Object.keys(ROOMS).find((room) => path.startsWith(`${room}/`))
}

function wrongImports(source: Source): readonly string[] {
  const room = roomOf(source.path)
  if (room === undefined) return [`${source.path} stands in no known room`]
  return importsOf(source).flatMap((specifier) => {
    const target = targetOf(source.path, specifier)
    const allowed = specifier.startsWith('.') ? mayReach(source.path, room, target) : ROOMS[room]!.npm.includes(target)
    const reserved = ONLY_FROM.some(
      (rule) => rule.room === room && rule.to.test(target) && !rule.from.includes(source.path),
    )
    return allowed && !reserved ? [] : [`${source.path} imports ${specifier}`]
  })
}

function mayReach(path: string, room: string, target: string): boolean {
  const there = roomOf(target)
  if (there === undefined) return false
  if (there !== room) return ROOMS[room]!.rooms.includes(there)
  return room !== 'core' || coreRank(target) <= coreRank(path)
}

/** An unknown folder of core is before none and after all: nothing may import it. */
function coreRank(path: string): number {
  const rank = (CORE_ORDER as readonly string[]).indexOf(path.split('/')[1]!)
  return rank < 0 ? Infinity : rank
}

const core = sourcesUnder('core')
const app = sourcesUnder('app')
const everything = [...core, ...app, ...sourcesUnder('test'), ...sourcesUnder('build')]
const example = (path: string, text: string): Source => ({ path, text })

describe('imports', () => {
  it('run one way, from the app to core and down core’s folders', () => {
    expect([...core, ...app].flatMap(wrongImports)).toEqual([])
  })

  it.each([
    ['core/units/a.ts', "import { b } from '../problems/b'"],
    ['core/units/a.ts', "import type { B } from '../problems/b'"],
    ['core/units/a.ts', "export { b } from '../problems/b'"],
    ['core/units/a.ts', "const b = await import('../problems/b')"],
    ['core/report/a.ts', "import { b } from '../unheard-of/b'"],
    ['core/report/a.ts', "import { b } from '../../app/contract/host'"],
    ['core/report/a.ts', "import { readFileSync } from 'node:fs'"],
    ['core/report/a.ts', "import { readFileSync } from 'fs'"],
    ['core/report/a.ts', "import vue from 'vue'"],
    ['app/renderer/A.vue', '<script setup lang="ts">import { ipcRenderer } from "electron"</script>'],
    ['app/renderer/a.ts', "import { openWindow } from '../main/window'"],
    ['app/renderer/a.ts', "new Worker(new URL('../main/window.ts', import.meta.url))"],
    ['app/cli/analyze.ts', "import { startLoopbackHost } from '../browser/loopback-host'"],
    ['app/cli/analyze.ts', "import Papa from 'papaparse'"],
    ['app/preload/a.ts', "import { z } from 'zod'"],
    ['app/preload/index.ts', "import { REPLIES } from '../contract/messages'"],
    ['app/cli/analyze.ts', "import { makeReport } from '../host/make-report'"],
    ['app/elsewhere/a.ts', ''],
  ])('in %s, %s is found out', (path, text) => {
    expect(wrongImports(example(path, text))).toHaveLength(1)
  })

  it.each([
    ['core/problems/a.ts', "import { b } from '../units/b'; import { c } from './c'; import { z } from 'zod'"],
    ['app/cli/start.ts', "import { startLoopbackHost } from '../browser/loopback-host'; import { join } from 'node:path'"],
    ['app/renderer/A.vue', "<script setup lang=\"ts\">import { ref } from 'vue'; import { explain } from '../../core/problems/explain'</script>"],
  ])('in %s, %s is fine', (path, text) => {
    expect(wrongImports(example(path, text))).toEqual([])
  }) // prettier-ignore
})

describe('core', () => {
  const touches = (source: Source): readonly string[] =>
    MACHINE.filter(([, pattern]) => pattern.test(codeOf(source))).map(([what]) => `${source.path} touches ${what}`)

  it('reads no clock, no dice and no machine', () => {
    expect(core.flatMap(touches)).toEqual([])
  })

  it.each([
    'const t = Date.now()',
    'const t = new Date()',
    'const x = Math.random()',
    'const x = `${process.env}`',
    'globalThis.crypto.randomUUID()',
    "console.log('')",
    'x.toLocaleString()',
    "new Function('')",
  ])('%s is found out', (text) => {
    expect(touches(example('core/a.ts', text))).not.toEqual([])
  })

  it.each(["const a = 'Date.now()'", '// console.log()', 'const t = new Date(0)', 'const processed = 1'])(
    '%s is fine',
    (text) => {
      expect(touches(example('core/a.ts', text))).toEqual([])
    },
  )
})

describe('the tree', () => {
  it('has the known folders', () => {
    for (const [folder, known] of Object.entries(FOLDERS)) {
      const found = readdirSync(join(ROOT, folder), { withFileTypes: true }).filter((entry) => entry.isDirectory())
      expect(
        found.map(({ name }) => name).filter((name) => !known.includes(name)),
        folder,
      ).toEqual([])
    }
  })

  it('has no index file that hands on what other files export', () => {
    // Electron's two entries are named after what they build to; they export nothing.
    const entries = ['app/main/index.ts', 'app/preload/index.ts']
    const barrels = everything.filter(({ path }) => /(^|\/)index\.ts$/.test(path) && !entries.includes(path))
    expect(barrels.map(({ path }) => path)).toEqual([])
    for (const { path, text } of everything.filter((source) => entries.includes(source.path))) {
      expect(text, path).not.toMatch(/^export /m)
    }
  })

  it(`has no file over ${MAX_LINES} lines`, () => {
    const long = everything.filter(({ text }) => text.split('\n').length > MAX_LINES + 1)
    expect(long.map(({ path }) => path)).toEqual([])
  })
})
