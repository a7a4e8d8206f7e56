import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const alias = { '@': fileURLToPath(new URL('./src', import.meta.url)) };
const common = { environment: 'node' as const, testTimeout: 60_000, hookTimeout: 120_000 };

export default defineConfig({
  test: {
    projects: [
      {
        resolve: { alias },
        test: {
          ...common,
          name: 'unit',
          include: ['tests/unit/**/*.test.ts', 'tests/reference/**/*.test.ts', 'tests/architecture.test.ts'],
        },
      },
      {
        resolve: { alias },
        test: {
          ...common,
          name: 'integration',
          include: ['tests/integration/**/*.test.ts'],
          globalSetup: ['tests/integration/setup.ts'],
          fileParallelism: false,
        },
      },
    ],
  },
});
