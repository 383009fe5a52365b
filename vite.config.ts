import path from 'node:path';
import { defineConfig } from 'vite';

const root = import.meta.dirname;

/** The screen: renderer/ -> dist/renderer, with nothing inlined so that the policy can stay strict. */
export default defineConfig({
  root: path.join(root, 'renderer'),
  base: './',
  oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
  worker: { format: 'es' },
  assetsInclude: ['**/*.csv', '**/*.txt', '**/*.tsv', '**/*.dat', '**/*.asc', '**/*.sheet.json'],
  server: { fs: { allow: [root] } },
  build: {
    outDir: path.join(root, 'dist/renderer'),
    emptyOutDir: true,
    assetsInlineLimit: 0,
    // a note on how long copying the sample took is no news to who starts the app
    rolldownOptions: { checks: { pluginTimings: false } },
    modulePreload: { polyfill: false },
    // Electron's own, and the browsers it falls back to
    target: ['chrome120', 'firefox121', 'safari17.4'],
    sourcemap: false,
    // nearly all of it is plotly, loaded after first paint
    chunkSizeWarningLimit: 6000,
  },
});
