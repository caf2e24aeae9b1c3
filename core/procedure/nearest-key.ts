/** The key that a misspelt one was probably meant as, or null where none is near: at most a third of its letters off. */
export function nearestKey(written: string, known: readonly string[]): string | null {
  let best: string | null = null
  let bestDistance = Infinity
  for (const key of known) {
    const distance = editDistance(written.toLowerCase(), key.toLowerCase())
    if (distance < bestDistance) {
      bestDistance = distance
      best = key
    }
  }
  return best !== null && bestDistance <= Math.max(1, Math.floor(best.length / 3)) ? best : null
}

/** Letters to insert, delete, replace or swap with a neighbour (optimal string alignment) to make one text the other. */
export function editDistance(a: string, b: string): number {
  // No key is near this long: the answer may be rough, but the table must stay small.
  if (Math.abs(a.length - b.length) > 64) return Math.abs(a.length - b.length)
  const rows: number[][] = [Array.from({ length: b.length + 1 }, (_, j) => j)]
  for (let i = 1; i <= a.length; i++) {
    const row = [i]
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1]
      let least = Math.min(rows[i - 1][j] + 1, row[j - 1] + 1, rows[i - 1][j - 1] + (same ? 0 : 1))
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]
      if (swapped) least = Math.min(least, rows[i - 2][j - 2] + 1)
      row.push(least)
    }
    rows.push(row)
  }
  return rows[a.length][b.length]
}
