import { defineConfig } from 'vitest/config';

/** The tests of fit/ and rule/ that take seconds: each is run many times while code is mutated. */
export default defineConfig({
  test: {
    include: [
      'test/fit/{laws,againstR,linearSum,thinData,jackknife,intervals}.test.ts',
      'test/rule/{laws,maximumBaseline,specSheetTest,tolerance}.test.ts',
    ],
    testTimeout: 120_000,
  },
});
