import { describe, expect, it } from 'vitest';
import { basesText, logText, marksText, rowsByMonth, simulateLog } from '../../src/campaign/index.js';

const row = {
  timeMs: Date.UTC(2025, 2, 31, 23, 59, 58),
  base: 'B1',
  setup: 'B1 2025-03-31',
  mark: 'M01',
  rover: 'R1',
  crew: 'A',
  latitudeDeg: 44.3,
  longitudeDeg: -18.4000000001,
  heightM: 140.05,
  fix: 'fixed',
  satellites: 17,
  pdop: 1.5,
  ageSeconds: 2,
} as const;

describe('log text', () => {
  it('writes role names and one line a row', () => {
    expect(logText([row])).toBe(
      'time,base,mark,rover,crew,latitude,longitude,height,fix,satellites,pdop,age\n' +
        '2025-03-31T23:59:58Z,B1,M01,R1,A,44.300000000,-18.400000000,140.0500,fixed,17,1.5,2.0\n',
    );
    expect(logText([])).toBe('time,base,mark,rover,crew,latitude,longitude,height,fix,satellites,pdop,age\n');
  });

  it('adds a setup column when asked', () => {
    const [header, line] = logText([row], { setupColumn: true }).split('\n');
    expect(header?.endsWith(',age,setup')).toBe(true);
    expect(line?.endsWith(',2.0,B1 2025-03-31')).toBe(true);
  });

  it('repeats the rows digit for digit', () => {
    const { rows } = simulateLog({ days: 2 });
    const lines = logText(rows).trimEnd().split('\n').slice(1);
    for (const [i, line] of lines.entries()) {
      const cells = line.split(',');
      expect(Date.parse(cells[0]!)).toBe(rows[i]!.timeMs);
      expect(cells.slice(5, 8).map(Number)).toEqual([
        rows[i]!.latitudeDeg,
        rows[i]!.longitudeDeg,
        rows[i]!.heightM,
      ]);
    }
    expect(lines).toHaveLength(rows.length);
  });

  it('splits by month of UTC', () => {
    const next = { ...row, timeMs: row.timeMs + 2000 };
    expect([...rowsByMonth([row, row, next])].map(([month, own]) => [month, own.length])).toEqual([
      ['2025-03', 2],
      ['2025-04', 1],
    ]);
  });
});

describe('control text', () => {
  it('lists marks and bases', () => {
    const point = { latitudeDeg: 44.3, longitudeDeg: -18.4, heightM: 140 };
    const mark = {
      name: 'M01',
      ...point,
      baselineKm: 1,
      azimuthDeg: 0,
      heightDifferenceM: 0,
      source: 'static',
      sky: 'open',
    };
    expect(marksText([mark], { horizontal: 1.5, vertical: 3 })).toBe(
      'mark,latitude,longitude,height,horizontalSigmaMm,verticalSigmaMm,sigmaLevel,source,sky\n' +
        'M01,44.300000000,-18.400000000,140.0000,1.5,3,rms,static,open\n',
    );
    expect(basesText([{ name: 'B1', ...point, mounting: 'pillar', setupsPerDay: 1 }])).toBe(
      'base,latitude,longitude,height,mounting\nB1,44.300000000,-18.400000000,140.0000,pillar\n',
    );
  });
});
