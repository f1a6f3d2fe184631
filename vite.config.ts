import { fileURLToPath } from 'node:url';
import vue from '@vitejs/plugin-vue';
import vuetify from 'vite-plugin-vuetify';
import { defineConfig } from 'vitest/config';

const server = `http://127.0.0.1:${process.env.PORT ?? '3000'}`;
const folder = (name: string) => fileURLToPath(new URL(`./${name}`, import.meta.url));

export default defineConfig({
  plugins: [vue(), vuetify({ autoImport: true })],
  resolve: { alias: { '@shared': folder('shared'), '@': folder('src') } },
  // The server puts a fresh nonce in place of this mark in every page that it sends.
  html: { cspNonce: '__CSP_NONCE__' },
  server: { proxy: { '/api': server } },
  build: {
    outDir: 'dist',
    target: 'es2022',
    // Says which files a page needs first: what the benchmark weighs.
    manifest: true,
    // The Content-Security-Policy allows no data: addresses for scripts, styles or fonts.
    assetsInlineLimit: 0,
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [{ name: 'framework', test: /node_modules\/(?:@?vue|vue-router|pinia|@tanstack|zod)\// }],
        },
      },
    },
  },
  test: {
    projects: [
      {
        extends: true,
        test: { name: 'unit', include: ['tests/unit/**/*.test.ts'], exclude: ['tests/unit/client/**'], isolate: false },
      },
      {
        extends: true,
        test: {
          name: 'client',
          include: ['tests/unit/client/**/*.test.ts'],
          environment: 'jsdom',
          setupFiles: ['tests/unit/client/setup.ts'],
          server: { deps: { inline: ['vuetify'] } },
        },
      },
      {
        extends: true,
        // Each test has a farm of its own, so files can share the loaded server: loading it takes longest by far.
        test: { name: 'api', include: ['tests/api/**/*.test.ts'], testTimeout: 60_000, isolate: false },
      },
      {
        extends: true,
        test: {
          name: 'simulation',
          include: ['tests/simulation/**/*.test.ts'],
          testTimeout: 300_000,
          hookTimeout: 300_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/browser/global-setup.ts'],
          fileParallelism: false,
          testTimeout: 180_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
});
