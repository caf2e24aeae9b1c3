import { copyFileSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { persquare, ROOT, scratchFolder } from './command'

const folder = scratchFolder()
const profile = 'tb-0417-boron-profile.csv'

function lotWith(name: string, profileFile: string): { readings: string; procedure: string } {
  const at = join(folder, name)
  mkdirSync(at)
  const layer = { kind: 'doped-layer', dopant: 'boron', profile: 'tabulated', profileFile, background: { dopant: 'phosphorus', concentrationCm3: 1e15 } } // prettier-ignore
  writeFileSync(join(at, 'lot.csv'), 'v_over_i_ohm\n20.1\n20.4\n')
  writeFileSync(join(at, 'lot.json'), JSON.stringify({ format: 'persquare-procedure/1', layer }))
  return { readings: join(at, 'lot.csv'), procedure: join(at, 'lot.json') }
}

describe('a file that the procedure names', () => {
  it('is read from beside the procedure', () => {
    const { readings, procedure } = lotWith('good', profile)
    copyFileSync(join(ROOT, 'test/fixtures/layer', profile), join(folder, 'good', profile))
    const out = join(folder, 'good', 'out')
    const ran = persquare('analyze', readings, '--procedure', procedure, '--out', out, '--write', 'json')
    expect(ran.stderr).toBe('')
    const { layer } = JSON.parse(readFileSync(join(out, 'result.json'), 'utf8'))
    expect(layer.profile).toMatchObject({ name: profile, points: 26 })
    expect(layer.profile.sha256).toMatch(/^[0-9a-f]{64}$/)
  })

  it('that is not there stops the analysis by its name', () => {
    const { readings, procedure } = lotWith('missing', profile)
    const { status, stdout, stderr } = persquare('analyze', readings, '--procedure', procedure)
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toMatch(/lot\.json, layer\.profileFile: The file "tb-0417-boron-profile\.csv", .* is not there/)
  })

  it('in another folder is refused, whether it is there or not', () => {
    copyFileSync(join(ROOT, 'test/fixtures/layer', profile), join(folder, profile))
    const { readings, procedure } = lotWith('outside', `../${profile}`)
    const { status, stderr } = persquare('analyze', readings, '--procedure', procedure)
    expect(status).toBe(2)
    expect(stderr).toMatch(/layer\.profileFile: .*the bare name of a file beside the procedure/)
  })
})
