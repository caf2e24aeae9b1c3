/**
 * The one formula behind every factor: four pins on a sheet whose generalised log distance is L.
 *
 * A current I fed in at pin `source` and drawn at pin `sink` makes at place i the potential
 * phi(i) = -(Rs I/2 pi) [L(i,source) - L(i,sink)], so between the pins `high` and `low`
 *
 *   V/I = (Rs/2 pi) T,  T = L(high,sink) + L(low,source) - L(high,source) - L(low,sink),  C = Rs/(V/I) = 2 pi/T.
 *
 * Configuration A: current 1-4, voltage 2-3, T = ln 4 on the infinite sheet with equal pitch.
 * Configuration B: current 1-3, voltage 2-4, T = ln 3 (SEMI MF1529-1104).
 * T is unchanged when current and voltage pairs are exchanged, because L is symmetric (reciprocity).
 */
import type { LogDistance } from './outline-geometry'

export type Configuration = 'A' | 'B'

/** Pins counted from 0, in the order of the line. */
export interface Terminals {
  readonly source: number
  readonly sink: number
  readonly high: number
  readonly low: number
}

export const TERMINALS: Readonly<Record<Configuration, Terminals>> = {
  A: { source: 0, sink: 3, high: 1, low: 2 },
  B: { source: 0, sink: 2, high: 1, low: 3 },
}

/** T for any symmetric L given pin by pin. */
export function fourTerminalSum(terminals: Terminals, logDistance: (i: number, j: number) => number): number {
  const { source, sink, high, low } = terminals
  return logDistance(high, sink) + logDistance(low, source) - logDistance(high, source) - logDistance(low, sink)
}

/** Working space of `fourTerminalGradient`: the caller fills x and y; gx and gy receive dT/dx and dT/dy of each pin. */
export interface PinColumns {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly gx: Float64Array
  readonly gy: Float64Array
  readonly pair: Float64Array
}

export function createPinColumns(): PinColumns {
  return {
    x: new Float64Array(4),
    y: new Float64Array(4),
    gx: new Float64Array(4),
    gy: new Float64Array(4),
    pair: new Float64Array(5),
  }
}

/** T of the pins in `pins`, and its gradient to each pin into `pins.gx`, `pins.gy` [1/mm]. Allocates nothing. */
export function fourTerminalGradient(terminals: Terminals, logDistance: LogDistance, pins: PinColumns): number {
  const { gx, gy } = pins
  for (let pin = 0; pin < 4; pin++) {
    gx[pin] = 0
    gy[pin] = 0
  }
  const { source, sink, high, low } = terminals
  return (
    addPair(high, sink, 1, logDistance, pins) +
    addPair(low, source, 1, logDistance, pins) +
    addPair(high, source, -1, logDistance, pins) +
    addPair(low, sink, -1, logDistance, pins)
  )
}

function addPair(i: number, j: number, sign: number, logDistance: LogDistance, pins: PinColumns): number {
  const { x, y, gx, gy, pair } = pins
  logDistance(x[i], y[i], x[j], y[j], pair)
  gx[i] = gx[i] + sign * pair[1]
  gy[i] = gy[i] + sign * pair[2]
  gx[j] = gx[j] + sign * pair[3]
  gy[j] = gy[j] + sign * pair[4]
  return sign * pair[0]
}
