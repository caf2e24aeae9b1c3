/** Limits that contradict themselves, each other or the quantity that is judged. */
import type { ProcedureProblem } from '../problems/problem'
import type { Blame, Sections } from './blame'
import type { Procedure } from './schema'

type Limits = Procedure['limits']
type LimitKey = 'sheetResistanceOhmSq' | 'waferMeanOhmSq' | 'resistivityOhmCm' | 'waferMeanOhmCm'

const ON_SHEET_RESISTANCE = ['sheetResistanceOhmSq', 'waferMeanOhmSq'] as const satisfies readonly LimitKey[]
const ON_RESISTIVITY = ['resistivityOhmCm', 'waferMeanOhmCm'] as const satisfies readonly LimitKey[]

export function limitChecks({ limits, quantity }: Sections, blame: Blame): readonly ProcedureProblem[] {
  if (!limits) return []
  return [
    ...[...ON_SHEET_RESISTANCE, ...ON_RESISTIVITY].flatMap((key) => orderChecks(limits[key], `limits.${key}`, blame)),
    ...quantityChecks(limits, quantity, blame),
  ]
}

function orderChecks(limit: Limits[LimitKey], key: string, blame: Blame): readonly ProcedureProblem[] {
  const { lower, upper, target } = limit ?? {}
  if (lower !== undefined && upper !== undefined && lower > upper) return [blame.reversed(key, lower, upper)]
  if (target === undefined) return []
  if (lower !== undefined && target < lower) return [blame.reversed(`${key}.target`, lower, target)]
  if (upper !== undefined && target > upper) return [blame.reversed(`${key}.target`, target, upper)]
  return []
}

/** One lot is judged by one quantity. */
function quantityChecks(limits: Limits, quantity: Procedure['quantity'], blame: Blame): readonly ProcedureProblem[] {
  const sheet = ON_SHEET_RESISTANCE.find((key) => limits[key] !== undefined)
  const bulk = ON_RESISTIVITY.find((key) => limits[key] !== undefined)
  if (sheet && bulk) {
    const allowed = `nothing beside limits.${sheet}: a lot is judged by its sheet resistance or by its resistivity, not by both`
    return [blame.bad(`limits.${bulk}`, limits[bulk], allowed)]
  }
  if (quantity === 'resistivity' && sheet) {
    return [blame.bad('quantity', quantity, `"sheet-resistance", or no key at all, with limits.${sheet}`)]
  }
  if (quantity === 'sheet-resistance' && bulk) {
    return [blame.bad('quantity', quantity, `"resistivity", or no key at all, with limits.${bulk}`)]
  }
  return []
}
