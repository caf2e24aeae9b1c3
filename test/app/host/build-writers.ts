import { join } from 'node:path'
import { build } from 'vite'

/** Bundles the writers into a folder, for plain Node. @returns the path of the module */
export async function buildWriters(outDir: string): Promise<string> {
  const entry = join(import.meta.dirname, 'writers.ts')
  const output = { entryFileNames: 'writers.mjs' }
  await build({ configFile: false, logLevel: 'silent', build: { ssr: entry, outDir, rolldownOptions: { output } } })
  return join(outDir, 'writers.mjs')
}
