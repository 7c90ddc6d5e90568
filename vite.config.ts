import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

export default defineConfig({
  root: 'app',
  publicDir: '../public',
  plugins: [react()],
  build: { outDir: '../dist', emptyOutDir: true, assetsInlineLimit: 0, target: 'es2023' },
  test: { root: '.', include: ['tests/**/*.test.ts', 'tests/**/*.test.tsx'], testTimeout: 60000 },
})
