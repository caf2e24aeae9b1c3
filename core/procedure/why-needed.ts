/** Why a key can't be left out, as the end of the sentence "it is needed because ...". */
const REASONS: Readonly<Record<string, string>> = {
  format: 'it says which edition of the procedure format the file is written in',
  'wafer.diameterMm': 'edge exclusion and dies are laid out from the edge of the disc',
  'wafer.widthMm': 'a rectangle has a width (along x)',
  'wafer.heightMm': 'a rectangle has a height (along y)',
  'wafer.thicknessUm':
    'the whole thickness of a bulk wafer conducts: its resistivity is sheet resistance times thickness',
  'probe.spacingMm': 'the corrections for the edge and the thickness are counted in probe spacings',
  'probe.orientation.angleDeg': 'it gives the direction of the pin line from +x',
  'layer.kind': 'it says what the sheet resistance is turned into',
  'layer.dopant': 'the mobility depends on the dopant',
  'layer.constantMobility': 'mobility "constant" takes its two numbers from here',
  'layer.constantMobility.electronsCm2Vs': 'mobility "constant" takes the electrons\' mobility from here',
  'layer.constantMobility.holesCm2Vs': 'mobility "constant" takes the holes\' mobility from here',
  'layer.profile': 'the concentration depends on how the dopant falls off with depth',
  'layer.depthUm': 'the dopant is spread down to the junction, so its concentration needs the junction depth',
  'layer.profileFile': 'profile "tabulated" takes its shape from this file',
  'layer.background': 'the junction lies where the profile has come down to the background',
  'layer.background.dopant': "its type must be opposite to the layer's",
  'layer.background.concentrationCm3': 'the junction lies where the profile has come down to it',
  'layer.rangeUm': 'the buried profile is centred on it',
  'layer.straggleUm': 'it is the width of the buried profile',
  'layer.resistivityOhmCm':
    'a film needs its resistivity, to give its thickness, or its thicknessUm, to give its resistivity',
  'limits.uniformityPercent.upper': 'without it there is no uniformity limit to judge by',
  'dieGrid.pitchXMm': 'the dies are as wide as it',
  'dieGrid.pitchYMm': 'the dies are as high as it',
  'reported.factor': 'V/I is recovered by dividing the reported sheet resistance by it',
}

export function whyNeeded(key: string): string {
  if (/^readings\.columns\..+\.header$/.test(key)) return 'it names the header of the column in the readings'
  return Object.hasOwn(REASONS, key) ? REASONS[key] : 'it has no safe default'
}
