import { availableParallelism } from 'node:os';
import path from 'node:path';
import { defineConfig } from 'vitest/config';

const root = import.meta.dirname;
/** A test file a core: of its own accord vitest leaves one of them idle. */
const maxWorkers = availableParallelism();
const web = {
  alias: [
    { find: /^react-native$/, replacement: 'react-native-web' },
    // The real router's CommonJS build pulls in React Native's Flow sources: component tests use a stand-in.
    { find: /^expo-router(\/head)?$/, replacement: path.join(root, 'tests/support/expo-router.tsx') },
    { find: /^@\//, replacement: `${root}/` },
  ],
  mainFields: ['browser', 'module', 'main'],
  extensions: ['.web.tsx', '.web.ts', '.web.mjs', '.web.js', '.tsx', '.ts', '.mjs', '.js', '.json'],
};

export default defineConfig({
  test: {
    dangerouslyIgnoreUnhandledErrors: false,
    projects: [
      {
        resolve: { alias: [{ find: /^@\//, replacement: `${root}/` }] },
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/browser/**'],
          globalSetup: ['tests/support/test-cluster.ts'],
          maxWorkers,
          testTimeout: 30_000,
          hookTimeout: 120_000,
        },
      },
      {
        resolve: web,
        define: { __DEV__: 'true', 'process.env.EXPO_OS': '"web"' },
        test: {
          name: 'ui',
          environment: 'happy-dom',
          include: ['tests/**/*.ui.test.tsx'],
          setupFiles: ['tests/support/setup-ui.ts'],
          maxWorkers,
          server: { deps: { inline: [/react-native/] } },
          testTimeout: 20_000,
        },
      },
      {
        resolve: { alias: [{ find: /^@\//, replacement: `${root}/` }] },
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/support/test-cluster.ts'],
          fileParallelism: false,
          testTimeout: 600_000,
          hookTimeout: 600_000,
        },
      },
    ],
  },
});
