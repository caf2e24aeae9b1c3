/** Where the computer writes 1,5 for one and a half, and in whatever zone it stands, the same bytes come out. */
import { spawnSync } from 'node:child_process'
import { readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { ROOT, scratchFolder } from './command'

const folder = scratchFolder()
const PLACES = [
  { LC_ALL: 'en_US.UTF-8', TZ: 'UTC' },
  { LC_ALL: 'de_DE.UTF-8', LANG: 'de_DE.UTF-8', TZ: 'Europe/Berlin' },
  { LC_ALL: 'ar_EG.UTF-8', LANG: 'ar_EG.UTF-8', TZ: 'Asia/Kathmandu' },
] as const

function node(place: (typeof PLACES)[number], ...args: readonly string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, args, {
    cwd: ROOT,
    encoding: 'utf8',
    env: { ...process.env, ...place },
  })
  return { status, stdout, stderr }
}

const analyze = (place: (typeof PLACES)[number], out: string) => {
  const files = ['sample-data/TB-0417.csv', '--procedure', 'sample-data/TB-0417.procedure.json']
  return node(place, 'out/cli/persquare.js', 'analyze', ...files, '--out', out)
}

describe('a locale with a decimal comma', () => {
  it('is one: the runtime itself writes numbers its way', () => {
    const written = PLACES.map((place) => node(place, '-p', '(1234.5).toLocaleString()').stdout.trim())
    expect(written[0]).toBe('1,234.5')
    expect(written[1]).toBe('1.234,5')
    expect(written[2]).not.toBe(written[0])
  })

  it('changes no byte of what is printed and written', () => {
    const outs = PLACES.map((_, at) => join(folder, `out-${at}`))
    const [usual, ...others] = PLACES.map((place, at) => analyze(place, outs[at]))
    expect(usual.status).toBe(1)
    for (const [at, other] of others.entries()) {
      expect(other.status).toBe(usual.status)
      expect(other.stderr).toBe(usual.stderr)
      expect(other.stdout.replaceAll(outs[at + 1], outs[0])).toBe(usual.stdout)
      for (const name of readdirSync(outs[0])) {
        const same = readFileSync(join(outs[0], name)).equals(readFileSync(join(outs[at + 1], name)))
        expect(same, `${name} under ${PLACES[at + 1].LC_ALL}`).toBe(true)
      }
    }
    expect(readdirSync(outs[0])).toHaveLength(4)
  })
})
