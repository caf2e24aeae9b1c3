/** Paints many small pictures, a few a turn, so that the window answers in between. */

type Paint = () => void

const BUDGET_ms = 50
const waiting = new Set<Paint>()
/** Turns come as messages: frames are far apart where there is no graphics card, and pictures need not wait for them. */
const turns = new MessageChannel()
turns.port1.onmessage = paintSome
let isAsked = false

/** Paints soon, in the order of the calls; returns how to drop it. */
export function paintSoon(paint: Paint): () => void {
  waiting.add(paint)
  askForTurn()
  return () => waiting.delete(paint)
}

function askForTurn(): void {
  if (isAsked) return
  isAsked = true
  turns.port2.postMessage(null)
}

function paintSome(): void {
  isAsked = false
  const start = performance.now()
  for (const paint of waiting) {
    waiting.delete(paint)
    paint()
    if (performance.now() - start > BUDGET_ms) break
  }
  if (waiting.size > 0) askForTurn()
}
