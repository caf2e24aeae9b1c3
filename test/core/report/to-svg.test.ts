import { describe, expect, it } from 'vitest'
import { circle, group, line, polygon, text, type Drawing } from '../../../core/report/drawing'
import { toSvg } from '../../../core/report/to-svg'

const drawing = (shapes: Drawing['shapes'], title = 'A figure'): Drawing => ({
  width_pt: 100,
  height_pt: 50,
  title,
  description: 'What it shows',
  shapes,
})

describe('a drawing as SVG', () => {
  it('carries its title and description for a screen reader', () => {
    const svg = toSvg(drawing([]), { idPrefix: 'map' })
    expect(svg).toContain('<title id="map-title">A figure</title>')
    expect(svg).toContain('<desc id="map-desc">What it shows</desc>')
    expect(svg).toContain('aria-labelledby="map-title map-desc"')
  })

  it('rounds to a hundredth and writes no negative zero', () => {
    const svg = toSvg(drawing([line(1 / 3, -0.001, 20.126, 5, { stroke: '#000000' })]))
    expect(svg).toContain('M0.33 0L20.13 5')
  })

  it('escapes what a file may put into a name', () => {
    const svg = toSvg(drawing([text(0, 0, '<b>&"\u0000', { size_pt: 7, fill: '#000000' })], '5 < 6 & "7"'))
    expect(svg).toContain('5 &lt; 6 &amp; &quot;7&quot;')
    expect(svg).toContain('&lt;b&gt;&amp;&quot; </text>')
  })

  it('closes and fills polygons by the even-odd rule, and clips groups', () => {
    const hole = { ...polygon([0, 0, 9, 0, 9, 9], { fill: '#112233' }), rings: [[0, 0, 9, 0, 9, 9], [2, 1, 3, 1, 3, 2]] } // prettier-ignore
    const svg = toSvg(
      drawing([{ ...group(5, 6, [hole, circle(1, 2, 3, { fill: '#445566' })]), clip: [[0, 0, 9, 0, 9, 9]] }]),
    )
    expect(svg).toContain('fill-rule="evenodd"')
    expect(svg).toContain('M0 0L9 0L9 9ZM2 1L3 1L3 2Z')
    expect(svg).toContain('transform="translate(5 6)"')
    expect(svg).toContain('clip-path="url(#drawing-clip-1)"')
  })
})
