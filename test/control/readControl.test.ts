import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type ControlFile, readBases, readMarks } from '../../src/control/index.js';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const HEADER = 'mark,latitude,longitude,height';
const UTM = '+proj=utm +zone=32 +ellps=WGS84';

function source(lines: readonly string[], change: Partial<ControlFile> = {}): ControlFile {
  const path = folder.write('points.csv', `${lines.join('\n')}\n`);
  return { path, file: 'points.csv', coordinates: 'geographic', ...change };
}

const marksOf = async (lines: readonly string[], change?: Partial<ControlFile>) =>
  (await readMarks(source(lines, change))).marks;
const basesOf = async (lines: readonly string[], change?: Partial<ControlFile>) =>
  (await readBases(source(lines, change))).bases;

async function refusal(reading: Promise<unknown>): Promise<string[]> {
  const error = await reading.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(InputError);
  return (error as InputError).messages.map(formatMessage);
}

describe('readMarks', () => {
  it('reads names as they are written: trimmed, zeros and case kept', async () => {
    const marks = await marksOf([
      `${HEADER},source,sky,horizontalSigmaMm,verticalSigmaMm`,
      ' 007 ,47,8,500,static session,open,1.5,',
      'cp5,47.1,8,500,,,,2',
      'CP5,47.2,341.5,500,"level, 2019",,,',
      '7,47.3,8,500,,,,',
    ]);
    expect([...marks.keys()]).toEqual(['007', 'cp5', 'CP5', '7']);
    const coordinates = {
      position: { latitudeDeg: 47, longitudeDeg: 8, heightM: 500 },
      horizontalSigmaMm: 1.5,
      verticalSigmaMm: Number.NaN,
      source: 'static session',
      frame: '',
      epoch: Number.NaN,
      from: '',
      to: '',
    };
    expect(marks.get('007')).toEqual({ ...coordinates, name: '007', versions: [coordinates], sky: 'open' });
    expect(marks.get('CP5')).toMatchObject({ source: 'level, 2019', position: { longitudeDeg: -18.5 } });
  });

  it('takes marks that are known in plan only or in height only, in every system that has a height', async () => {
    const geographic = await marksOf([HEADER, 'PLAN,47,8,', 'HEIGHT,,,500']);
    const projected = await marksOf(['mark,easting,northing,height', 'PLAN,500000,0,', 'HEIGHT,,,500'], {
      coordinates: UTM,
    });
    for (const marks of [geographic, projected]) {
      const [plan, height] = [marks.get('PLAN')!.position, marks.get('HEIGHT')!.position];
      expect([plan.latitudeDeg, plan.longitudeDeg].some(Number.isNaN)).toBe(false);
      expect(plan.heightM).toBeNaN();
      expect(height).toEqual({ latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: 500 });
    }
  });

  it('tells every faulty row at once', async () => {
    const lines = [
      `${HEADER},horizontalSigmaMm,verticalSigmaMm`,
      'HALF,47,,500,,',
      'WORD,forty-seven,8,500,,',
      ',47,8,500,,',
      'NOTHING,,,,,',
      'GOOD,47,8,500,,',
      'GOOD,47,8,500,,',
      'SWAPPED,108,47,500,,',
      'SIGMA,47,8,500,one,-2',
      'SHORT,47',
      'HIGH,47,8,1e9,,',
    ];
    expect(await refusal(marksOf(lines))).toEqual([
      'points.csv:2 error: Mark "HALF" has only some of the coordinates that belong together. Fill in all of them, or none when the place is not known.',
      'points.csv:3 [latitude] error: Expected a number, came "forty-seven". Correct the cell or leave it blank.',
      'points.csv:4 [mark] error: Expected the name of a mark, came a blank cell. Fill it in.',
      'points.csv:5 error: Mark "NOTHING" has no coordinates. Fill in its plan position, its height or both, or remove the row.',
      'points.csv:7 [mark] error: The mark "GOOD" stands already in row 6, with the same coordinates. Keep one of the two, or state in the columns from and to on which days each holds.',
      'points.csv:8 [latitude] error: The coordinates cannot be used: expected a latitude from -90 to 90 degrees, came 108 (are latitude and longitude swapped?). Correct them.',
      'points.csv:9 [horizontalSigmaMm] error: Expected a number, came "one". Correct the cell or leave it blank.',
      'points.csv:9 [verticalSigmaMm] error: Expected a number of at least 0, came -2. Correct the cell.',
      'points.csv:10 error: The row cannot be read: expected 6 cells as in the header, came 2. Correct it.',
      'points.csv:11 [height] error: The coordinates cannot be used: expected a height from -10000 to 100000 metres, came 1000000000. Correct them.',
    ]);
  });

  it('tells of decimal commas once, and does not advise to leave them out', async () => {
    const lines = ['mark;latitude;longitude;height', 'A;47,1;8,2;500,3', 'B;47,2;8,3;x'];
    expect(await refusal(marksOf(lines))).toEqual([
      'points.csv:2 [latitude] error: Expected numbers with a decimal point, came "47,1": numbers are written with a comma. Write all numbers of this file with a point, here 47.1.',
      'points.csv:3 [height] error: Expected a number, came "x". Correct the cell or leave it blank.',
    ]);
  });

  it('refuses half a position and no position', async () => {
    expect(await refusal(marksOf([HEADER, 'HALF,47,,500', 'NOTHING,,,']))).toEqual([
      'points.csv:2 error: Mark "HALF" has only some of the coordinates that belong together. Fill in all of them, or none when the place is not known.',
      'points.csv:3 error: Mark "NOTHING" has no coordinates. Fill in its plan position, its height or both, or remove the row.',
    ]);
    const geocentric = marksOf(['mark,x,y,z', 'HALF,6378137,0,'], { coordinates: 'geocentric' });
    expect((await refusal(geocentric))[0]).toContain('Mark "HALF" has only some of the coordinates');
    const projected = marksOf(['mark,easting,northing,height', 'HALF,500000,,5'], { coordinates: UTM });
    expect((await refusal(projected))[0]).toContain('Mark "HALF" has only some of the coordinates');
  });

  it('names headers as the file spells them', async () => {
    const columns = { mark: 'Point', latitude: 'Lat', longitude: 'Lon', height: 'H' } as const;
    const lines = ['Point,Lat,Lon,H', 'B,x,8,500', 'A,47,8,500', 'A,47.1,8,500'];
    expect(await refusal(marksOf(lines, { columns }))).toEqual([
      'points.csv:2 [Lat] error: Expected a number, came "x". Correct the cell or leave it blank.',
      'points.csv:4 [Point] error: The mark "A" stands already in row 3, 11118 m away. Keep one of the two, or state in the columns from and to on which days each holds.',
    ]);
    expect((await marksOf(['Point,Lat,Lon,H', 'A,47,8,500'], { columns })).size).toBe(1);
  });

  it('refuses a file without marks, without a header, or with a second header of its own', async () => {
    expect(await refusal(marksOf([HEADER]))).toEqual([
      'points.csv error: Expected at least one mark, came none. Add a row for each mark.',
    ]);
    expect(await refusal(marksOf(['']))).toEqual([
      'points.csv error: Expected a header and at least one row, came an empty file. Fill it in.',
    ]);
    expect(await refusal(marksOf(['name,latitude,longitude,height', 'A,47,8,500']))).toEqual([
      'points.csv:1 [mark] error: Expected a column "mark", came "name", "latitude", "longitude", "height". Add the column or name it in the layout.',
    ]);
    expect(
      await refusal(marksOf([HEADER, 'A,47,8,500', 'mark,longitude,latitude,height', 'B,8,47,500'])),
    ).toEqual([
      'points.csv:3 error: Expected one header, came a second one with other columns. Give the rows below it a file of their own.',
    ]);
  });

  it('tells of columns that it does not read', async () => {
    const { messages } = await readMarks(source([`${HEADER},owner`, 'A,47,8,500,by the gate']));
    expect(messages.map(formatMessage)).toEqual([
      'points.csv:1 [owner] info: Columns that are no role are not read: "owner".',
    ]);
  });
});

describe('coordinates in other systems', () => {
  // The same places in two systems, computed by PROJ 9.1.1: see fixtures/proj/README.md.
  const fixture = (name: string) =>
    readFileSync(new URL(`../fixtures/proj/${name}`, import.meta.url), 'utf8')
      .trim()
      .split('\n')
      .slice(1)
      .map((line) => line.split(','));

  it('geocentric marks agree with geographic ones', async () => {
    const near = fixture('geocentric.csv').filter((cells) => Math.abs(Number(cells[3])) < 9000);
    expect(near.length).toBeGreaterThan(3);
    const lines = near.map(([name, , , , x, y, z]) => `${name},${x},${y},${z}`);
    const marks = await marksOf(['mark,x,y,z', ...lines], { coordinates: 'geocentric' });
    for (const [name, latitude, longitude, height] of near) {
      const { latitudeDeg, longitudeDeg, heightM } = marks.get(name!)!.position;
      expect(latitudeDeg).toBeCloseTo(Number(latitude), 9);
      expect(heightM).toBeCloseTo(Number(height), 5);
      // At a pole every longitude is the same place.
      if (Math.abs(latitudeDeg) < 89.999) {
        expect(Math.abs(longitudeDeg)).toBeCloseTo(Math.abs(Number(longitude)), 9);
      }
    }
  });

  it('projected marks agree with geographic ones', async () => {
    const places = fixture('projections.csv');
    expect(places.length).toBeGreaterThan(10);
    for (const [definition, latitude, longitude, easting, northing] of places) {
      const lines = ['mark,easting,northing,height', `P,${easting},${northing},5`];
      const marks = await marksOf(lines, { coordinates: definition! });
      const { latitudeDeg, longitudeDeg, heightM } = marks.get('P')!.position;
      expect(latitudeDeg).toBeCloseTo(Number(latitude), 8);
      expect(longitudeDeg).toBeCloseTo(Number(longitude), 8);
      expect(heightM).toBe(5);
    }
  });
});

describe('readBases', () => {
  const BASE_HEADER = 'base,latitude,longitude,height,mounting';

  it('reads mounting, a blank one as tripod', async () => {
    const bases = await basesOf([BASE_HEADER, 'A,47,8,500,pillar', 'B,47,8,500,Tripod', 'C,47,8,500,']);
    expect([...bases.values()].map(({ mounting }) => mounting)).toEqual(['pillar', 'tripod', 'tripod']);
    const without = await basesOf(['base,latitude,longitude,height', 'A,47,8,500']);
    expect(without.get('A')!.mounting).toBe('tripod');
  });

  it('needs all three coordinates', async () => {
    const lines = [BASE_HEADER, 'A,47,8,,', 'B,,,500,', 'C,47,,500,', 'D,47,8,500,roof'];
    expect(await refusal(basesOf(lines))).toEqual([
      ...[2, 3, 4].map(
        (row) =>
          `points.csv:${row} error: Base "${'ABC'[row - 2]}" lacks a coordinate, and every baseline starts there. Fill in all three.`,
      ),
      'points.csv:5 [mounting] error: Expected "tripod" or "pillar", came "roof". A blank cell means tripod.',
    ]);
  });

  it('refuses a file without bases', async () => {
    expect(await refusal(basesOf([BASE_HEADER]))).toEqual([
      'points.csv error: Expected at least one base, came none. Add a row for each base.',
    ]);
  });
});
