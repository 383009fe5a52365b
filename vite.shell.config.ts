import path from 'node:path';
import { defineConfig } from 'vite';

const root = import.meta.dirname;

/**
 * The Electron shell: `--mode main` bundles the main process as ESM, `--mode preload` the preload as
 * one CommonJS file (a sandboxed preload can be nothing else).
 */
export default defineConfig(({ mode }) => {
  const preload = mode === 'preload';
  return {
    root,
    build: {
      outDir: path.join(root, 'dist/desktop'),
      emptyOutDir: !preload,
      target: 'node22',
      minify: false,
      ssr: path.join(root, preload ? 'main/desktop/preload.ts' : 'main/desktop/main.ts'),
      rolldownOptions: {
        external: ['electron'],
        output: preload
          ? { format: 'cjs', entryFileNames: 'preload.cjs' }
          : { format: 'es', entryFileNames: 'main.js' },
      },
    },
    ssr: { noExternal: true, external: ['electron'] },
  };
});
