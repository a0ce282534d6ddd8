import { expect, it } from 'vitest';
import type { OccupationError } from '../../src/errors/index.js';
import type { FileResult } from '../../src/study/index.js';
import { lateMessages, lateOccupations } from '../../src/study/lateOccupations.js';

const at = (file: string, row: number, day: string) => ({ file, row, day }) as OccupationError;
const file = (name: string, read: number, sha256: string) => ({ file: name, read, sha256 }) as FileResult;

it('tells occupations of earlier days that the earlier run did not read', () => {
  const earlier = [file('same.csv', 100, 'a'), file('grown.csv', 50, 'b')];
  const found = lateOccupations(
    {
      errors: [
        at('same.csv', 90, '2025-03-01'),
        at('grown.csv', 20, '2025-03-02'),
        // Line 51 is the last one read: 50 rows after a header.
        at('grown.csv', 51, '2025-03-03'),
        at('grown.csv', 60, '2025-03-03'),
        at('grown.csv', 70, '2025-03-31'),
        at('new.csv', 2, '2025-02-27'),
      ],
      setAside: [{ reason: 'suspected-blunder', detail: '', error: at('new.csv', 9, '2025-02-27') }],
      files: [file('same.csv', 100, 'a'), file('grown.csv', 80, 'c'), file('new.csv', 10, 'd')],
    },
    earlier,
    '2025-03-30',
  );
  expect(found).toEqual({ occupations: 3, days: ['2025-02-27', '2025-03-03'] });
  const [told] = lateMessages(found, '2025-03-30');
  expect(told!.text).toContain('3 occupations lie on 2 days from 2025-02-27 to 2025-03-03.');
  expect(lateMessages({ occupations: 0, days: [] }, '2025-03-30')).toEqual([]);
});
