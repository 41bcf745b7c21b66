import { defineConfig } from 'vitest/config'
import react from '@vitejs/plugin-react'
import tailwindcss from '@tailwindcss/vite'

const api = process.env.API_URL ?? 'http://127.0.0.1:4280'

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: 'dist/client', emptyOutDir: true, sourcemap: false },
  server: { host: '127.0.0.1', port: 4281, proxy: { '/api': api } },
  test: {
    include: ['tests/**/*.test.{ts,tsx}'],
    pool: 'forks',
    maxWorkers: 2,
    testTimeout: 60_000,
    hookTimeout: 120_000,
    setupFiles: ['tests/setup/refuseNoise.ts'],
    reporters: ['default', './tests/setup/closingLine.ts'],
  },
})
