import { beforeAll, describe, expect, it } from 'vitest';
import { basesText, logText, marksText, simulateLog } from '../../src/campaign/index.js';
import { placeVisits } from '../../src/errors/index.js';
import { readStudy, readStudyErrors, type StudyErrors } from '../../src/study/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const campaign = simulateLog({
  seed: 9,
  days: 4,
  marks: { count: 5, nearestKm: 0.5, farthestKm: 15 },
  occupationsPerDay: { from: 8, to: 12 },
  noFix: { shareAt1Km: 0.2, shareAt12Km: 0.4 },
});

describe('placeVisits', () => {
  let read: StudyErrors;
  beforeAll(async () => {
    folder.write('marks.csv', marksText(campaign.marks, { horizontal: 1, vertical: 2 }));
    folder.write('bases.csv', basesText([campaign.base]));
    folder.write('log.csv', logText(campaign.rows));
    const study = folder.write(
      'study.yaml',
      'marks: marks.csv\nbases: bases.csv\nlogs: [{files: log.csv}]\ntimeZone: Etc/GMT+1\n',
    );
    read = await readStudyErrors(await readStudy(study));
  });

  it('puts visits without a fix at the length, direction and hour of their mark', () => {
    const placed = placeVisits(read.visits, read.control);
    expect(placed).toHaveLength(read.visits.length);
    expect(placed.some(({ fixedRows }) => fixedRows === 0)).toBe(true);
    for (const visit of placed) {
      const shot = read.errors.find(({ mark }) => mark === visit.mark)!;
      expect(visit.baselineKm).toBeCloseTo(shot.baselineKm, 9);
      expect(visit.azimuthDeg).toBeCloseTo(shot.azimuthDeg, 9);
      expect(visit.sky).toBe(shot.sky);
      const same = read.errors.find(({ startMs, mark }) => startMs === visit.startMs && mark === visit.mark);
      // the mark stands where it is published, the occupation a few millimetres off
      if (same !== undefined) expect(visit.solarHour).toBeCloseTo(same.solarHour, 6);
    }
  });

  it('leaves unknown what control does not know, and loses no visit', () => {
    const [visit] = read.visits;
    const nowhere = placeVisits([{ ...visit!, mark: 'none' }], read.control);
    expect(nowhere).toEqual([
      {
        ...visit,
        mark: 'none',
        baselineKm: Number.NaN,
        azimuthDeg: Number.NaN,
        solarHour: Number.NaN,
        sky: '',
      },
    ]);
  });
});
