/**
 * What tells two machines apart that make the same report in slightly different ways. A report carries the marks of the
 * machine that made it; where they are those of the machine that verifies it, every byte must come out the same.
 */
import { createHash } from 'node:crypto'
import { deflateSync } from 'node:zlib'

let compression: string | null = null
let arithmetic: string | null = null

/** Builds of zlib may pack the same content into different bytes. */
export function compressionMark(): string {
  return (compression ??= digest(deflateSync(sampleText())))
}

/**
 * Engines round the functions that the language leaves free (exp, log, pow, sines) to one neighbour or the other, so
 * the last digits of a result hang on the engine.
 */
export function arithmeticMark(): string {
  return (arithmetic ??= digest(new Uint8Array(sampleValues().buffer)))
}

function digest(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex').slice(0, 12)
}

/** 64 kB like readings: numbers, some of them again and again. */
function sampleText(): Uint8Array {
  const bytes = new Uint8Array(65_536)
  let state = 1
  for (let k = 0; k < bytes.length; k++) {
    state = (state * 48_271) % 2_147_483_647
    bytes[k] = k % 9 === 8 ? 44 : k % 3 === 0 ? 48 + (k % 7) : 48 + (state % 10)
  }
  return bytes
}

const FREE_FUNCTIONS: readonly ((x: number) => number)[] = [
  Math.exp, Math.expm1, Math.log, Math.log1p, Math.log10, Math.log2, Math.cbrt, Math.sin, Math.cos, Math.tan, Math.asin, Math.acos,
  Math.atan, Math.sinh, Math.cosh, Math.tanh, (x) => Math.pow(x, 0.7), (x) => Math.pow(10, x), (x) => Math.atan2(x, 0.3),
  (x) => Math.hypot(x, 0.9),
] // prettier-ignore
const ARGUMENTS = 500

/** Rounding differs at one argument in many, so of each function many are taken: spread over (0, 1) and up to 20. */
function sampleValues(): Float64Array {
  const values = new Float64Array(FREE_FUNCTIONS.length * ARGUMENTS)
  let state = 1
  for (let k = 0; k < values.length; k++) {
    state = (state * 48_271) % 2_147_483_647
    const share = state / 2_147_483_647
    values[k] = FREE_FUNCTIONS[k % FREE_FUNCTIONS.length](k % 3 === 0 ? 20 * share : share)
  }
  return values
}
