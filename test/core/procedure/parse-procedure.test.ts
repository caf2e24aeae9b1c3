import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { explain } from '../../../core/problems/explain'
import { keyPaths } from '../../../core/procedure/keys'
import { parseProcedure } from '../../../core/procedure/parse-procedure'

const file = 'TB-0417.procedure.json'
const format = 'persquare-procedure/1'
const parse = (written: object) => parseProcedure(JSON.stringify({ format, ...written }), file)
const problemsOf = (written: object) => parse(written).problems
const kindsOf = (written: object) =>
  problemsOf(written).map((problem) => `${problem.kind} ${'key' in problem ? problem.key : ''}`)

const boron = {
  kind: 'doped-layer',
  dopant: 'boron',
  profile: 'gaussian',
  depthUm: 0.35,
  background: { dopant: 'phosphorus', concentrationCm3: 1e15 },
}
const documented = {
  format,
  title: 'Boron source/drain monitor',
  wafer: { shape: 'disc', diameterMm: 200, thicknessUm: 725, fiducial: 'notch', edgeExclusionMm: 5 },
  probe: { spacingMm: 1, pinSpacingsMm: [1, 1, 1], orientation: { angleDeg: 0 }, technique: 'single' },
  layer: { ...boron, mobility: 'masetti' },
  temperature: { referenceC: 23 },
  limits: {
    sheetResistanceOhmSq: { target: 92, lower: 87, upper: 97 },
    waferMeanOhmSq: { lower: 89, upper: 95 },
    uniformityPercent: { upper: 1.5 },
  },
  dieGrid: { pitchXMm: 10, pitchYMm: 8, offsetXMm: 0, offsetYMm: 0 },
  uncertainty: { currentRel: 0.0002, voltageRel: 0.0003, spacingMm: 0.005, thicknessUm: 1, temperatureC: 0.3 },
}

describe('a good procedure', () => {
  it('comes out as written, with what was left out filled in and named', () => {
    const { procedure, defaults, problems } = parse(documented)
    expect(problems).toEqual([])
    expect(procedure).toMatchObject(documented)
    expect(defaults).toEqual([
      { key: 'wafer.back', value: '"insulating"' },
      { key: 'limits.uniformityPercent.definition', value: '"sup"' },
      { key: 'limits.allowedSitesOut', value: '0' },
      { key: 'acceptance.rule', value: '"simple"' },
      { key: 'acceptance.guardFactor', value: '1' },
      { key: 'acceptance.maximumFalseAcceptRisk', value: '0.05' },
      { key: 'statistics.confidence', value: '0.95' },
      { key: 'statistics.outliers.alpha', value: '0.05' },
      { key: 'statistics.outliers.leaveOut', value: 'false' },
      { key: 'map.interpolation', value: '"thin-plate-spline"' },
      { key: 'uncertainty.thermalEmfUV', value: '0' },
      { key: 'uncertainty.spacingWanderMm', value: '0' },
      { key: 'uncertainty.orientationDeg', value: '0' },
      { key: 'uncertainty.temperatureCoefficientPercentPerC', value: '0' },
      { key: 'uncertainty.diameterMm', value: '0' },
      { key: 'uncertainty.positionMm', value: '0' },
      { key: 'uncertainty.repeatabilityRel', value: '0' },
      { key: 'uncertainty.depthUm', value: '0' },
      { key: 'uncertainty.mobilityRel', value: '0' },
      { key: 'uncertainty.reportedRel', value: '0' },
      {
        key: 'uncertainty.shared',
        value:
          '["currentRel","spacingMm","orientationDeg","thicknessUm","temperatureC","temperatureCoefficientPercentPerC","diameterMm","depthUm","mobilityRel"]',
      },
      { key: 'uncertainty.degreesOfFreedom', value: '{}' },
      { key: 'readings.columns', value: '{}' },
    ])
  })

  it('needs nothing but its format, and then names every default', () => {
    const { procedure, defaults, problems } = parse({})
    expect(problems).toEqual([])
    expect(procedure?.layer).toEqual({ kind: 'sheet' })
    const keys = defaults.map(({ key }) => key)
    expect(keys).toContain('layer.kind')
    expect(keys).toContain('probe.orientation.angleDeg')
    expect(keys).toContain('wafer.edgeExclusionMm')
    expect(new Set(keys).size).toBe(keys.length)
  })

  it('names no default that the file states, even at the same value', () => {
    const { procedure } = parse({})
    const { defaults } = parseProcedure(JSON.stringify(procedure), file)
    expect(defaults).toEqual([])
  })

  it('may begin with a byte order mark', () => {
    expect(parseProcedure(`\uFEFF${JSON.stringify(documented)}`, file)).toEqual(parse(documented))
  })

  it.each(['radial', 'tangential', { angleDeg: 45 }])('may have the pin line lie %j', (orientation) => {
    expect(parse({ probe: { orientation } }).procedure?.probe.orientation).toEqual(orientation)
  })

  it('may map columns by name, or by name and unit', () => {
    const columns = { voltage_V: 'U', current_A: { header: 'I', unit: 'mA' } }
    expect(parse({ readings: { columns } }).procedure?.readings.columns).toEqual(columns)
  })

  it.each([
    [{ kind: 'bulk', dopant: 'boron' }],
    [{ kind: 'bulk', dopant: 'arsenic', mobility: 'constant', constantMobility: { electronsCm2Vs: 1, holesCm2Vs: 2 } }],
    [{ kind: 'implant', dopant: 'arsenic', rangeUm: 0.1, straggleUm: 0.04 }],
    [{ kind: 'film', resistivityOhmCm: 2.8e-6 }],
    [{ kind: 'film', thicknessUm: 0.5 }],
  ])('may have the layer %j', (layer) => {
    expect(parse({ layer }).problems).toEqual([])
  })
})

describe('what is no JSON', () => {
  it('is placed by line and column', () => {
    expect(parseProcedure('{\n  "format": "x",\n}', file).problems).toEqual([
      { kind: 'not-json', file, why: 'line 3, column 1: a comma stands before the closing }' },
    ])
  })

  it('includes the empty file', () => {
    expect(parseProcedure('', file).problems[0]).toMatchObject({ kind: 'not-json' })
  })
})

describe('keys', () => {
  it.each([
    [{ limit: {} }, 'limit', 'limits'],
    [{ wafer: { diametreMm: 200 } }, 'wafer.diametreMm', 'wafer.diameterMm'],
    [{ limits: { waferMeanOhmSq: { uper: 95 } } }, 'limits.waferMeanOhmSq.uper', 'limits.waferMeanOhmSq.upper'],
    [{ probe: { orientation: { angleDeg: 0, tilt: 1 } } }, 'probe.orientation.tilt', null],
    [{ probe: { orientation: { angel: 0 } } }, 'probe.orientation.angel', null],
    [{ layer: { kind: 'film', thicknessUm: 1, thickness: 2 } }, 'layer.thickness', 'layer.thicknessUm'],
    [{ readings: { columns: { voltage_v: 'U' } } }, 'readings.columns.voltage_v', 'readings.columns.voltage_V'],
    // Right in another object.
    [{ diameterMm: 200 }, 'diameterMm', 'wafer.diameterMm'],
  ])('%j is unknown', (written, key, nearest) => {
    expect(problemsOf(written)).toContainEqual(expect.objectContaining({ kind: 'unknown-key', key, nearest }))
  })

  it('offers the keys of the layer kind that is meant, and no others', () => {
    const [problem] = problemsOf({ layer: { kind: 'film', resistivityOhmCm: 1, depthUm: 2 } })
    expect(problem).toMatchObject({ kind: 'unknown-key', key: 'layer.depthUm', known: ['kind', 'resistivityOhmCm', 'thicknessUm'] }) // prettier-ignore
  })

  it('does not call a misspelt key missing as well', () => {
    const { depthUm, ...rest } = boron
    expect(kindsOf({ layer: { ...rest, dephtUm: depthUm } })).toEqual(['unknown-key layer.dephtUm'])
    expect(kindsOf({ wafer: { diametreMm: 200, edgeExclusionMm: 3 } })).toEqual(['unknown-key wafer.diametreMm'])
  })

  it.each(['__proto__', 'constructor', 'toString', 'hasOwnProperty'])('named %s are harmless and unknown', (key) => {
    for (const [text, path] of [
      [`{"format":"${format}","${key}":{"x":1}}`, key],
      [`{"format":"${format}","wafer":{"${key}":1}}`, `wafer.${key}`],
      [`{"format":"${format}","layer":{"kind":"film","thicknessUm":1,"${key}":1}}`, `layer.${key}`],
      [`{"format":"${format}","readings":{"columns":{"${key}":"a"}}}`, `readings.columns.${key}`],
    ] as const) {
      expect(parseProcedure(text, file).problems).toMatchObject([{ kind: 'unknown-key', key: path, nearest: null }])
    }
    expect(({} as Record<string, unknown>)['x']).toBeUndefined()
  })

  it('may not stand twice', () => {
    const { problems } = parseProcedure(`{"format":"${format}","wafer":{"diameterMm":200,"diameterMm":300}}`, file)
    expect(problems).toMatchObject([{ kind: 'bad-value', key: 'wafer.diameterMm', found: 'the key twice' }])
  })

  it.each([
    [{ layer: { kind: 'bulk' } }, 'layer.dopant'],
    [{ layer: { ...boron, profile: undefined } }, 'layer.profile'],
    [{ layer: { ...boron, depthUm: undefined } }, 'layer.depthUm'],
    [{ layer: { ...boron, background: undefined } }, 'layer.background'],
    [{ layer: { ...boron, background: { dopant: 'arsenic' } } }, 'layer.background.concentrationCm3'],
    [{ layer: { kind: 'implant', dopant: 'boron', straggleUm: 0.1 } }, 'layer.rangeUm'],
    [{ layer: { kind: 'implant', dopant: 'boron', rangeUm: 0.1 } }, 'layer.straggleUm'],
    [{ layer: {} }, 'layer.kind'],
    [{ layer: { kind: 'film' } }, 'layer.resistivityOhmCm'],
    [{ layer: { kind: 'bulk', dopant: 'boron', mobility: 'constant' } }, 'layer.constantMobility'],
    [{ wafer: { diameterMm: 200 }, dieGrid: { pitchYMm: 8 } }, 'dieGrid.pitchXMm'],
    [{ probe: { orientation: {} } }, 'probe.orientation.angleDeg'],
    [{ limits: { uniformityPercent: {} } }, 'limits.uniformityPercent.upper'],
    [{ reported: {} }, 'reported.factor'],
    [{ readings: { columns: { voltage_V: {} } } }, 'readings.columns.voltage_V.header'],
    [{ wafer: { edgeExclusionMm: 3 } }, 'wafer.diameterMm'],
    [{ dieGrid: { pitchXMm: 10, pitchYMm: 8 } }, 'wafer.diameterMm'],
    [{ wafer: { shape: 'rectangle', heightMm: 20 } }, 'wafer.widthMm'],
    [{ wafer: { shape: 'rectangle', widthMm: 20 } }, 'wafer.heightMm'],
    [{ format: undefined }, 'format'],
  ])('%j lacks %s', (written, key) => {
    const problems = problemsOf(written)
    expect(problems).toMatchObject([{ kind: 'missing-key', key }])
    expect(explain(problems[0]!)).not.toContain('it has no safe default')
  })
})

describe('values', () => {
  it.each([
    [{ format: 'persquare-procedure/2' }, 'format', '"persquare-procedure/2"', '"persquare-procedure/1": a newer edition needs a newer program'],
    [{ format: 'procedure' }, 'format', '"procedure"', '"persquare-procedure/1"'],
    [{ title: 7 }, 'title', '7', 'a text of at most 200 characters'],
    [{ wafer: { shape: 'disk' } }, 'wafer.shape', '"disk"', '"disc" or "rectangle"'],
    [{ wafer: { thicknessUm: 0 } }, 'wafer.thicknessUm', '0', 'a number above 0 and up to 20000 µm'],
    [{ wafer: { thicknessUm: '725' } }, 'wafer.thicknessUm', '"725"', 'a number above 0 and up to 20000 µm'],
    [{ wafer: { diameterMm: null } }, 'wafer.diameterMm', 'null', 'a number above 0 and up to 1000 mm'],
    [{ wafer: [] }, 'wafer', '[]', /^an object in braces with keys from shape, diameterMm, /],
    [{ probe: { pinSpacingsMm: [1, -1, 1] } }, 'probe.pinSpacingsMm[1]', '-1', 'a number above 0 and up to 50 mm'],
    [{ probe: { pinSpacingsMm: [1, 1] } }, 'probe.pinSpacingsMm', '[1,1]', 'a list in square brackets of 3 values, each a number above 0 and up to 50 mm'],
    [{ probe: { orientation: 'up' } }, 'probe.orientation', '"up"', 'an object in braces with keys from angleDeg, or "radial" or "tangential"'],
    [{ probe: { orientation: { angleDeg: 999 } } }, 'probe.orientation.angleDeg', '999', 'a number from -360 to 360 °'],
    [{ layer: { kind: 'epi' } }, 'layer.kind', '"epi"', '"sheet", "bulk", "doped-layer", "implant" or "film"'],
    [{ layer: 3 }, 'layer', '3', 'an object in braces whose "kind" is "sheet", "bulk", "doped-layer", "implant" or "film"'],
    [{ layer: { ...boron, background: { dopant: 'arsenic', concentrationCm3: 5 } } }, 'layer.background.concentrationCm3', '5', 'a number from 1e10 to 1e20 cm⁻³'],
    [{ layer: { kind: 'bulk', dopant: 'boron', mobility: 'none' } }, 'layer.mobility', '"none"', /"masetti", "arora"/],
    [{ temperature: { referenceC: 300 } }, 'temperature.referenceC', '300', 'a number from 18 to 28 °C'],
    [{ temperature: { coefficientPercentPerC: 50 } }, 'temperature.coefficientPercentPerC', '50', 'a number from -10 to 10 %/°C'],
    [{ limits: { waferMeanOhmSq: { lower: -1 } } }, 'limits.waferMeanOhmSq.lower', '-1', 'a number above 0 Ω/sq'],
    [{ limits: { allowedSitesOut: 1.5 } }, 'limits.allowedSitesOut', '1.5', 'a whole number from 0 to 1e6'],
    [{ uncertainty: { currentRel: 2 } }, 'uncertainty.currentRel', '2', 'a number from 0 to 1 (a fraction: 0.01 is 1 %)'],
    [{ uncertainty: { shared: ['luck'] } }, 'uncertainty.shared[0]', '"luck"', /"currentRel", "voltageRel"/],
    [{ readings: { delimiter: '|' } }, 'readings.delimiter', '"|"', '",", ";" or "\\t"'],
    [{ readings: { columns: { voltage_V: '' } } }, 'readings.columns.voltage_V', '""', /^a text that is not empty, or an object/],
    [{ readings: { columns: { voltage_V: { header: 7 } } } }, 'readings.columns.voltage_V.header', '7', 'a text that is not empty'],
    [{ title: 'x'.repeat(201) }, 'title', `"${'x'.repeat(58)}…`, 'a text of at most 200 characters'],
  ])('%j is refused at %s', (written, key, found, allowed) => {
    const words = typeof allowed === 'string' ? allowed : (expect.stringMatching(allowed) as string)
    expect(problemsOf(written)).toEqual([{ kind: 'bad-value', file, key, found, allowed: words }])
  }) // prettier-ignore

  it.each(['3', '[]', 'null', '"text"'])('the file may not be just %s', (text) => {
    expect(parseProcedure(text, file).problems).toMatchObject([{ kind: 'bad-value', key: '', found: text }])
  })
})

describe('several problems', () => {
  it('are all collected, each once, and the same each time', () => {
    const written = {
      title: 5,
      wafer: { shape: 'disk', diameterMm: 200, edgeExclusionMm: 100, thickness: 3 },
      layer: { kind: 'film' },
      limits: { waferMeanOhmSq: { lower: 95, upper: 89 } },
    }
    expect(kindsOf(written)).toEqual([
      'bad-value title',
      'bad-value wafer.shape',
      'unknown-key wafer.thickness',
      'bad-value wafer.edgeExclusionMm',
      'missing-key layer.resistivityOhmCm',
      'limits-reversed limits.waferMeanOhmSq',
    ])
    expect(parse(written)).toEqual(parse(written))
    expect(parse(written).procedure).toBeNull()
  })

  it('do not follow from one another: a bad diameter is not also a missing one', () => {
    expect(kindsOf({ wafer: { diameterMm: -200, edgeExclusionMm: 3 } })).toEqual(['bad-value wafer.diameterMm'])
  })
})

describe('whatever is thrown at it', () => {
  const answers = (text: string): void => {
    const { procedure, problems } = parseProcedure(text, file)
    expect(procedure === null).toBe(problems.length > 0)
    for (const problem of problems) expect(explain(problem)).not.toMatch(/undefined|\[object/)
  }

  it('any text', () => {
    fc.assert(fc.property(fc.string(), answers))
  })

  it('any JSON', () => {
    fc.assert(fc.property(fc.json(), answers))
  })

  it('any JSON under any of our keys', () => {
    const places = fc.constantFrom(...keyPaths(), ...keyPaths().map((key) => key.split('.')[0]!))
    fc.assert(
      fc.property(fc.array(fc.tuple(places, fc.jsonValue({ maxDepth: 3 })), { maxLength: 8 }), (entries) => {
        const written: Record<string, unknown> = { format }
        for (const [key, value] of entries) put(written, key.split('.'), value)
        answers(JSON.stringify(written))
      }),
    )
  })
})

function put(into: Record<string, unknown>, [first, ...rest]: readonly string[], value: unknown): void {
  if (first === undefined) return
  const below = into[first]
  if (rest.length === 0) into[first] = value
  else if (typeof below === 'object' && below !== null) put(below as Record<string, unknown>, rest, value)
  else put((into[first] = {}) as Record<string, unknown>, rest, value)
}
