/** Paints many small pictures a few a frame, so that the window answers in between. */

type Paint = () => void

const BUDGET_ms = 14
const waiting = new Set<Paint>()
let isAsked = false

/** Paints soon, in the order of the calls; returns how to drop it. */
export function paintSoon(paint: Paint): () => void {
  waiting.add(paint)
  if (!isAsked) {
    isAsked = true
    requestAnimationFrame(paintSome)
  }
  return () => waiting.delete(paint)
}

function paintSome(): void {
  const start = performance.now()
  for (const paint of waiting) {
    waiting.delete(paint)
    paint()
    if (performance.now() - start > BUDGET_ms) break
  }
  isAsked = waiting.size > 0
  if (isAsked) requestAnimationFrame(paintSome)
}
