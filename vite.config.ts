import { fileURLToPath } from 'node:url'
import react from '@vitejs/plugin-react'
import type { Plugin } from 'vite'
import { defineConfig } from 'vitest/config'
import { CONTENT_POLICY, SERVED_HEADERS } from './app/contentPolicy.ts'

/** The policy travels inside the built page too, so that it holds on any server. Not in dev: hot reload needs inline script. */
const contentPolicy: Plugin = {
  name: 'content-policy',
  apply: 'build',
  transformIndexHtml: () => [
    { tag: 'meta', attrs: { 'http-equiv': 'Content-Security-Policy', content: CONTENT_POLICY }, injectTo: 'head-prepend' },
  ],
}

const appFile = (name: string) => fileURLToPath(new URL(`app/${name}`, import.meta.url))

interface ModuleGraph {
  getModuleInfo(id: string): { readonly importedIds: readonly string[] } | null
}

/** Puts everything the page's entry imports at once into one chunk: many small files pack worse and ask the server more often. */
function atOnce(): (id: string, graph: ModuleGraph) => string | null {
  const first = new Set<string>()
  const walk = (id: string, graph: ModuleGraph) => {
    if (first.has(id)) return
    first.add(id)
    for (const imported of graph.getModuleInfo(id)?.importedIds ?? []) walk(imported, graph)
  }
  return (id, graph) => {
    if (first.size === 0) walk(appFile('main.tsx'), graph)
    return first.has(id) ? 'page' : null
  }
}

export default defineConfig({
  // Absolute, so that a build started in another folder finds the page.
  root: fileURLToPath(new URL('app', import.meta.url)),
  publicDir: '../public',
  base: './',
  plugins: [react(), contentPolicy],
  define: { __BUILD_ID__: JSON.stringify(Date.now().toString(36)) },
  build: {
    outDir: '../dist',
    emptyOutDir: true,
    assetsInlineLimit: 0,
    target: 'es2023',
    modulePreload: { polyfill: false },
    rolldownOptions: { output: { codeSplitting: { groups: [{ name: atOnce() }] } } },
  },
  worker: { format: 'es' },
  preview: { headers: SERVED_HEADERS },
  test: {
    root: fileURLToPath(new URL('.', import.meta.url)),
    setupFiles: ['tests/seed.ts'],
    include: ['tests/**/*.test.ts', 'tests/**/*.test.tsx'],
    testTimeout: 60_000,
    maxWorkers: 2,
  },
})
