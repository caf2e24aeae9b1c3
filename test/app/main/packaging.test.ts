/** What goes into an installer, checked where no installer can be made. */
import { existsSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { expect, it } from 'vitest'
import { demoPaths } from '../../../app/host/demo-lot'

const ROOT = join(import.meta.dirname, '..', '..', '..')
const config = readFileSync(join(ROOT, 'build', 'electron-builder.yml'), 'utf8')

it.each([
  ['runAsNode', false],
  ['enableNodeOptionsEnvironmentVariable', false],
  ['enableNodeCliInspectArguments', false],
  ['enableCookieEncryption', true],
  ['enableEmbeddedAsarIntegrityValidation', true],
  ['onlyLoadAppFromAsar', true],
  ['grantFileProtocolExtraPrivileges', false],
])('the fuse %s is %s', (fuse, state) => {
  expect(config).toContain(`\n  ${fuse}: ${state}\n`)
})

it('every setting is one that the packager knows', () => {
  const { resolve } = createRequire(import.meta.url)
  const scheme = JSON.parse(readFileSync(join(dirname(resolve('app-builder-lib/package.json')), 'scheme.json'), 'utf8')) as {
    readonly properties: object
    readonly definitions: Readonly<Record<string, { readonly properties: object }>>
  }
  const keysUnder = (name: string): string[] => {
    const section = new RegExp(`^${name}:\\n((?: +.*\\n|\\n)*)`, 'm').exec(config)?.[1] ?? ''
    return [...section.matchAll(/^ {2}([A-Za-z]+):/gm)].map((found) => found[1]!)
  }
  const top = [...config.matchAll(/^([A-Za-z]+):/gm)].map((found) => found[1]!)
  expect(top.filter((key) => !Object.hasOwn(scheme.properties, key))).toEqual([])
  for (const [section, definition] of [
    ['electronFuses', 'FuseOptionsV1'],
    ['nsis', 'NsisOptions'],
    ['mac', 'MacConfiguration'],
    ['linux', 'LinuxConfiguration'],
    ['win', 'WindowsConfiguration'],
  ] as const) {
    const keys = keysUnder(section)
    expect(keys.length, section).toBeGreaterThan(0)
    expect(keys.filter((key) => !Object.hasOwn(scheme.definitions[definition]!.properties, key)), section).toEqual([])
  }
}) // prettier-ignore

it('holds the built program and the bundled lot', () => {
  for (const path of demoPaths('')) {
    expect(existsSync(join(ROOT, path))).toBe(true)
    expect(config).toContain(`  - ${path}\n`)
  }
  for (const path of ['out/main/index.js', 'out/main/report-maker.js', 'out/preload/index.cjs', 'out/renderer/index.html'])
    expect(existsSync(join(ROOT, path)), path).toBe(true)
}) // prettier-ignore
