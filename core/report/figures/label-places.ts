/** Small value labels beside their marks, placed so that none lies on another label or another mark. */
import { labelWidth_pt } from '../drawing'

export interface LabelWish {
  readonly x: number
  readonly y: number
  readonly text: string
  /** Nothing to print, but the mark still takes its place. */
  readonly empty: boolean
  readonly preferAbove: boolean
  readonly markHalf: number
  /** How far a label between these heights may reach to either side. */
  readonly room: (top: number, bottom: number) => { readonly left: number; readonly right: number }
  readonly key: number
}

export interface PlacedLabel {
  /** Of its middle. */
  readonly x: number
  readonly halfWidth: number
  readonly baseline: number
  readonly text: string
  readonly key: number
}

interface Box {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

const CELL_PT = 24

/** In the order given; a label with no free place above or below its mark is left out. */
export function placeLabels(wishes: readonly LabelWish[], size_pt: number): PlacedLabel[] {
  const taken = new BoxGrid()
  for (const wish of wishes) taken.add(markBox(wish))
  const placed: PlacedLabel[] = []
  for (const wish of wishes) {
    if (wish.empty) continue
    const half = labelWidth_pt(wish.text, size_pt) / 2
    const offsets = [wish.markHalf + 0.9 * size_pt, -wish.markHalf - 0.4 * size_pt]
    for (const offset of wish.preferAbove ? offsets.reverse() : offsets) {
      const baseline = wish.y + offset
      const top = baseline - 0.75 * size_pt
      const bottom = baseline + 0.1 * size_pt
      const room = wish.room(top, bottom)
      const middle = Math.max(room.left + half, Math.min(room.right - half, wish.x))
      const box = { left: middle - half - 1, right: middle + half + 1, top, bottom }
      // A label pushed away from its mark by more than half its width would seem to belong to another.
      const fits = room.right - room.left >= 2 * half && Math.abs(middle - wish.x) <= half
      if (!fits || taken.hits(box)) continue
      taken.add(box)
      placed.push({ x: middle, halfWidth: half, baseline, text: wish.text, key: wish.key })
      break
    }
  }
  return placed
}

function markBox({ x, y, markHalf }: LabelWish): Box {
  return { left: x - markHalf, right: x + markHalf, top: y - markHalf, bottom: y + markHalf }
}

/** Boxes by the cells they touch, so that thousands of marks stay quick to test against. */
class BoxGrid {
  private readonly cells = new Map<string, Box[]>()

  add(box: Box): void {
    for (const key of keysOf(box)) {
      const cell = this.cells.get(key)
      if (cell) cell.push(box)
      else this.cells.set(key, [box])
    }
  }

  hits(box: Box): boolean {
    return keysOf(box).some((key) =>
      this.cells
        .get(key)
        ?.some(
          (other) =>
            box.left < other.right && box.right > other.left && box.top < other.bottom && box.bottom > other.top,
        ),
    )
  }
}

function keysOf(box: Box): string[] {
  const keys: string[] = []
  for (let i = Math.floor(box.left / CELL_PT); i <= Math.floor(box.right / CELL_PT); i++) {
    for (let j = Math.floor(box.top / CELL_PT); j <= Math.floor(box.bottom / CELL_PT); j++) keys.push(`${i},${j}`)
  }
  return keys
}
