/**
 * Paints many small pictures: at once those that a person would wait for anyhow, the others a few a turn, so that the window
 * answers in between.
 */

type Paint = () => void

/** Until a lot's maps stand there is nothing to click on: they come with the first frame rather than after it. */
const FIRST_BUDGET_ms = 150
const BUDGET_ms = 14
/** After such a pause a picture is the first of a new lot or page. */
const PAUSE_ms = 1000

const waiting = new Set<Paint>()
/** Turns come as messages: frames are far apart where there is no graphics card, and pictures need not wait for them. */
const turns = new MessageChannel()
turns.port1.onmessage = () => paintSome(BUDGET_ms)
let isAsked = false
let last = -Infinity

/** Paints soon, in the order of the calls; returns how to drop it. */
export function paintSoon(paint: Paint): () => void {
  waiting.add(paint)
  if (!isAsked) {
    isAsked = true
    if (performance.now() - last > PAUSE_ms) queueMicrotask(() => paintSome(FIRST_BUDGET_ms))
    else turns.port2.postMessage(null)
  }
  return () => waiting.delete(paint)
}

function paintSome(budget_ms: number): void {
  const start = performance.now()
  for (const paint of waiting) {
    waiting.delete(paint)
    paint()
    last = performance.now()
    if (last - start > budget_ms) break
  }
  isAsked = waiting.size > 0
  if (isAsked) turns.port2.postMessage(null)
}
