/** The limits something is judged by. Either may be missing; with neither nothing is judged. */
export interface Limits {
  readonly lower?: number | undefined
  readonly upper?: number | undefined
}

export function hasLimits(limits: Limits | undefined): limits is Limits {
  return limits !== undefined && (limits.lower !== undefined || limits.upper !== undefined)
}

/** Which side of the limits a value lies: a value exactly on a limit is inside. NaN lies nowhere: null. */
export function sideOf(value: number, limits: Limits): 'below' | 'inside' | 'above' | null {
  if (Number.isNaN(value)) return null
  if (limits.lower !== undefined && value < limits.lower) return 'below'
  if (limits.upper !== undefined && value > limits.upper) return 'above'
  return 'inside'
}
