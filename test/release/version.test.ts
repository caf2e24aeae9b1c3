/** The version stands in package.json; all that shows one takes it from there. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'

const ROOT = join(import.meta.dirname, '../..')
const read = (path: string): string => readFileSync(join(ROOT, path), 'utf8')
const { version } = JSON.parse(read('package.json')) as { version: string }

describe('the version', () => {
  it('is a semantic one', () => expect(version).toMatch(/^\d+\.\d+\.\d+(-[0-9A-Za-z.-]+)?$/))

  it('is that of the lock file', () => {
    const lock = JSON.parse(read('package-lock.json')) as { version: string; packages: { '': { version: string } } }
    expect([lock.version, lock.packages[''].version]).toEqual([version, version])
  })

  it('has the first heading of the change log', () => {
    expect(/^## ([^\s,]+)/m.exec(read('build/CHANGELOG.md'))?.[1]).toBe(version)
  })

  it('stands nowhere in the source', () => {
    const sources = ['app', 'core'].flatMap((folder) =>
      readdirSync(join(ROOT, folder), { recursive: true, encoding: 'utf8' })
        .filter((file) => /\.(ts|vue)$/.test(file))
        .map((file) => join(folder, file)),
    )
    expect(sources.filter((file) => read(file).includes(`'${version}'`))).toEqual([])
  })

  it('is built into the page', () => {
    const assets = readdirSync(join(ROOT, 'out/renderer/assets')).filter((file) => file.endsWith('.js'))
    expect(assets.some((file) => read(join('out/renderer/assets', file)).includes(version))).toBe(true)
  })
})
