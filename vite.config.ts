import react from '@vitejs/plugin-react';
import type { Plugin } from 'vite';
import { defineConfig } from 'vitest/config';

// Two builds of one source: the page (dist/web) and the command line with its worker (dist/node).
const isolation = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

// CommonJS starts some 20 ms sooner than modules do; the nearest package.json says which of the two a file is.
const nodeFilesAreCommonJs: Plugin = {
  name: 'node-files-are-commonjs',
  applyToEnvironment: ({ name }) => name === 'ssr',
  generateBundle() {
    this.emitFile({ type: 'asset', fileName: 'package.json', source: '{ "type": "commonjs" }\n' });
  },
};

export default defineConfig({
  plugins: [react(), nodeFilesAreCommonJs],
  server: { headers: isolation, open: false, port: 5178 },
  preview: { headers: isolation, port: 5179 },
  worker: { format: 'es' },
  builder: {
    buildApp: async (builder) => {
      await builder.build(builder.environments.client!);
      await builder.build(builder.environments.ssr!);
    },
  },
  environments: {
    client: { build: { outDir: 'dist/web', emptyOutDir: true, chunkSizeWarningLimit: 1200 } },
    ssr: {
      resolve: { noExternal: true },
      build: {
        outDir: 'dist/node',
        emptyOutDir: true,
        ssr: true,
        target: 'node20',
        copyPublicDir: false,
        rollupOptions: {
          input: { cli: 'src/cli/start.ts', nodeWorker: 'src/worker/nodeWorker.ts', bench: 'test/bench/main.ts' },
          external: [/^mujoco-js/],
          output: { format: 'cjs', entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
        },
      },
    },
  },
  test: {
    // As many files at a time as there are cores: by default one core stays idle, half of a machine with two.
    maxWorkers: '100%',
    projects: [
      {
        extends: true,
        test: { name: 'engine', include: ['test/**/*.test.ts'], exclude: ['test/page/**'], testTimeout: 120_000 },
      },
      {
        extends: true,
        test: { name: 'page', include: ['test/page/**/*.test.ts'], testTimeout: 180_000, fileParallelism: false },
      },
    ],
  },
});
