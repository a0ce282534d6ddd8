import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { REPOSITORY } from '../cli/ppmwise.js';
import { withOutputs } from './runBlocks.js';

it.each(['questions.md', 'plan-check-shots.md'])(
  'docs/%s shows what its examples give: else run vitest with -u and read what moved',
  async (name) => {
    const file = join(REPOSITORY, 'docs', name);
    const page = await withOutputs(readFileSync(file, 'utf8'));
    await expect(page).toMatchFileSnapshot(file);
  },
  600_000,
);
