import { describe, expect, it } from 'vitest'
import { klaassenMobility_cm2_per_Vs, repulsionMinimumAt } from '../../../../core/silicon/mobility/klaassen'
import { masettiMobility_cm2_per_Vs } from '../../../../core/silicon/mobility/masetti'
import { KLAASSEN_HOLES_IN_1E18_PHOSPHORUS, KLAASSEN_P_MIN } from '../../../reference/mobility-papers'

const at = (
  carrier: 'electron' | 'hole',
  dopant: 'boron' | 'phosphorus' | 'arsenic',
  impurity_cm3: number,
  temperature_K = 300,
) => klaassenMobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K })

it('gives holes among 1e18 phosphorus as the paper draws them, not as its table 2 would have them', () => {
  const { r5AsInFigures, r5AsPrinted } = KLAASSEN_HOLES_IN_1E18_PHOSPHORUS
  expect(Math.abs(at('hole', 'phosphorus', 1e18) - r5AsInFigures)).toBeLessThan(0.05)
  expect(Math.abs(at('hole', 'phosphorus', 1e18) - r5AsPrinted)).toBeGreaterThan(10)
})

it('holds G(P) below the published P_min', () => {
  expect(repulsionMinimumAt(1, 1)).toBeCloseTo(KLAASSEN_P_MIN.electron, 4)
  expect(repulsionMinimumAt(1.258, 1)).toBeCloseTo(KLAASSEN_P_MIN.hole, 4)
})

describe('limits', () => {
  it('is the lattice mobility in pure silicon, falling with temperature by theta', () => {
    expect(at('electron', 'phosphorus', 0)).toBe(1414)
    expect(at('hole', 'boron', 0, 400)).toBeCloseTo(470.5 * Math.pow(0.75, 2.247), 10)
  })

  it('equals Masetti for electrons below 1e18: both fit the same curve there', () => {
    for (const dopant of ['phosphorus', 'arsenic'] as const) {
      for (const impurity_cm3 of [1e14, 1e16, 1e17]) {
        const other = masettiMobility_cm2_per_Vs({ carrier: 'electron', dopant, impurity_cm3, temperature_K: 300 })
        expect(Math.abs(at('electron', dopant, impurity_cm3) / other - 1)).toBeLessThan(1e-6)
      }
    }
  })

  it('lets a minority carrier move more freely than a majority carrier among 1e19 impurities, which repel it', () => {
    expect(at('hole', 'phosphorus', 1e19)).toBeGreaterThan(1.5 * at('hole', 'boron', 1e19))
    expect(at('electron', 'boron', 1e19)).toBeGreaterThan(1.5 * at('electron', 'phosphorus', 1e19))
  })

  it('stays finite and positive for both carriers from 100 to 600 K', () => {
    for (const temperature of [100, 200, 300, 450, 600]) {
      for (let decade = 10; decade <= 21; decade++) {
        for (const [carrier, dopant] of [
          ['hole', 'arsenic'],
          ['electron', 'boron'],
          ['hole', 'boron'],
        ] as const) {
          const mobility = at(carrier, dopant, 10 ** decade, temperature)
          expect(mobility > 0 && mobility < 30000, `${carrier} ${decade} ${temperature}: ${mobility}`).toBe(true)
        }
      }
    }
  })
})

/** Written from the paper's formulas for both carriers at once, with all four densities, unlike the project's. */
function secondKlaassen(nd: number, na: number, n: number, p: number, tn: number) {
  const ndStar = nd === 0 ? 0 : nd * (1 + 1 / (0.21 + (4e20 / nd) ** 2))
  const naStar = na === 0 ? 0 : na * (1 + 1 / (0.5 + (7.2e20 / na) ** 2))
  const species = {
    e: {
      max: 1414,
      min: 68.5,
      ref: 9.2e16,
      a: 0.711,
      theta: 2.285,
      m: 1,
      mOther: 1.258,
      own: ndStar,
      alien: naStar,
      other: p,
    },
    h: {
      max: 470.5,
      min: 44.9,
      ref: 2.23e17,
      a: 0.719,
      theta: 2.247,
      m: 1.258,
      mOther: 1,
      own: naStar,
      alien: ndStar,
      other: n,
    },
  }
  const mobilityOf = ({ max, min, ref, a, theta, m, mOther, own, alien, other }: (typeof species)['e']) => {
    const nsc = own + alien + other
    const P = 1 / (2.459 / (3.97e13 * (tn ** 3 / nsc) ** (2 / 3)) + 3.828 / ((1.36e20 / (n + p)) * m * tn ** 2))
    const g = (q: number) =>
      1 - 0.89233 / (0.41372 + q * (tn / m) ** 0.28227) ** 0.19778 + 0.005978 / (q * (m / tn) ** 0.72169) ** 1.80618
    let lowest = Infinity
    for (let q = 0.1; q < 1; q += 0.00005) if (g(q) < lowest) lowest = g(q)
    const G = P < 0.5 && g(P) > lowest && g(P * 1.0001) < g(P) ? lowest : g(P)
    const F = (0.7643 * P ** 0.6478 + 2.2999 + (6.5502 * m) / mOther) / (P ** 0.6478 + 2.367 - (0.8552 * m) / mOther)
    const effective = own + G * alien + other / F
    const muN = (max ** 2 / (max - min)) * tn ** (3 * a - 1.5)
    const muC = (max * min) / (max - min) / Math.sqrt(tn)
    const impurity = muN * (nsc / effective) * (ref / nsc) ** a + (muC * (n + p)) / effective
    return 1 / (1 / (max * tn ** -theta) + 1 / impurity)
  }
  return { electron: mobilityOf(species.e), hole: mobilityOf(species.h) }
}

it('agrees with a second implementation, majority and minority, hot and cold', () => {
  for (const temperature of [220, 300, 420]) {
    for (let decade = 13; decade <= 20.6; decade += 0.4) {
      const density = 10 ** decade
      const nType = secondKlaassen(density, 0, density, 0, temperature / 300)
      const pType = secondKlaassen(0, density, 0, density, temperature / 300)
      const found = [
        at('electron', 'phosphorus', density, temperature) / nType.electron,
        at('hole', 'phosphorus', density, temperature) / nType.hole,
        at('electron', 'boron', density, temperature) / pType.electron,
        at('hole', 'boron', density, temperature) / pType.hole,
      ]
      for (const ratio of found) expect(Math.abs(ratio - 1)).toBeLessThan(1e-7)
    }
  }
})
