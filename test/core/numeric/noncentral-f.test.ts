import { describe, expect, it } from 'vitest'
import { fProbability } from '../../../core/numeric/distributions'
import { noncentralFProbability } from '../../../core/numeric/noncentral-f'
import { normalProbabilityBetween } from '../../../core/numeric/normal'
import { gaussLegendre, integratePanels } from '../../../core/numeric/quadrature'

/** ln Gamma(nu/2) of a whole nu, by its recursion from Gamma(1/2) = root pi and Gamma(1) = 1. */
function lnGammaOfHalf(nu: number): number {
  let sum = nu % 2 === 1 ? Math.log(Math.PI) / 2 : 0
  for (let k = nu - 2; k > 0; k -= 2) sum += Math.log(k / 2)
  return sum
}

/**
 * With one degree of freedom in the numerator F is (z + root lambda)^2 over chi-square/nu: an integral over the root of
 * the latter, s, whose density is 2 (nu/2)^(nu/2) s^(nu - 1) exp(-nu s^2/2)/Gamma(nu/2).
 */
function byIntegral(f: number, nu: number, lambda: number): number {
  const delta = Math.sqrt(lambda)
  const constant = Math.LN2 + (nu / 2) * Math.log(nu / 2) - lnGammaOfHalf(nu)
  const integrand = (s: number): number => {
    const reach = Math.sqrt(f) * s
    return (
      Math.exp(constant + (nu - 1) * Math.log(s) - (nu * s * s) / 2) *
      normalProbabilityBetween(-reach - delta, reach - delta)
    )
  }
  const spread = 1 / Math.sqrt(2 * nu)
  const [from, to] = [Math.max(1e-12, 1 - 14 * spread), 1 + 14 * spread + 4 / nu]
  const edges = Array.from({ length: 401 }, (_, k) => from + ((to - from) * k) / 400)
  return integratePanels(integrand, edges, gaussLegendre(16))
}

describe('the noncentral F distribution', () => {
  it('agrees with an integral over the spread, one effect in the numerator', () => {
    let worst = 0
    for (const nu of [3, 7, 23, 47, 223, 998]) {
      for (const lambda of [0.01, 0.5, 3, 12, 60, 400, 3000]) {
        for (const f of [0.1, 1, 4, 9, lambda, 1.2 * lambda + 2]) {
          worst = Math.max(worst, Math.abs(noncentralFProbability(f, 1, nu, lambda) - byIntegral(f, nu, lambda)))
        }
      }
    }
    console.log(`noncentral F, largest difference from the integral: ${worst.toExponential(1)}`)
    expect(worst).toBeLessThan(5e-11)
  })

  it('without an effect is the central one', () => {
    for (const f of [0.2, 1, 5]) expect(noncentralFProbability(f, 3, 20, 0)).toBeCloseTo(fProbability(f, 3, 20), 12)
  })
}) // prettier-ignore
