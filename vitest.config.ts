import { defineConfig } from 'vitest/config';

/** Two sets: `fast` (npm test, under five minutes) and `long` (files named *.long.test.ts). */
export default defineConfig({
  test: {
    testTimeout: 60_000,
    hookTimeout: 120_000, // some build the program
    projects: [
      { extends: true, test: { name: 'fast', include: ['test/**/*.test.ts'], exclude: ['test/**/*.long.test.ts'] } },
      { extends: true, test: { name: 'long', include: ['test/**/*.long.test.ts'], testTimeout: 900_000 } },
    ],
  },
});
