import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url));

export default defineConfig({
  resolve: { alias: { '@': root.replace(/\/$/, '') } },
  test: {
    environment: 'node',
    testTimeout: 20_000,
    projects: ['unit', 'reference', 'property', 'integration', 'contract'].map((name) => ({
      extends: true,
      test: {
        name,
        include: [`tests/${name}/**/*.test.{ts,tsx}`],
        ...(name === 'integration' || name === 'contract'
          ? { fileParallelism: false, hookTimeout: 60_000, testTimeout: 60_000 }
          : {}),
      },
    })),
  },
});
