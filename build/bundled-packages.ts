import { mkdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Plugin } from 'vite'

/** The folder of the package that a module lies in, from the innermost `node_modules/` on; null for our own. */
function packageOf(id: string): string | null {
  const path = id.split('\\').join('/').replace(/^\0+/, '')
  return /^(?:.*\/)?(node_modules\/(?:@[^/]+\/)?[^/?]+)/.exec(path)?.[1] ?? null
}

/** Every worker is a build of its own. */
const parts: Record<string, Set<string>> = {}

/**
 * Leaves a list of the packages whose code a build took in, for the gathering of licences: what is bundled ships, whether
 * `package.json` calls it a dependency or a tool.
 */
export function bundledPackages(folder: string, part: string): Plugin {
  const found = (parts[part] ??= new Set())
  return {
    name: 'persquare:bundled-packages',
    apply: 'build',
    generateBundle(_, bundle) {
      for (const piece of Object.values(bundle)) {
        const ids = piece.type === 'chunk' ? piece.moduleIds : piece.originalFileNames
        for (const id of ids) {
          const name = packageOf(id)
          if (name) found.add(name)
        }
      }
      mkdirSync(folder, { recursive: true })
      writeFileSync(join(folder, `${part}.json`), JSON.stringify([...found].sort(), null, 2))
    },
  }
}
