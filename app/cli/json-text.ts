/** Two-space indent, a line break at the end; a number that doesn't exist is null, since JSON has no NaN. */
export function jsonText(object: object): string {
  const known = (_key: string, value: unknown): unknown =>
    typeof value === 'number' && !Number.isFinite(value) ? null : value
  return `${JSON.stringify(object, known, 2)}\n`
}
