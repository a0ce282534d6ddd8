import { describe, expect, it } from 'vitest';
import {
  type Base,
  type ControlStatements,
  comparabilityMessages,
  type Mark,
  type PointCoordinates,
} from '../../src/control/index.js';
import { BASES, base, coordinatesAt, MARKS, mark } from '../errors/world.js';

const NOTHING: ControlStatements = { logFrames: [], broughtToOneFrame: false, constantSeparation: false };

const marks = (change: (name: string) => Partial<PointCoordinates> = () => ({})): Map<string, Mark> =>
  new Map(
    Object.entries(MARKS).map(([name, position]) => {
      const versions = [coordinatesAt(position, change(name))];
      return [name, { ...mark(name, position), ...versions[0]!, versions }];
    }),
  );

const bases = (change: Partial<PointCoordinates> = {}, name = 'B1'): Map<string, Base> => {
  const versions = [coordinatesAt(BASES.B1!, change)];
  return new Map([[name, { ...base(name, BASES.B1!), ...versions[0]!, versions }]]);
};

const texts = (
  known: Map<string, Mark>,
  from: Map<string, Base>,
  statements: Partial<ControlStatements> = {},
): string[] =>
  comparabilityMessages(known, from, { ...NOTHING, ...statements }).map(
    ({ code, text }) => `${code}: ${text}`,
  );

describe('what is said before coordinates are compared', () => {
  it('is nothing where nothing differs', () => {
    const same = { frame: 'Regional 2014', epoch: 2014 };
    expect(texts(marks(), bases())).toEqual([]);
    expect(
      texts(
        marks(() => same),
        bases({ frame: 'regional_2014', epoch: 2014.3 }),
      ),
    ).toEqual([]);
  });

  it('frames of marks and base', () => {
    const told = texts(
      marks((name) => ({ frame: name === 'CP2' ? 'Old' : 'New' })),
      bases({ frame: 'New' }),
    );
    expect(told).toEqual([
      'frames-differ: Positions are in the frame of their base, whatever their label: base "B1" is in "New", mark "CP2" is in "Old". Frames of the satellite age differ by shifts up to metres and by a scale of up to 0.01 ppm, older ones by 1 to 10 ppm (common practice). State the transformation of the marks, or give both in one frame.',
    ]);
    const all = texts(
      marks(() => ({ frame: 'Old' })),
      bases({ frame: 'New' }),
    );
    expect(all[0]).toContain('marks "CP1", "CP2", "CP3" are in "Old"');
    const stated = { broughtToOneFrame: true };
    expect(
      texts(
        marks(() => ({ frame: 'Old' })),
        bases({ frame: 'New' }),
        stated,
      ),
    ).toEqual([]);
  });

  it('epochs, with 0.1 ppm for every year', () => {
    // 0.1 ppm a year of strain are 1.5 ppm in fifteen years.
    expect(
      texts(
        marks((name) => ({ epoch: name === 'CP1' ? 2010 : 2025 })),
        bases({ epoch: 2025 }),
      ),
    ).toEqual([
      'epochs-differ: Coordinates of base "B1" belong to 2025, those of mark "CP1" to epochs up to 15.0 years away. Where the ground is strained by 0.1 ppm a year this adds up to 1.5 ppm, and a motion that both share drops out. Bring both to one epoch.',
    ]);
  });

  it('epochs only of coordinates that hold on the same days', () => {
    const early = coordinatesAt(MARKS.CP1!, { epoch: 2010, to: '2020-12-31' });
    const late = coordinatesAt(MARKS.CP1!, { epoch: 2025, from: '2021-01-01' });
    const known = new Map([['CP1', { ...mark('CP1', MARKS.CP1!), ...late, versions: [early, late] }]]);
    expect(texts(known, bases({ epoch: 2025, from: '2021-06-01' }))).toEqual([]);
    expect(texts(known, bases({ epoch: 2025 }))).toHaveLength(1);
  });

  it('the label of logs', () => {
    const logFrames = [{ frame: 'Label', epoch: Number.NaN, transformed: false }];
    expect(texts(marks(), bases({ frame: 'New' }), { logFrames })).toEqual([
      'frames-differ: The logs are labelled "Label" and base "B1" stands in "New": positions are in the frame of the coordinate that the base was run with. Check which coordinate that was, or state the transformation of the logs.',
    ]);
    const moved = [{ ...logFrames[0]!, transformed: true }];
    expect(texts(marks(), bases({ frame: 'New' }), { logFrames: moved })).toEqual([]);
  });

  it('marks that come from the base itself', () => {
    const from = marks((name) => ({ source: name === 'CP3' ? 'levelled' : 'RTK from b1, 2023' }));
    expect(texts(from, bases())).toEqual([
      'circular-control: The coordinates of marks "CP1", "CP2" are from base "B1" itself, as their source says: an error that the base makes on all days is in both and cannot show. Use marks that were determined without this base for absolute errors.',
    ]);
    // A name in another name is none; one of two words is one.
    expect(
      texts(
        marks(() => ({ source: 'static from B12 and XB1' })),
        bases(),
      ),
    ).toEqual([]);
    expect(
      texts(
        marks(() => ({ source: 'RTK from Roof East.' })),
        bases({}, 'Roof East'),
      ),
    ).toHaveLength(1);
  });

  it('a base on an assumed coordinate, with metres / 20 in ppm', () => {
    expect(texts(marks(), bases({ source: 'assumed' }))).toEqual([
      'assumed-base: Base "B1" stands on an assumed coordinate: an uncertainty of 5 m, common for a position without corrections, adds about 0.25 ppm to every baseline (common practice: metres / 20), and shifts all positions. Determine the base, and give its coordinates here.',
    ]);
    // √(2 · 12² + 10.583²) m = 20.0 m are 1 ppm.
    const poor = { horizontalSigmaMm: 12_000, verticalSigmaMm: 10_583 };
    expect(texts(marks(), bases(poor))).toEqual([
      'assumed-base: Base "B1" is known poorly: its stated uncertainty of 20.00 m adds about 1.00 ppm to every baseline (common practice: metres / 20), and shifts all positions. Determine the base, and give its coordinates here.',
    ]);
    expect(texts(marks(), bases({ horizontalSigmaMm: 20, verticalSigmaMm: 40 }))).toEqual([]);
  });

  it('a base that is far from all marks', () => {
    const versions = [coordinatesAt({ ...BASES.B1!, latitudeDeg: 37 })];
    const away = new Map([['B1', { ...base('B1', versions[0]!.position), versions }]]);
    // Meridian arc of 9.9° at 42°: 9.9 π / 180 · 6364 km = 1099.6 km, its chord a part θ² / 24 less: 1098.3 km.
    expect(texts(marks(), away)).toEqual([
      'base-far-off: Base "B1" is 1098 km from the nearest mark, farther than any crew works. Check its coordinates: swapped columns, another zone, unit or sign.',
    ]);
  });

  it('one separation over a wide site, with what a slope of the geoid does', () => {
    // CP3 is √(11.12² + 15.23²) = 18.86 km away: 10 and 50 mm per km of it.
    expect(texts(marks(), bases(), { constantSeparation: true })).toEqual([
      'constant-separation: One geoid separation stands for a site of 19 km. A geoid commonly slopes by 10 to 50 mm per km (common practice), 189 to 943 mm over this site, and its slope looks like vertical ppm. State separations for each mark, or a grid file.',
    ]);
    const near = new Map([...marks()].filter(([name]) => name === 'CP1'));
    expect(texts(near, bases(), { constantSeparation: true })).toEqual([]);
  });
});
