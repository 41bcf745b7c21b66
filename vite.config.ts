import { defineConfig } from 'vitest/config'
import react from '@vitejs/plugin-react'
import tailwindcss from '@tailwindcss/vite'
import LongestFirst from './tests/setup/longestFirst.ts'

const api = process.env.API_URL ?? 'http://127.0.0.1:4280'

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    sourcemap: false,
    manifest: true,
    rolldownOptions: {
      output: {
        codeSplitting: {
          // Small modules that nearly every page needs compress better together than as fifty files.
          groups: [
            {
              name: 'common',
              test: /\/(shared\/(?!targets|starterTargets|externalTables|importedCandidates|relatives)[a-zA-Z]+|src\/(?:actions|api)\/(?!candidates|polytopes|targets|classPictures|collections|externalTables|importedCandidates|relatives|comments|views|assignments)[a-zA-Z]+|src\/components\/ui\/(Button|Caution|Layout|Num|States|Table|Field|SearchStateMark|SearchStanding|Progress)|src\/lib\/(numbers|remembered|theme|saveFile))\.tsx?$/,
            },
          ],
        },
      },
    },
  },
  server: { host: '127.0.0.1', port: 4281, proxy: { '/api': api } },
  test: {
    projects: [
      // Pure functions and servers that are closed again: their modules need loading once per process only.
      {
        extends: true,
        test: { name: 'engine', include: ['tests/{scoring,reference}/**/*.test.ts'], isolate: false },
      },
      { extends: true, test: { name: 'server', include: ['tests/server/**/*.test.ts'], isolate: false } },
      { extends: true, test: { name: 'client', include: ['tests/client/**/*.test.{ts,tsx}'] } },
      { extends: true, test: { name: 'browser', include: ['tests/browser/**/*.test.ts'] } },
    ],
    pool: 'forks',
    sequence: { sequencer: LongestFirst },
    maxWorkers: 2,
    testTimeout: 60_000,
    hookTimeout: 120_000,
    setupFiles: ['tests/setup/refuseNoise.ts'],
    reporters: ['default', './tests/setup/closingLine.ts'],
  },
})
