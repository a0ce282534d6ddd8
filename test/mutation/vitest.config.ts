import { defineConfig } from 'vitest/config';

/** Tests of fit/ and rule/ that take a second: each is run many times while the code is mutated. */
export default defineConfig({
  test: {
    include: ['test/fit/{intervals,thinData}.test.ts', 'test/rule/{tolerance,maximumBaseline}.test.ts'],
    testTimeout: 120_000,
  },
});
