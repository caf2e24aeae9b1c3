import { describe, expect, it } from 'vitest'
import { explain } from '../../../core/problems/explain'
import { neededForReadings } from '../../../core/procedure/needed-for-readings'
import { parseProcedure } from '../../../core/procedure/parse-procedure'
import type { Procedure } from '../../../core/procedure/schema'

const file = 'TB-0417.procedure.json'
const parse = (written: object) => parseProcedure(JSON.stringify({ format: 'persquare-procedure/1', ...written }), file)
const problemsOf = (written: object) => parse(written).problems
const good = (written: object): Procedure => {
  const { procedure, problems } = parse(written)
  if (!procedure) throw new Error(problems.map(explain).join('\n'))
  return procedure
}

const boron = {
  kind: 'doped-layer',
  dopant: 'boron',
  profile: 'erfc',
  depthUm: 1,
  background: { dopant: 'phosphorus', concentrationCm3: 1e15 },
}

describe('the wafer', () => {
  it.each([
    [{ diameterMm: 200, edgeExclusionMm: 100 }, 'wafer.edgeExclusionMm', 'less than the radius, 100 mm'],
    [{ diameterMm: 200, widthMm: 20 }, 'wafer.widthMm', 'nothing for a disc; leave it out, or write "shape": "rectangle"'],
    [{ diameterMm: 200, flatLengthMm: 58 }, 'wafer.flatLengthMm', 'a length only together with "fiducial": "flat"'],
    [{ diameterMm: 50, fiducial: 'flat', flatLengthMm: 50 }, 'wafer.flatLengthMm', 'less than the diameter, 50 mm'],
    [{ shape: 'rectangle', widthMm: 20, heightMm: 10, edgeExclusionMm: 5 }, 'wafer.edgeExclusionMm', 'less than the half of the shorter side, 5 mm'],
    [{ shape: 'rectangle', widthMm: 20, heightMm: 10, diameterMm: 9 }, 'wafer.diameterMm', 'nothing for a rectangle; leave it out, or write "shape": "disc"'],
    [{ shape: 'rectangle', widthMm: 20, heightMm: 10, flatLengthMm: 9 }, 'wafer.flatLengthMm', 'nothing for a rectangle; leave it out'],
  ])('%j is refused', (wafer, key, allowed) => {
    expect(problemsOf({ wafer })).toMatchObject([{ kind: 'bad-value', key, allowed }])
  }) // prettier-ignore

  it.each([
    [{ diameterMm: 200, edgeExclusionMm: 99.9 }],
    [{ diameterMm: 100, fiducial: 'flat', flatLengthMm: 32.5 }],
    [{ shape: 'rectangle', widthMm: 20, heightMm: 10, edgeExclusionMm: 4.9 }],
  ])('%j is taken', (wafer) => {
    expect(problemsOf({ wafer })).toEqual([])
  })
})

describe('the probe', () => {
  it.each([
    [1, [1, 1, 1], true],
    [1.2, [1, 1, 1], true],
    [1.21, [1, 1, 1], false],
    [0.79, [1, 1, 1], false],
    [1, [1.59, 1.0, 1.0], true],
    [1, [0.1, 0.1, 0.1], false],
  ])('spacing %d beside %j is plausible: %s', (spacingMm, pinSpacingsMm, plausible) => {
    const problems = problemsOf({ probe: { spacingMm, pinSpacingsMm } })
    expect(problems.map((problem) => 'key' in problem && problem.key)).toEqual(plausible ? [] : ['probe.spacingMm'])
  })
})

describe('the layer', () => {
  it('lies on a background of the opposite type', () => {
    const background = { dopant: 'boron', concentrationCm3: 1e15 }
    expect(problemsOf({ layer: { ...boron, background } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.background.dopant', found: '"boron"' },
    ])
    const implant = { kind: 'implant', dopant: 'arsenic', rangeUm: 0.1, straggleUm: 0.04 }
    expect(problemsOf({ layer: { ...implant, background: { dopant: 'phosphorus', concentrationCm3: 1e15 } } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.background.dopant', found: '"phosphorus"' },
    ]) // prettier-ignore
    expect(problemsOf({ layer: { ...implant, background } })).toEqual([])
  })

  it('is not deeper than the wafer is thick', () => {
    expect(problemsOf({ wafer: { thicknessUm: 1 }, layer: boron })).toMatchObject([{ key: 'layer.depthUm' }])
    expect(problemsOf({ wafer: { thicknessUm: 1.1 }, layer: boron })).toEqual([])
  })

  it('has one of junction depth and diffusion length, where it is a named profile', () => {
    const noDepth = { ...boron, depthUm: undefined }
    expect(problemsOf({ layer: { ...noDepth, diffusionLengthUm: 0.06 } })).toEqual([])
    expect(problemsOf({ layer: { ...boron, diffusionLengthUm: 0.06 } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.diffusionLengthUm', allowed: expect.stringContaining('give one') },
    ])
    expect(problemsOf({ layer: noDepth })).toMatchObject([{ kind: 'missing-key', key: 'layer.depthUm' }])
    expect(problemsOf({ layer: { ...noDepth, profile: 'uniform', diffusionLengthUm: 0.06 } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.diffusionLengthUm', allowed: expect.stringContaining('give layer.depthUm') },
    ])
    expect(problemsOf({ wafer: { thicknessUm: 1 }, layer: { ...noDepth, diffusionLengthUm: 1 } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.diffusionLengthUm' },
    ])
  })

  it('has a profile file exactly where the profile is tabulated, and then no depth', () => {
    const noDepth = { ...boron, depthUm: undefined }
    const tabulated = { ...noDepth, profile: 'tabulated', profileFile: 'tb-0417-profile.csv' }
    expect(problemsOf({ layer: tabulated })).toEqual([])
    expect(problemsOf({ layer: { ...noDepth, profile: 'tabulated' } })).toMatchObject([
      { kind: 'missing-key', key: 'layer.profileFile' },
    ])
    expect(problemsOf({ layer: { ...boron, profileFile: 'p.csv' } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.profileFile' },
    ])
    for (const key of ['depthUm', 'diffusionLengthUm']) {
      expect(problemsOf({ layer: { ...tabulated, [key]: 1 } })).toMatchObject([{ kind: 'bad-value', key: `layer.${key}` }]) // prettier-ignore
    }
  })

  it.each(['/etc/p.csv', '../p.csv', 'a/p.csv', 'a\\p.csv', '..', 'C:p.csv', 'p\u0000.csv', 'p\n.csv', ''])(
    'takes no profile file outside its folder: %j',
    (profileFile) => {
      const noDepth = { ...boron, depthUm: undefined }
      expect(problemsOf({ layer: { ...noDepth, profile: 'tabulated', profileFile } })).toMatchObject([
        { kind: 'bad-value', key: 'layer.profileFile', allowed: expect.stringContaining('beside the procedure') },
      ])
    },
  )

  it.each(['p.csv', '.p', 'Profil Bor, 0,4 µm.csv', 'p.2026-03-16.csv'])('takes the profile file %j', (profileFile) => {
    const noDepth = { ...boron, depthUm: undefined }
    expect(problemsOf({ layer: { ...noDepth, profile: 'tabulated', profileFile } })).toEqual([])
  })

  it('of a film has one of its two keys', () => {
    const both = { kind: 'film', resistivityOhmCm: 3e-6, thicknessUm: 0.5 }
    expect(problemsOf({ layer: both })).toMatchObject([{ kind: 'bad-value', key: 'layer.thicknessUm' }])
    expect(problemsOf({ layer: { kind: 'film' } })).toMatchObject([{ kind: 'missing-key' }])
  })

  it('has constant mobilities exactly where the model is the constant one', () => {
    const constantMobility = { electronsCm2Vs: 1400, holesCm2Vs: 450 }
    const bulk = { kind: 'bulk', dopant: 'boron' }
    expect(problemsOf({ layer: { ...bulk, mobility: 'constant', constantMobility } })).toEqual([])
    expect(problemsOf({ layer: { ...bulk, mobility: 'constant' } })).toMatchObject([{ kind: 'missing-key' }])
    expect(problemsOf({ layer: { ...bulk, mobility: 'arora', constantMobility } })).toMatchObject([
      { kind: 'bad-value', key: 'layer.constantMobility' },
    ])
  })
})

describe('the limits', () => {
  it.each(['sheetResistanceOhmSq', 'waferMeanOhmSq', 'resistivityOhmCm', 'waferMeanOhmCm'])('of %s are in order', (on) => {
    const limitsOf = (limit: object) => problemsOf({ limits: { [on]: limit } })
    expect(limitsOf({ lower: 97, upper: 87 })).toEqual([
      { kind: 'limits-reversed', file, key: `limits.${on}`, lower: 97, upper: 87 },
    ])
    expect(limitsOf({ lower: 87, upper: 97, target: 98 })).toEqual([
      { kind: 'limits-reversed', file, key: `limits.${on}.target`, lower: 98, upper: 97 },
    ])
    expect(limitsOf({ lower: 87, target: 86 })).toEqual([
      { kind: 'limits-reversed', file, key: `limits.${on}.target`, lower: 87, upper: 86 },
    ])
    for (const limit of [{ lower: 87, upper: 97, target: 92 }, { lower: 87, target: 87 }, { upper: 9 }, { target: 5 }, {}]) {
      expect(limitsOf(limit)).toEqual([])
    }
  }) // prettier-ignore

  it('are on sheet resistance or on resistivity', () => {
    const limits = { waferMeanOhmSq: { upper: 95 }, resistivityOhmCm: { upper: 2 } }
    const problems = problemsOf({ limits })
    expect(problems).toMatchObject([{ kind: 'bad-value', key: 'limits.resistivityOhmCm' }])
    expect(explain(problems[0]!)).toContain('limits.waferMeanOhmSq')
  })

  it('are on the quantity that is judged', () => {
    expect(problemsOf({ quantity: 'resistivity', limits: { waferMeanOhmSq: { upper: 95 } } })).toMatchObject([
      { kind: 'bad-value', key: 'quantity' },
    ])
    expect(problemsOf({ quantity: 'sheet-resistance', limits: { waferMeanOhmCm: { upper: 2 } } })).toMatchObject([
      { kind: 'bad-value', key: 'quantity' },
    ])
    expect(problemsOf({ quantity: 'resistivity', limits: { waferMeanOhmCm: { upper: 2 } } })).toEqual([])
  })
})

describe('neededForReadings', () => {
  const bulk = { kind: 'bulk', dopant: 'boron' }
  it.each([
    ['corrects for an edge', { wafer: { diameterMm: 200 } }, { vOverI: true, resistivity: false }, ['probe.spacingMm']],
    ['has its spacings', { wafer: { diameterMm: 200 }, probe: { pinSpacingsMm: [1, 1, 1] } }, { vOverI: true, resistivity: false }, []],
    ['corrects nothing', { wafer: { diameterMm: 200 } }, { vOverI: false, resistivity: false }, []],
    ['knows no edge', {}, { vOverI: true, resistivity: false }, []],
    ['is of bulk', { layer: bulk }, { vOverI: true, resistivity: false }, ['wafer.thicknessUm']],
    ['is of bulk with a thickness', { layer: bulk, wafer: { thicknessUm: 725 } }, { vOverI: true, resistivity: false }, ['probe.spacingMm']],
    ['is of bulk, reported as resistivity', { layer: bulk }, { vOverI: false, resistivity: true }, []],
  ])('a procedure that %s', (_, written, gives, keys) => {
    expect(neededForReadings(good(written), gives, file).map((problem) => 'key' in problem && problem.key)).toEqual(keys)
  }) // prettier-ignore
})
