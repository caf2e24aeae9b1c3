import { companionsNamedIn } from '../../core/analysis/companions'

interface Named {
  readonly name: string
}

/**
 * Of the files that a person brought, those that the procedure names (a depth profile, say) are no readings: they go with
 * the procedure. Both the window's analysis and the host's report part them here.
 */
export function partBrought<File extends Named>(
  brought: readonly File[],
  procedure: { readonly name: string; readonly bytes: Uint8Array },
): { readonly readings: readonly File[]; readonly companions: readonly File[] } {
  const names = new Set(companionsNamedIn(procedure).map((name) => name.normalize('NFC')))
  const isCompanion = ({ name }: File): boolean => names.has(name.normalize('NFC'))
  return { readings: brought.filter((file) => !isCompanion(file)), companions: brought.filter(isCompanion) }
}
