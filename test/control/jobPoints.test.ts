import { describe, expect, it } from 'vitest';
import { type ControlFile, readJobPoints } from '../../src/control/index.js';
import type { InputError } from '../../src/logs/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const read = (text: string, more: Partial<ControlFile> = {}) => {
  const path = folder.write('points.csv', text);
  return readJobPoints({ path, file: 'points.csv', coordinates: 'geographic', ...more });
};
const faults = async (text: string): Promise<string[]> => {
  try {
    await read(text);
  } catch (error) {
    return (error as InputError).messages.map(({ row, text: told }) => `${row}: ${told}`);
  }
  return [];
};

describe('points of a job', () => {
  it('need a name and a place, and may have a height and a limit', async () => {
    const { points } = await read(
      'Pt No,lat,lon,height,limitMm\n007,44.3,-18.4,12.5,\n"quay, end",44.31,-18.41,,20\n',
    );
    expect(points).toEqual([
      { name: '007', position: { latitudeDeg: 44.3, longitudeDeg: -18.4, heightM: 12.5 }, limitMm: null },
      {
        name: 'quay, end',
        position: { latitudeDeg: 44.31, longitudeDeg: -18.41, heightM: Number.NaN },
        limitMm: 20,
      },
    ]);
    const [mark] = (await read('mark,latitude,longitude\nA,44,-18\n')).points;
    expect(mark).toMatchObject({ name: 'A', position: { heightM: Number.NaN } });
  });
  it('may stand on the grid of a projection, in its unit', async () => {
    // EPSG:2227 is in US survey feet, 1200/3937 m: the false origin 2000 km, 500 km is 6561666.667 ft, 1640416.667 ft.
    const { points } = await read('point,easting,northing\nO,6561666.667,1640416.667\n', {
      coordinates: 'EPSG:2227',
    });
    expect(points[0]!.position.longitudeDeg).toBeCloseTo(-120.5, 6);
    expect(points[0]!.position.latitudeDeg).toBeCloseTo(36.5, 6);
  });
  it('are refused with every fault at its row', async () => {
    expect(
      await faults(
        'point,latitude,longitude,limitMm\nA,44,-18,-3\n,44,-18,\nB,,,\nC,x,-18,\nD,44,-18,\nD,44,-18,\n',
      ),
    ).toEqual([
      '2: Expected a limit above 0 mm, came -3. Correct the cell.',
      '3: Expected the name of a point, came a blank cell. Fill it in.',
      '4: Point "B" has no plan position, and how far it is from a base cannot be told. Fill in its coordinates, or remove the row.',
      '5: Expected a number, came "x". Correct the cell or leave it blank.',
      '7: The point "D" stands already in row 6. Keep one of the two, or give it another name.',
    ]);
    expect(await faults('point,latitude,longitude\n')).toEqual([
      'null: Expected at least one point of a job, came none. Add a row for each.',
    ]);
    expect((await faults('latitude,longitude\n44,-18\n'))[0]).toMatch(
      /^1: Expected a column for the name of the point \("pointNumber", "mark"\)/,
    );
  });
});
