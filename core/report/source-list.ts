/** The numbered list of sources that the report's working and last page share. */
import type { FormulaSource } from '../analysis/formula-sources'

export interface NumberedSource {
  readonly number: number
  readonly reference: string
  /** What it is the source of. */
  readonly uses: readonly string[]
}

export interface SourceList {
  readonly entries: readonly NumberedSource[]
  /** Number of a source by its id, or by its reference as a working step gives it; null where it gives none. */
  readonly numberOf: (idOrReference: string) => number | null
}

export interface SourceUse {
  readonly reference: string
  readonly use: string
}

/** One entry a reference, in order of first mention: first the registered ones, then those only a step names. */
export function sourceList(sources: readonly FormulaSource[], uses: readonly SourceUse[]): SourceList {
  const byReference = new Map<string, { number: number; uses: string[] }>()
  const mention = (reference: string, use: string) => {
    const known = byReference.get(reference)
    if (!known) byReference.set(reference, { number: byReference.size + 1, uses: [use] })
    else if (!known.uses.includes(use)) known.uses.push(use)
  }
  const references = new Map(sources.map((source) => [source.id, source.reference.trim()]))
  for (const source of sources) if (source.reference.trim() !== '') mention(source.reference.trim(), source.title)
  for (const { reference, use } of uses) {
    const text = references.get(reference) ?? reference.trim()
    if (text !== '') mention(text, use)
  }
  return {
    entries: [...byReference].map(([reference, { number, uses: list }]) => ({ number, reference, uses: list })),
    numberOf: (key) => byReference.get(references.get(key) ?? key.trim())?.number ?? null,
  }
}
