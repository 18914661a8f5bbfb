import tailwind from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const api = `http://127.0.0.1:${process.env.ORIEL_PORT ?? '4400'}`;

function inPackages(names: string[]): RegExp {
  // What pages itself through long lists, or asks many questions at once, is no part of a guest's sheet.
  return new RegExp(
    `node_modules/(?!@tanstack/[\\w-]+/build/modern/(?:useInfinite|infinite|useQueries|queriesObserver))(${names.join('|')}|@tanstack/(react-query|query-core)|use-sync-external-store|thumbhash)/`,
  );
}

const STUDIO_PARTS =
  /web\/src\/(?:ui|lib)\/(changed-meanwhile|more-button|search-field|bytes|data-table|step-bar|studio-shell|checkbox|select|field|text-input|confirm-dialog|progress-bar|dialog|justified-rows)/;

function isGuestPart(id: string): boolean {
  return (
    /web\/src\/(ui|lib|messages|features\/(sheets-guest|marks))\/(?!\w*-?beyond-sheet)[\w-]+\.(tsx?|json)$/.test(id) &&
    !STUDIO_PARTS.test(id)
  );
}

/**
 * One configuration for two tools: Vite builds web/ into dist/web, Vitest runs tests/ from the top of the tree.
 * Tests that draw pages ask for a document in their first line: `@vitest-environment happy-dom`.
 */
export default defineConfig({
  root: process.env.VITEST ? '.' : 'web',
  plugins: [react(), tailwind()],
  build: {
    outDir: process.env.VITEST ? 'dist/web' : '../dist/web',
    emptyOutDir: true,
    target: 'es2022',
    manifest: true,
    // Pictures and fonts stay files: the page's content policy allows no data: address for scripts or fonts.
    assetsInlineLimit: 0,
    // Two pieces that every guest's page needs, instead of forty that each begin their compression anew; what only the
    // studio uses stays with its pages.
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [
            {
              name: 'base',
              test: inPackages(['react', 'react-dom', 'scheduler', 'react-router', 'react-router-dom', 'i18next', 'react-i18next']),
            },
            { name: 'sheet', test: isGuestPart },
          ],
        },
      },
    },
  },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': api, '/pictures': api },
  },
  test: {
    testTimeout: 30_000,
    hookTimeout: 90_000,
    // Of two cores the default would leave one idle: most files wait for a database, a browser or a child at least half the time.
    maxWorkers: '100%',
    projects: [
      {
        extends: true,
        test: { name: 'pure', include: ['tests/{domain,imaging,web}/**/*.test.{ts,tsx}'] },
      },
      {
        extends: true,
        test: {
          name: 'house',
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/{domain,imaging,web,browser}/**'],
          globalSetup: ['tests/support/cluster.ts'],
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/support/cluster.ts', 'tests/browser/build-web.ts'],
          testTimeout: 120_000,
          // On a busy machine a browser may miss a deadline once; a fault fails twice. What was repeated is shown.
          retry: 1,
        },
      },
    ],
  },
});
