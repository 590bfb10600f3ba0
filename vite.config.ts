import tailwindcss from '@tailwindcss/vite'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const apiTarget = process.env['FIELDFARE_API_URL'] ?? 'http://127.0.0.1:4300'

export default defineConfig({
  root: 'apps/web',
  plugins: [react(), tailwindcss()],
  server: { host: '127.0.0.1', proxy: { '/api': apiTarget } },
  build: { outDir: '../../dist/web', emptyOutDir: true },
  test: {
    projects: [
      {
        root: import.meta.dirname,
        test: {
          name: 'unit',
          environment: 'node',
          include: [
            'packages/*/src/**/*.test.ts',
            'apps/api/src/**/*.test.ts',
            'tests/architecture/**/*.test.ts',
          ],
        },
      },
      {
        root: import.meta.dirname,
        plugins: [react()],
        test: {
          name: 'web',
          environment: 'jsdom',
          include: ['apps/web/src/**/*.test.{ts,tsx}'],
          setupFiles: ['apps/web/src/testing/setup.ts'],
          // Stylesheets are left out of component tests, except the one whose colours are measured.
          css: { include: [/theme\.css/] },
        },
      },
      {
        root: import.meta.dirname,
        test: {
          name: 'integration',
          environment: 'node',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        root: import.meta.dirname,
        test: {
          name: 'accuracy',
          environment: 'node',
          include: ['tests/accuracy/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 300_000,
          hookTimeout: 300_000,
          fileParallelism: false,
        },
      },
      {
        root: import.meta.dirname,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/end-to-end/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 180_000,
          hookTimeout: 180_000,
          fileParallelism: false,
        },
      },
    ],
  },
})
