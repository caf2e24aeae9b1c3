import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'electron-vite'
import { bundledPackages } from './build/bundled-packages'

const here = import.meta.dirname
const lists = resolve(here, 'out/packages')
const { version } = JSON.parse(readFileSync(resolve(here, 'package.json'), 'utf8')) as { version: string }

export default defineConfig({
  main: {
    plugins: [bundledPackages(lists, 'main')],
    build: {
      outDir: 'out/main',
      rolldownOptions: {
        // The maker of reports is a process of its own, started by the path of its file.
        input: {
          index: resolve(here, 'app/main/index.ts'),
          'report-maker': resolve(here, 'app/main/report-maker.ts'),
        },
      },
    },
  },
  preload: {
    plugins: [bundledPackages(lists, 'preload')],
    build: {
      outDir: 'out/preload',
      // A sandboxed preload is one CommonJS file that requires nothing but electron.
      externalizeDeps: false,
      rolldownOptions: {
        input: { index: resolve(here, 'app/preload/index.ts') },
        output: { format: 'cjs', entryFileNames: '[name].cjs' },
      },
    },
  },
  renderer: {
    root: resolve(here, 'app/renderer'),
    plugins: [vue(), bundledPackages(lists, 'page')],
    define: { __VERSION__: JSON.stringify(version) },
    build: {
      outDir: resolve(here, 'out/renderer'),
      emptyOutDir: true,
      minify: true,
      rolldownOptions: { input: { index: resolve(here, 'app/renderer/index.html') } },
    },
    worker: { format: 'es', plugins: () => [bundledPackages(lists, 'workers')] },
  },
})
