import { resolve } from 'node:path'
import { defineConfig } from 'vite'

const root = resolve(import.meta.dirname, '..')

/** The command line, for Node: npm packages stay outside, in node_modules. */
export default defineConfig({
  root,
  build: {
    ssr: true,
    outDir: 'out/cli',
    emptyOutDir: true,
    target: 'node20',
    minify: false,
    sourcemap: false,
    rolldownOptions: {
      input: {
        persquare: resolve(root, 'app/cli/persquare.ts'),
        start: resolve(root, 'app/cli/start.ts'),
        demo: resolve(root, 'app/cli/demo.ts'),
        bench: resolve(root, 'app/cli/bench.ts'),
      },
      output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
    },
  },
})
