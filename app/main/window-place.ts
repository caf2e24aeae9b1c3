/** Where the window stood last, brought back to where a screen is. */
import { readFile } from 'node:fs/promises'
import { basename, dirname } from 'node:path'
import { writeWhole } from '../host/write-whole'

export interface Place {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

export const SMALLEST = { width: 640, height: 480 } as const
const USUAL = { width: 1280, height: 860 } as const

/** How much of the window must be on a screen for it to stay: enough of its title bar to take hold of. */
const HOLD_px = 120

/**
 * The place the window opens at.
 *
 * @param saved    where it stood last; null for the middle of the first screen
 * @param screens  work areas, the main one first
 */
export function windowPlace(saved: Place | null, screens: readonly Place[]): Place {
  const [main] = screens
  const home = saved && screens.find((screen) => isWithin(saved, screen))
  const screen = home ?? main
  const width = Math.min(Math.max(saved?.width ?? USUAL.width, SMALLEST.width), screen.width)
  const height = Math.min(Math.max(saved?.height ?? USUAL.height, SMALLEST.height), screen.height)
  if (saved && home) {
    const x = clamp(saved.x, screen.x - width + HOLD_px, screen.x + screen.width - HOLD_px)
    return { x, y: clamp(saved.y, screen.y, screen.y + screen.height - HOLD_px), width, height }
  }
  const middle = (start: number, room: number, size: number) => Math.round(start + (room - size) / 2)
  return { x: middle(screen.x, screen.width, width), y: middle(screen.y, screen.height, height), width, height }
}

/** Its title bar can be taken hold of there. */
function isWithin({ x, y, width }: Place, screen: Place): boolean {
  const seen = Math.min(x + width, screen.x + screen.width) - Math.max(x, screen.x)
  return seen >= HOLD_px && y >= screen.y - 1 && y <= screen.y + screen.height - HOLD_px
}

function clamp(value: number, least: number, most: number): number {
  return Math.min(Math.max(value, least), most)
}

export async function readPlace(path: string): Promise<Place | null> {
  try {
    const { x, y, width, height } = JSON.parse(await readFile(path, 'utf8')) as Record<string, unknown>
    const numbers = [x, y, width, height].map(Number)
    return numbers.every(Number.isSafeInteger)
      ? { x: numbers[0], y: numbers[1], width: numbers[2], height: numbers[3] }
      : null
  } catch {
    return null
  }
}

/** Where the window stands is no reason to fail. */
export function writePlace(path: string, { x, y, width, height }: Place): Promise<void> {
  const text = `${JSON.stringify({ x, y, width, height })}\n`
  return writeWhole(dirname(path), new Map([[basename(path), text]])).catch(() => undefined)
}
