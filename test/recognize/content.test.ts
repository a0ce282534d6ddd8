import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { decisive, file, readAs, readRecognized, recognized } from './heads.js';

const folder = testFolder();
const UTM_33 = '+proj=utm +zone=33 +ellps=WGS84';
/**
 * On the central meridian of a zone of UTM the northing of latitude 45° is 0.9996 times the meridian arc from the
 * equator, 4 984 944.378 m on WGS 84 (arc from memory).
 */
const NORTHING_45 = 4_982_950.4;

describe('a list of points without a header', () => {
  const rows = [
    '1,4982950.400,500000.000,135.120,CHK M03',
    '2,4982960.400,500010.000,136.120,CHK M04',
    '3,4982970.400,500020.000,137.120,EP',
  ];

  it('is recognised; order, projection, mark and day are asked for', () => {
    const found = recognized(file(...rows));
    expect(found.coordinates).toBe(null);
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'comma',
      header: false,
      columns: { pointNumber: 1, height: 4, description: 5 },
    });
    expect(decisive(found).sort()).toEqual([
      'mark-column',
      'no-date',
      'northing-easting-order',
      'projection',
    ]);
    const order = found.unsure.find(({ code }) => code === 'northing-easting-order')!;
    expect(order.choices).toEqual(['{easting: 3, northing: 2}', '{easting: 2, northing: 3}']);
    expect(found.unsure.find(({ code }) => code === 'mark-column')!.choices).toEqual(['1', '5']);
  });

  it('needs neither order nor projection when the projection is known, and takes the day from the name', async () => {
    const name = 'points-2025-03-14.csv';
    const found = recognized(file(...rows), { coordinates: UTM_33 }, name);
    expect(decisive(found)).toEqual(['mark-column']);
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'comma',
      header: false,
      columns: { pointNumber: 1, northing: 2, easting: 3, height: 4, description: 5 },
      fromFileName: '(?<date>\\d{4}-\\d{2}-\\d{2})',
    });
    const log = await readAs(folder, file(...rows), found.layout, { coordinates: UTM_33, name });
    const [first] = log.positions;
    expect(log.positions).toHaveLength(3);
    expect(first).toMatchObject({ pointNumber: '1', description: 'CHK M03', heightM: 135.12 });
    expect(first!.dateOnly).toBe('2025-03-14');
    expect(first!.latitudeDeg).toBeCloseTo(45, 8);
    expect(first!.longitudeDeg).toBeCloseTo(15, 9);
  });

  it.each([
    ['easting first', '1,500000.000,4982950.400,135.1,CHK', { easting: 2, northing: 3 }],
    ['all whole numbers', '1,500000,4982950,135,CHK', { easting: 2, northing: 3 }],
    [
      'numbers of points like small coordinates',
      '1001,500000.0,4982950.4,135.1,CHK',
      { easting: 2, northing: 3 },
    ],
    ['names of points', 'M03,500000.0,4982950.4,135.1,CHK', { easting: 2, northing: 3 }],
    ['no description', '7,500000.0,4982950.4,135.1', { easting: 2, northing: 3 }],
    ['no number of points', '500000.0,4982950.4,135.1,CHK', { easting: 1, northing: 2 }],
  ])('one row alone, %s', (_, row, columns) => {
    const found = recognized(file(row), { coordinates: UTM_33 });
    expect(found.coordinates).toBe(UTM_33);
    expect(found.layout).toMatchObject({ columns });
    expect(decisive(found)).not.toContain('northing-easting-order');
  });

  it('asks for the order where both fit the projection', () => {
    const found = recognized(file('1,500100.0,510200.0,135.1,CHK'), { coordinates: UTM_33 });
    expect(decisive(found)).toContain('northing-easting-order');
    expect(found.layout).not.toHaveProperty('columns.easting');
  });

  it('asks whether metres or feet where the size does not tell', () => {
    const found = recognized(file('1,1234567.123,2345678.456,312.45,CHK', '2,1234587.1,2345698.4,313.5,CHK'));
    expect(decisive(found)).toContain('length-unit');
    expect(found.unsure.find(({ code }) => code === 'length-unit')!.choices).toEqual([
      'metre',
      'international-foot',
      'us-survey-foot',
    ]);
  });

  it('asks which foot where only feet fit the projection', async () => {
    const feet = 0.3048;
    // A false easting of 2 000 km: the numbers read as metres would lie thousands of kilometres away.
    const plane =
      '+proj=lcc +lat_1=37 +lat_2=38.5 +lat_0=36.5 +lon_0=-120.5 +x_0=2000000 +y_0=500000 +ellps=GRS80';
    const row = `1,${(2e6 / feet).toFixed(3)},${(6e5 / feet).toFixed(3)},100.0,CHK`;
    const found = recognized(file(row), { coordinates: plane });
    expect(decisive(found)).toContain('which-foot');
    expect(found.layout).toMatchObject({ columns: { easting: 2, northing: 3 } });
    const units = { length: 'international-foot', height: 'metre' } as const;
    const layout = { ...found.layout, units, constants: { date: '2025-03-14' } };
    const { positions } = await readAs(folder, file(row), layout as typeof found.layout, {
      coordinates: plane,
    });
    // On the central meridian, 100 km north of the latitude of origin.
    expect(positions[0]!.longitudeDeg).toBeCloseTo(-120.5, 7);
    expect(positions[0]!.latitudeDeg).toBeGreaterThan(37.3);
    expect(positions[0]!.latitudeDeg).toBeLessThan(37.5);
  });

  it('keeps description and marks apart from the words of other columns', () => {
    const found = recognized(file('1,500000.0,4982950.4,135.1,CHK,north crew,R2'), { coordinates: UTM_33 });
    const mark = found.unsure.find(({ code }) => code === 'mark-column')!;
    expect(mark.choices).toEqual(['1', '5', '6', '7']);
    expect(mark.decisive).toBe(true);
  });

  it('between runs of blanks with decimal commas', async () => {
    const text = file('M1  500000,000 4982950,400 135,1', 'M2  500000,100 4982950,500 135,2');
    const found = recognized(text, { coordinates: UTM_33 }, '20250314.txt');
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'blanks',
      decimal: 'comma',
      header: false,
      columns: { pointNumber: 1, easting: 2, northing: 3, height: 4 },
      time: { format: 'yyyyMMdd' },
      fromFileName: '(?<!\\d)(?<date>20\\d{6})(?!\\d)',
    });
    const log = await readAs(folder, text, found.layout, { coordinates: UTM_33, name: '20250314.txt' });
    expect(log.positions[0]).toMatchObject({ pointNumber: 'M1', heightM: 135.1, dateOnly: '2025-03-14' });
    expect(log.positions[0]!.latitudeDeg).toBeCloseTo(45, 8);
    expect(found.complete).toBe(true);
  });

  it('between tabs, semicolons and pipes', () => {
    for (const [name, character] of [
      ['tab', '\t'],
      ['semicolon', ';'],
      ['pipe', '|'],
    ] as const) {
      const found = recognized(file(...rows.map((row) => row.replaceAll(',', character))));
      expect(found.layout).toMatchObject({ delimiter: name, columns: { pointNumber: 1, description: 5 } });
    }
  });

  it('below a title: the first row is no title even when it is short', async () => {
    const text = file('Harbour east', '1,500000.0,4982950.4,135.1', ...rows);
    const found = recognized(text, { coordinates: UTM_33 });
    expect(found.layout).toMatchObject({ skipLines: 1 });
    expect(found.preview[0]!.row).toBe(2);
  });
});

describe('geographic coordinates without a header', () => {
  it('beyond 90 degrees the longitude is known, also from 0 to 360', async () => {
    const text = file(
      'CHK1,341.123456789,-28.123456789,101.1,2025-03-14T10:00:00Z,fixed,14,0.012',
      'CHK1,341.123456790,-28.123456788,101.2,2025-03-14T10:00:01Z,float,15,0.013',
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'comma',
      header: false,
      columns: { pointNumber: 1, longitude: 2, latitude: 3, height: 4, time: 5, fix: 6, satellites: 7 },
    });
    expect(log.positions[0]).toMatchObject({
      pointNumber: 'CHK1',
      latitudeDeg: -28.123456789,
      heightM: 101.1,
      fix: 'fixed',
      satellites: 14,
    });
    expect(log.positions[0]!.longitudeDeg).toBeCloseTo(341.123456789 - 360, 10);
    const left = found.unsure.find(({ code }) => code === 'unused-columns')!;
    expect(left.because).toContain('column 8 ("0.012", perhaps a sigma)');
    expect(left.decisive).toBe(false);
  });

  it('below 90 degrees the order is asked for', () => {
    const found = recognized(file('CHK1,8.123456789,47.123456789,101.1,2025-03-14T10:00:00Z'));
    expect(decisive(found)).toEqual(['latitude-longitude-order']);
    expect(found.unsure[0]!.choices).toEqual(['{latitude: 2, longitude: 3}', '{latitude: 3, longitude: 2}']);
    expect(found.preview[0]!.coordinates).toBe(null);
  });

  it('in degrees, minutes and seconds with letters', async () => {
    const text = file(
      'CHK1;53°48\'33.82123"N;2°07\'46.41234"W;50.123;2025-03-14T10:00:00Z',
      'CHK1;53°48\'33.82125"N;2°07\'46.41236"W;50.125;2025-03-14T10:00:01Z',
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toMatchObject({
      columns: { latitude: 2, longitude: 3, height: 4 },
      units: { angle: 'dms' },
    });
    const [first] = log.positions;
    // By hand: degrees + minutes / 60 + seconds / 3600.
    expect(first!.latitudeDeg).toBeCloseTo(53 + 48 / 60 + 33.82123 / 3600, 10);
    expect(first!.longitudeDeg).toBeCloseTo(-(2 + 7 / 60 + 46.41234 / 3600), 10);
  });

  it('angles in the header are told from decimal degrees, with blanks inside cells', async () => {
    const text = file(
      'name,lat,lon,height,utc',
      'M1,53 48 33.82123 N,002 07 46.41234 W,50.1,2025-03-14 10:00:00',
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited', units: { angle: 'dms' }, time: { zone: 'UTC' } });
    expect(log.positions[0]!.longitudeDeg).toBeCloseTo(-(2 + 7 / 60 + 46.41234 / 3600), 10);
  });
});

describe('geocentric coordinates', () => {
  // Latitude 45°, longitude 0°, height 0 on WGS 84 (from memory).
  const ROW = '2025-03-14T10:00:00Z M1 4517590.879 0.000 4487348.409 fixed';

  it('are known by the radius of the earth', async () => {
    const { found, log } = await readRecognized(folder, file(ROW, ROW.replace('00Z', '01Z')));
    expect(found.coordinates).toBe('geocentric');
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'blanks',
      header: false,
      columns: { time: 1, mark: 2, x: 3, y: 4, z: 5, fix: 6 },
    });
    expect(log.positions[0]!.latitudeDeg).toBeCloseTo(45, 7);
    expect(Math.abs(log.positions[0]!.heightM)).toBeLessThan(0.002);
  });

  it('named X, Y and Z, in metres and in feet', () => {
    const header = 'time,mark,X,Y,Z,fix';
    const metres = recognized(file(header, ROW.replaceAll(' ', ',')));
    expect(metres).toMatchObject({
      layout: { kind: 'delimited' },
      coordinates: 'geocentric',
      complete: true,
    });
    const feet = [4517590.879 / 0.3048, 0, 4487348.409 / 0.3048].map((value) => value.toFixed(3));
    const found = recognized(file(header, `2025-03-14T10:00:00Z,M1,${feet.join()},fixed`));
    expect(found.coordinates).toBe('geocentric');
    expect(decisive(found)).toEqual(['which-foot']);
  });

  it('plane coordinates named X, Y and Z are none: their order is asked for', () => {
    const found = recognized(file('Point,X,Y,Z,UTC', `1,500000.0,${NORTHING_45},135.1,2025-03-14 10:00:00`));
    expect(found.coordinates).toBe(null);
    expect(decisive(found).sort()).toEqual(['northing-easting-order', 'projection']);
    expect(found.layout).toMatchObject({ columns: { height: 'Z' } });
  });

  it('nor are plane coordinates whose length happens to be the radius of the earth', () => {
    const found = recognized(
      file('1,3500123.456,5334123.123,123.45,CHK', '2,3500124.456,5334124.123,123.55,CHK'),
    );
    expect(found.coordinates).toBe(null);
    expect(decisive(found)).toContain('projection');
  });
});
