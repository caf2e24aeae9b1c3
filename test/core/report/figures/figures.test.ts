import { describe, expect, it } from 'vitest'
import type { Drawing, Shape, TextShape } from '../../../../core/report/drawing'
import { labelWidth_pt } from '../../../../core/report/drawing'
import type { Block } from '../../../../core/report/document'
import { lotReport } from '../../../../core/report/lot-report'
import { toSvg } from '../../../../core/report/to-svg'
import { expectGoldenSvg } from '../../../fixtures/report/golden-svg'
import { syntheticLot } from '../../../fixtures/report/synthetic-lot'

const report = lotReport({
  analysis: syntheticLot(),
  working: null,
  date: '2026-03-14T09:30:00+01:00',
  program: 'Persquare',
  paper: 'A4',
  sources: [],
})
const figures = figuresIn(report.blocks)
const named = (start: string) => figures.find((figure) => figure.title.startsWith(start))!

describe('figures as they were looked at', () => {
  it.each([
    ['wafer-map-edge-high', 'Wafer 07: map'],
    ['wafer-map-tilted', 'Wafer 15: map'],
    ['wafer-map-stray-site', 'Wafer 20: map'],
    ['lot-strip', 'Maps of lot'],
    ['radial-profile', 'Wafer 07: radial profile'],
    ['histogram', 'Wafer 07: histogram'],
    ['wafer-means', 'Wafer means'],
  ])('%s', (name, start) => {
    expectGoldenSvg(name, toSvg(named(start), { idPrefix: name }))
  })
})

describe('every figure of the report', () => {
  it('says what it shows', () => {
    for (const figure of figures) {
      expect(figure.title.length).toBeGreaterThan(5)
      expect(figure.description.length).toBeGreaterThan(20)
    }
  })

  it('has no text on another text, and none over its border', () => {
    for (const figure of figures) {
      const boxes = textBoxes(figure.shapes, 0, 0)
      const collisions = boxes.flatMap((box, i) => boxes.slice(i + 1).filter((other) => meets(box, other)).map((other) => `${figure.title}: "${box.text}" and "${other.text}"`)) // prettier-ignore
      expect(collisions).toEqual([])
      expect(outside(boxes, figure)).toEqual([])
    }
  })
})

/** Also those that stand in columns. */
function figuresIn(blocks: readonly Block[]): readonly Drawing[] {
  return blocks.flatMap((block) => {
    if (block.kind === 'columns') return block.columns.flatMap(figuresIn)
    return block.kind === 'figures' ? block.figures : []
  })
}

interface TextBox {
  readonly text: string
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

function textBoxes(shapes: readonly Shape[], dx: number, dy: number): TextBox[] {
  return shapes.flatMap((shape): TextBox[] => {
    if (shape.kind === 'group') return textBoxes(shape.shapes, dx + shape.x_pt, dy + shape.y_pt)
    return shape.kind === 'text' ? [boxOf(shape, dx, dy)] : []
  })
}

function boxOf({ text, x_pt, y_pt, size_pt, anchor }: TextShape, dx: number, dy: number): TextBox {
  const width = labelWidth_pt(text, size_pt)
  const left = dx + x_pt - { start: 0, middle: width / 2, end: width }[anchor]
  return { text, left, right: left + width, top: dy + y_pt - 0.72 * size_pt, bottom: dy + y_pt }
}

function meets(a: TextBox, b: TextBox): boolean {
  return a.left < b.right && a.right > b.left && a.top < b.bottom && a.bottom > b.top
}

function outside(boxes: readonly TextBox[], { width_pt, height_pt }: Drawing): string[] {
  return boxes.filter((box) => box.left < -1 || box.right > width_pt + 1 || box.top < -1 || box.bottom > height_pt + 3).map((box) => box.text) // prettier-ignore
}
