/**
 * Random numbers from a seed: the same seed gives the same numbers on every machine. Nothing in core draws any by itself;
 * whoever wants a Monte Carlo calculation hands in the seed.
 *
 * Source: xoshiro128**, D. Blackman and S. Vigna, ACM Trans. Math. Softw. 47 (2021) 36; seeded by splitmix32 (from memory),
 * as its authors ask for a generator of another kind to fill the state.
 */
export interface RandomSource {
  /** Uniform in (0, 1), 53 bits. */
  uniform(): number
  /** Normal, mean 0, standard deviation 1. */
  normal(): number
}

export function seededRandom(seed: number): RandomSource {
  const next = xoshiro128(splitmix32(seed, 4))
  let spare = NaN

  function uniform(): number {
    const high = next() >>> 5
    const low = next() >>> 6
    return (high * 67108864 + low + 0.5) / 9007199254740992
  }

  /** Polar method of G. Marsaglia and T. Bray, SIAM Rev. 6 (1964) 260: two at a time. */
  function normal(): number {
    if (!Number.isNaN(spare)) {
      const kept = spare
      spare = NaN
      return kept
    }
    for (;;) {
      const u = 2 * uniform() - 1
      const v = 2 * uniform() - 1
      const s = u * u + v * v
      if (s >= 1 || s === 0) continue
      const factor = Math.sqrt((-2 * Math.log(s)) / s)
      spare = v * factor
      return u * factor
    }
  }

  return { uniform, normal }
}

/** The generator's 32-bit outputs from a state of four words, not all zero. */
export function xoshiro128(state: Uint32Array): () => number {
  const s = state.slice()
  return () => {
    const result = Math.imul(rotated(Math.imul(s[1], 5), 7), 9) >>> 0
    const t = s[1] << 9
    s[2] ^= s[0]
    s[3] ^= s[1]
    s[1] ^= s[2]
    s[0] ^= s[3]
    s[2] ^= t
    s[3] = rotated(s[3], 11)
    return result
  }
}

function rotated(word: number, by: number): number {
  return (word << by) | (word >>> (32 - by))
}

function splitmix32(seed: number, count: number): Uint32Array {
  const words = new Uint32Array(count)
  let state = seed >>> 0
  for (let i = 0; i < count; i++) {
    state = (state + 0x9e3779b9) >>> 0
    let z = state
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b)
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35)
    words[i] = z ^ (z >>> 16)
  }
  return words
}
