/** What an installer would hold: packed by electron-builder itself, around a stand-in for Electron's runtime. */
import { execFileSync } from 'node:child_process'
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs'
import { createRequire, isBuiltin } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

const ROOT = join(import.meta.dirname, '../..')
const BUILDER = join(ROOT, 'node_modules/electron-builder/cli.js')
const MAX_ARCHIVE_MB = 40
const folder = mkdtempSync(join(tmpdir(), 'persquare-packed-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

/** Enough of Electron's folder for the packer; nothing of it is ever started. */
function standInRuntime(): string {
  const runtime = join(folder, 'runtime')
  for (const name of ['resources', 'locales']) mkdirSync(join(runtime, name), { recursive: true })
  for (const name of ['electron', 'chrome-sandbox', 'LICENSE', 'LICENSES.chromium.html', 'locales/en-US.pak'])
    writeFileSync(join(runtime, name), name)
  const { version } = JSON.parse(readFileSync(join(ROOT, 'node_modules/electron/package.json'), 'utf8')) as {
    version: string
  }
  writeFileSync(join(runtime, 'version'), version)
  chmodSync(join(runtime, 'electron'), 0o755)
  return runtime
}

/** The real configuration but for the fuses, which are switches inside the real runtime's file. */
function configuration(): string {
  const text = readFileSync(join(ROOT, 'build/electron-builder.yml'), 'utf8')
  const without = text.replace(/^electronFuses:\n(?: {2}.*\n)+/m, '')
  expect(without.length).toBeLessThan(text.length)
  const path = join(folder, 'electron-builder.yml')
  writeFileSync(path, without)
  return path
}

interface Archive {
  listPackage(path: string, options: { isPack: boolean }): string[]
  extractFile(path: string, name: string): Buffer
}

describe.skipIf(process.platform !== 'linux')('the packed application', () => {
  const require = createRequire(createRequire(join(ROOT, 'package.json')).resolve('app-builder-lib'))
  let files: readonly string[] = []
  const archive = join(folder, 'dist/linux-unpacked/resources/app.asar')

  beforeAll(async () => {
    execFileSync(process.execPath, [join(ROOT, 'build/gather-licences.mjs')], { cwd: ROOT })
    const options = [
      '--dir',
      '--linux',
      '--config',
      configuration(),
      `-c.electronDist=${standInRuntime()}`,
      `-c.directories.output=${join(folder, 'dist')}`,
    ]
    execFileSync(process.execPath, [BUILDER, ...options], { cwd: ROOT, stdio: 'pipe', timeout: 150_000 })
    const asar = (await import(require.resolve('@electron/asar'))) as Archive
    files = asar.listPackage(archive, { isPack: false }).map((path) => path.replaceAll('\\', '/').replace(/^\//, ''))
  }, 170_000)

  it('holds the program, its licences and the lot to try', () => {
    for (const file of [
      'package.json', 'LICENSE', 'out/third-party-licences.txt', 'out/main/index.js', 'out/main/report-maker.js', 'out/preload/index.cjs',
      'out/renderer/index.html', 'sample-data/TB-0417.csv', 'sample-data/TB-0417.procedure.json',
    ]) expect(files, file).toContain(file) // prettier-ignore
  })

  it('holds nothing that is for developers alone', () => {
    const stray = files.filter(
      (file) =>
        /^(app|core|test|build|dist)\/|^out\/(cli|packages|fuzz|types|demo)|^\.|^tsconfig/.test(file) ||
        file.endsWith('.map'),
    )
    expect(stray).toEqual([])
  })

  it('holds every package that the main process asks for', () => {
    const asked = new Set<string>()
    for (const file of readdirSync(join(ROOT, 'out/main'), { recursive: true, encoding: 'utf8' }).filter((name) =>
      name.endsWith('.js'),
    )) {
      for (const [, name] of readFileSync(join(ROOT, 'out/main', file), 'utf8').matchAll(
        /(?:from|import\(|require\()\s*["'](@?[a-z][\w./@-]*)["']/g,
      )) {
        if (name !== 'electron' && !isBuiltin(name))
          asked.add(name.startsWith('@') ? name.split('/', 2).join('/') : name.split('/', 1)[0])
      }
    }
    expect([...asked]).toEqual(expect.arrayContaining(['zod', 'pdfkit', 'papaparse']))
    for (const name of asked) expect(files, name).toContain(`node_modules/${name}/package.json`)
  })

  it(`takes less than ${MAX_ARCHIVE_MB} MB beside the runtime`, () => {
    const size = statSync(archive).size / 1e6
    console.log(`packed application without the runtime: ${size.toFixed(1)} MB, ${files.length} files`)
    expect(size).toBeLessThan(MAX_ARCHIVE_MB)
    expect(existsSync(join(folder, 'dist/linux-unpacked/LICENSES.chromium.html'))).toBe(true)
  })
})
