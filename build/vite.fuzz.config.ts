import { resolve } from 'node:path'
import { defineConfig } from 'vite'
import { countBranches } from './fuzz/count-branches'

const root = resolve(import.meta.dirname, '..')

/** The guided fuzzer with the program in it, counting its branches: `npm run fuzz`. */
export default defineConfig({
  root,
  plugins: [countBranches()],
  build: {
    ssr: resolve(root, 'test/fuzz/guided/main.ts'),
    outDir: 'out/fuzz',
    emptyOutDir: true,
    target: 'node20',
    minify: false,
    rolldownOptions: { output: { entryFileNames: 'main.js', codeSplitting: false } },
  },
})
