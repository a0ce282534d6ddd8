import { describe, expect, it } from 'vitest';
import {
  type ControlFile,
  coordinatesOn,
  readBases,
  readMarks,
  sigmaLevel,
  sigmasIn,
  validityWords,
} from '../../src/control/index.js';
import { metresPer } from '../../src/geodesy/index.js';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const HEADER = 'mark,latitude,longitude,height';

function source(lines: readonly string[], change: Partial<ControlFile> = {}): ControlFile {
  const path = folder.write('points.csv', `${lines.join('\n')}\n`);
  return { path, file: 'points.csv', coordinates: 'geographic', ...change };
}

async function refusal(reading: Promise<unknown>): Promise<string[]> {
  const error = await reading.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(InputError);
  return (error as InputError).messages.map(formatMessage);
}

describe('coordinates over time', () => {
  const lines = [
    `${HEADER},from,to`,
    'A,47,8,500,2025-03-01,',
    'A,47.0000001,8,500,,2025-02-28',
    'B,47,8.1,510,,',
  ];

  it('are those that hold on the day', async () => {
    const { marks } = await readMarks(source(lines));
    const a = marks.get('A')!;
    expect(a.versions.map(({ from, to }) => [from, to])).toEqual([
      ['', '2025-02-28'],
      ['2025-03-01', ''],
    ]);
    expect(coordinatesOn(a, '2025-02-28')!.position.latitudeDeg).toBe(47.0000001);
    expect(coordinatesOn(a, '2025-03-01')!.position.latitudeDeg).toBe(47);
    // What is asked without a day are the latest.
    expect(a.position.latitudeDeg).toBe(47);
    expect(validityWords(a)).toBe('to 2025-02-28, from 2025-03-01');
    expect(coordinatesOn(marks.get('B')!, '1990-01-01')).not.toBeNull();
  });

  it('may leave days without any', async () => {
    const { marks } = await readMarks(source([`${HEADER},from,to`, 'A,47,8,500,2025-03-01,2025-03-31']));
    expect(coordinatesOn(marks.get('A')!, '2025-04-01')).toBeNull();
  });

  it('may not hold on the same day', async () => {
    const overlap = [`${HEADER},from,to`, 'A,47,8,500,,2025-03-02', 'A,47,8.001,500,2025-03-02,'];
    expect(await refusal(readMarks(source(overlap)))).toEqual([
      // (N + 500 m) cos 47° · 0.001°, with N = 6378137 m / √(1 − 0.00669438 sin² 47°) = 6389582 m.
      'points.csv:3 [mark] error: The mark "A" stands already in row 2, 76.0619 m away. Keep one of the two, or state in the columns from and to on which days each holds.',
    ]);
    const backward = [`${HEADER},from,to`, 'A,47,8,500,2025-03-02,2025-03-01', 'B,47,8,500,tomorrow,'];
    expect(await refusal(readMarks(source(backward)))).toEqual([
      'points.csv:2 [to] error: Expected a last day not before 2025-03-02, came 2025-03-01. Correct it.',
      'points.csv:3 [from] error: Expected a day like 2025-03-01, came "tomorrow". Correct it.',
    ]);
  });
});

describe('stated precisions', () => {
  const columns = `${HEADER},horizontalSigmaMm,verticalSigmaMm,sigmaLevel`;

  it('become one standard deviation of an axis, whatever their level', async () => {
    const { marks, messages } = await readMarks(
      source([columns, 'A,47,8,500,5,8,rms', 'B,47,8,500,5,8,68 %', 'C,47,8,500,9.8,,95']),
    );
    expect(messages).toEqual([]);
    expect(marks.get('A')).toMatchObject({ horizontalSigmaMm: 5, verticalSigmaMm: 8 });
    // Normal quantiles at 84 % and 97.5 %: 0.9945 and 1.9600 (any table of the normal distribution).
    expect(marks.get('B')!.horizontalSigmaMm).toBeCloseTo(5 / 0.994458, 5);
    expect(marks.get('C')!.horizontalSigmaMm).toBeCloseTo(9.8 / 1.959964, 5);
    expect(marks.get('C')!.verticalSigmaMm).toBeNaN();
    expect(sigmaLevel('RMS')).toBe('rms');
    expect(sigmaLevel('99')).toBeNull();
    expect(sigmasIn('95')).toBeCloseTo(1.959963985, 9);
  });

  it('without a level are taken as one standard deviation, and this is told once', async () => {
    const { marks, messages } = await readMarks(
      source([columns, 'A,47,8,500,5,,', 'B,47,8,500,,4,', 'C,47,8,500,,,']),
    );
    expect(marks.get('A')!.horizontalSigmaMm).toBe(5);
    expect(messages.map(formatMessage)).toEqual([
      'points.csv:2 [sigmaLevel] warning: Expected the level of stated precisions (column sigmaLevel: rms, 68 or 95), came none in 2 rows: they are taken as one standard deviation of each axis. State the level, since a 95 % figure is twice as large.',
    ]);
  });

  it('of an unknown level are refused', async () => {
    expect(await refusal(readMarks(source([columns, 'A,47,8,500,5,,two sigma'])))).toEqual([
      'points.csv:2 [sigmaLevel] error: Expected "rms", "68" or "95" as the level of the stated precision, came "two sigma". Correct it.',
    ]);
  });
});

describe('a control file', () => {
  it('may be in feet and in degrees, minutes and seconds', async () => {
    const dms = await readMarks(
      source([HEADER, `A,53 48 33.820 N,2 07 46.380 E,239.5`], {
        units: { angle: 'dms', height: 'us-survey-foot' },
      }),
    );
    const { latitudeDeg, longitudeDeg, heightM } = dms.marks.get('A')!.position;
    expect(latitudeDeg).toBeCloseTo(53 + 48 / 60 + 33.82 / 3600, 12);
    expect(longitudeDeg).toBeCloseTo(2 + 7 / 60 + 46.38 / 3600, 12);
    expect(heightM).toBeCloseTo(239.5 * metresPer('us-survey-foot'), 9);
    const utm = '+proj=utm +zone=32 +ellps=WGS84';
    const feet = await readMarks(
      source(['mark,easting,northing,height', 'A,1640419.947506562,17388451.44356955,1640.4199475065616'], {
        coordinates: utm,
        units: { length: 'international-foot' },
      }),
    );
    const metres = await readMarks(
      source(['mark,easting,northing,height', 'A,500000,5300000,500'], { coordinates: utm }),
    );
    const [inFeet, inMetres] = [feet, metres].map(({ marks }) => marks.get('A')!.position);
    expect(inFeet!.latitudeDeg).toBeCloseTo(inMetres!.latitudeDeg, 11);
    expect(inFeet!.heightM).toBeCloseTo(500, 9);
  });

  it('refuses an angle that is none', async () => {
    const lines = [HEADER, 'A,53 48 99 N,2 07 46 E,1'];
    expect(await refusal(readMarks(source(lines, { units: { angle: 'dms' } })))).toEqual([
      'points.csv:2 [latitude] error: Expected degrees, minutes and seconds like 53 48 33.82 N, came "53 48 99 N". Correct the cell or leave it blank.',
    ]);
  });

  it('takes the antenna height off only where heights are those of the antenna', async () => {
    const lines = ['base,latitude,longitude,height,antennaHeight', 'B1,47,8,501.5,1.5'];
    const plain = await readBases(source(lines));
    expect(plain.bases.get('B1')!.position.heightM).toBe(501.5);
    const antenna = await readBases(source(lines, { heightOf: 'antenna' }));
    expect(antenna.bases.get('B1')!.position.heightM).toBe(500);
    const blank = [lines[0]!, 'B1,47,8,501.5,'];
    expect(await refusal(readBases(source(blank, { heightOf: 'antenna' })))).toEqual([
      'points.csv:2 [antennaHeight] error: Heights are those of the antenna: expected its height above the mark, came a blank cell. Fill it in.',
    ]);
  });

  it('knows three kinds of sky', async () => {
    const { marks, messages } = await readMarks(
      source([`${HEADER},sky`, 'A,47,8,500,Partly', 'B,47,8,500,cloudy']),
    );
    expect(marks.get('A')!.sky).toBe('partly');
    expect(marks.get('B')!.sky).toBe('');
    expect(messages.map(formatMessage)).toEqual([
      'points.csv:3 [sky] warning: Expected "open", "partly" or "obstructed" as the sky of a mark, came "cloudy": the sky counts as not stated. Correct the cell or leave it blank.',
    ]);
  });

  it('states frame and epoch for all rows or for one', async () => {
    const lines = [`${HEADER},frame,epoch`, 'A,47,8,500,,', 'B,47,8,500,Other,2010.5'];
    const { marks } = await readMarks(source(lines, { frame: 'Common', epoch: 2020 }));
    expect([marks.get('A')!.frame, marks.get('A')!.epoch]).toEqual(['Common', 2020]);
    expect([marks.get('B')!.frame, marks.get('B')!.epoch]).toEqual(['Other', 2010.5]);
  });
});
