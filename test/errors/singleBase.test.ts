import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FormedOccupations, formOccupations } from '../../src/errors/index.js';
import { geocentricToGeodetic, localFrame } from '../../src/geodesy/index.js';
import { NO_EXTRAS, type Position, type PositionExtras, type SetAsideRow } from '../../src/logs/index.js';
import { at, BASES, batches, control, MARKS } from './world.js';

const baseAt = (eastM: number, from = BASES.B1!): Partial<PositionExtras> => {
  const { latitudeDeg, longitudeDeg, heightM } = geocentricToGeodetic(
    localFrame(from).toGeocentric({ eastM, northM: 0, upM: 0 }),
  );
  return { baseLatitudeDeg: latitudeDeg, baseLongitudeDeg: longitudeDeg, baseHeightM: heightM };
};

const extras = (change: Partial<PositionExtras>): PositionExtras => ({ ...NO_EXTRAS, ...change });

async function formed(
  ...files: readonly (readonly Position[])[]
): Promise<FormedOccupations & { rows: SetAsideRow[] }> {
  const rows: SetAsideRow[] = [];
  const result = await formOccupations(batches(...files), control(), {
    timeZone: 'UTC',
    onSetAside: (row) => rows.push(row),
  });
  return { ...result, rows };
}

describe('positions that are not from a single base', () => {
  it.each([
    ['network', 'the log says that the corrections are those of a network'],
    ['virtual-base', 'the log says that the corrections are those of a virtual base'],
    ['satellite', 'the log says that the corrections are those of satellites'],
    [
      'VRS 7',
      'expected single-base, network, virtual-base or satellite as corrections, came "VRS 7"; say under correctionValues in the layout what it means',
    ],
  ])('say so: %s', async (corrections, detail) => {
    const { rows, occupations, visits, files } = await formed([
      at(0, { extras: extras({ corrections }) }),
      at(1, { extras: extras({ corrections }) }),
      at(300, { extras: extras({ corrections: 'single-base' }) }),
      at(600, { extras: extras({ corrections: '' }) }),
    ]);
    expect(rows.map(({ reason, detail: told }) => [reason, told])).toEqual([
      ['not-single-base', detail],
      ['not-single-base', detail],
    ]);
    // They make no visit, and so none without a fix.
    expect(visits).toHaveLength(2);
    expect(occupations).toHaveLength(2);
    expect(files[0]).toMatchObject({ read: 4, used: 2 });
    expect(files[0]!.setAside['not-single-base']!.count).toBe(2);
  });

  it('have a base beside the rover', async () => {
    const virtual = extras(baseAt(30, MARKS.CP2!));
    const real = extras(baseAt(0.4));
    const { rows, occupations } = await formed([
      at(0, { mark: 'CP2', extras: virtual }),
      at(300, { mark: 'CP2', extras: real }),
    ]);
    expect(rows.map(({ reason, detail }) => [reason, detail])).toEqual([
      ['not-single-base', 'the base coordinates in the log are 30 m from the rover: a virtual base'],
    ]);
    expect(occupations).toHaveLength(1);
  });

  it('are found behind a row without coordinates of the same stay', async () => {
    const virtual = extras(baseAt(30, MARKS.CP2!));
    const nowhere = { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: Number.NaN };
    const { rows } = await formed([
      at(0, { mark: 'CP2', extras: virtual, ...nowhere }),
      at(1, { mark: 'CP2', extras: virtual }),
    ]);
    expect(rows.map(({ reason }) => reason).sort()).toEqual(['no-position', 'not-single-base']);
  });

  it('are not those of a mark beside the base', async () => {
    const beside = geocentricToGeodetic(
      localFrame(BASES.B1!).toGeocentric({ eastM: 20, northM: 5, upM: -1 }),
    );
    const known = control({ ...MARKS, PIN: beside });
    const position = at(0, { mark: 'PIN', ...beside, extras: extras(baseAt(0)) });
    const { occupations } = await formOccupations(batches([position]), known, { timeZone: 'UTC' });
    expect(occupations).toHaveLength(1);
    // Nor those of one that is known in height only.
    const heightOnly = control({ PIN: { ...beside, latitudeDeg: Number.NaN, longitudeDeg: Number.NaN } });
    const again = await formOccupations(batches([position]), heightOnly, { timeZone: 'UTC' });
    expect(again.occupations).toHaveLength(1);
  });

  it('have a base that moves with the rover', async () => {
    const places = [0, 2000, 4000, 6000].map((eastM) => extras(baseAt(eastM)));
    const rows = places.map((own, k) => at(300 * k, { mark: 'CP3', extras: own }));
    const moving = await formed(rows);
    expect(moving.occupations).toEqual([]);
    expect(moving.rows.map(({ detail }) => detail)).toEqual(
      Array(4).fill('the base coordinates in the log move with the rover (3 or more places on 2025-03-04)'),
    );
    // A tripod that is put up twice in a day does not move with the rover.
    expect((await formed(rows.slice(0, 2))).occupations).toHaveLength(2);
  });

  it('have a station number that keeps changing', async () => {
    const row = (k: number, station: string): Position => at(300 * k, { extras: extras({ station }) });
    const changing = await formed(['1', '2', '3', '1'].map((station, k) => row(k, station)));
    expect(changing.rows.map(({ reason, detail }) => [reason, detail])).toEqual(
      Array(4).fill([
        'not-single-base',
        'the station number in the log keeps changing (3 or more stations on 2025-03-04)',
      ]),
    );
    expect(changing.visits).toEqual([]);
    expect(
      (await formed(['1', '2', '1', '2'].map((station, k) => row(k, station)))).occupations,
    ).toHaveLength(4);
  });

  it('are the same in any order of rows and files, and the account holds', async () => {
    const kinds: Partial<PositionExtras>[] = [
      {},
      { corrections: 'network' },
      baseAt(30, MARKS.CP2!),
      baseAt(0.4),
      baseAt(48),
      baseAt(96),
      baseAt(-49),
      { station: '7' },
      { station: '8' },
    ];
    const shot = fc.record({
      kind: fc.constantFrom(...kinds),
      mark: fc.constantFrom('CP1', 'CP2', 'CP3'),
      rover: fc.constantFrom('R1', 'R2'),
      located: fc.boolean(),
    });
    await fc.assert(
      fc.asyncProperty(
        fc.array(shot, { minLength: 1, maxLength: 25 }).chain((shots) =>
          fc.tuple(
            fc.constant(shots),
            fc.shuffledSubarray(
              shots.map((_, k) => k),
              { minLength: shots.length },
            ),
            fc.array(fc.integer({ min: 0, max: 2 }), { minLength: shots.length, maxLength: shots.length }),
          ),
        ),
        async ([shots, order, pieces]) => {
          const shared = new Map(kinds.map((kind) => [kind, extras(kind)]));
          const rows = shots.map(({ kind, mark, rover, located }, k) =>
            at(20 * k, {
              row: k + 2,
              mark,
              rover,
              extras: shared.get(kind)!,
              ...(located ? {} : { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: Number.NaN }),
            }),
          );
          const whole = await formed(rows);
          const parts = [0, 1, 2].map((piece) =>
            order.filter((k) => pieces[k] === piece).map((k) => ({ ...rows[k]!, file: `${piece}.csv` })),
          );
          const cut = await formed(...parts.filter((part) => part.length > 0));
          const placeless = ({ file: _, row: __, ...rest }: { file: string; row: number }) => rest;
          expect(cut.occupations.map(placeless)).toEqual(whole.occupations.map(placeless));
          expect(cut.visits).toEqual(whole.visits);
          const counts = ({ rows: set }: { rows: SetAsideRow[] }) =>
            set.map(({ row, reason }) => `${row} ${reason}`).sort();
          expect(counts(cut)).toEqual(counts(whole));
          for (const { read, used, setAside } of [...whole.files, ...cut.files]) {
            const away = Object.values(setAside).reduce((sum, { count }) => sum + count, 0);
            expect(used + away).toBe(read);
          }
        },
      ),
      { seed: 40, numRuns: 150 },
    );
  });
});

describe('base coordinates in the log', () => {
  const shot = (second: number, own: Partial<PositionExtras>, change: Partial<Position> = {}): Position =>
    at(second, { extras: extras(own), row: 2 + second / 300, ...change });

  it('make a setup of their own where they change, and are told with their size in ppm', async () => {
    // 2 m east of the published base: 2 / 20 = 0.10 ppm.
    const { occupations, messages } = await formed([
      shot(0, baseAt(0)),
      shot(300, baseAt(2)),
      shot(600, baseAt(2)),
      shot(900, baseAt(0.0003)),
    ]);
    expect(occupations.map(({ setup }) => setup)).toEqual([
      'B1',
      'B1, base moved east +2.000, north 0.000, up 0.000 m',
      'B1, base moved east +2.000, north 0.000, up 0.000 m',
      'B1',
    ]);
    expect(messages.map(({ code, text, row }) => [code, text, row])).toEqual([
      [
        'base-coordinates-differ',
        'The log gives base "B1" coordinates 2.000 m from those of the bases file (east +2.000, north 0.000, up 0.000 m). Positions carry the difference as a shift, and about 0.10 ppm of every baseline (common practice: metres / 20). Correct the bases file, or state moveToPublishedBase: true for this log to take the shift out.',
        3,
      ],
    ]);
  });

  it('without a height are compared in plan', async () => {
    const { occupations, messages } = await formed([
      shot(0, { ...baseAt(2), baseHeightM: Number.NaN }),
      shot(300, { ...baseAt(0), baseHeightM: Number.NaN }),
    ]);
    expect(occupations.map(({ setup }) => setup)).toEqual([
      'B1, base moved east +2.000, north 0.000 m, its height is not told',
      'B1',
    ]);
    expect(messages).toHaveLength(1);
  });

  it('move positions to the published base where the study asks, and say so', async () => {
    const own = baseAt(2);
    const moved = geocentricToGeodetic(
      localFrame(BASES.B1!).toGeocentric({
        ...localFrame(BASES.B1!).toLocal(
          localFrame(MARKS.CP2!).toGeocentric({ eastM: 0, northM: 0, upM: 0 }),
        ),
      }),
    );
    expect(moved.latitudeDeg).toBeCloseTo(MARKS.CP2!.latitudeDeg, 10);
    const place = localFrame(BASES.B1!).toLocal(
      localFrame(MARKS.CP2!).toGeocentric({ eastM: 0, northM: 0, upM: 0 }),
    );
    const shifted = geocentricToGeodetic(
      localFrame(BASES.B1!).toGeocentric({ ...place, eastM: place.eastM + 2 }),
    );
    const position = shot(0, own, { mark: 'CP2', ...shifted });
    async function* batch() {
      yield {
        file: 'a.csv',
        rowsRead: 1,
        positions: [position],
        setAside: [],
        messages: [],
        moveToPublishedBase: true,
      };
    }
    const { occupations, messages } = await formOccupations(batch(), control(), { timeZone: 'UTC' });
    expect(occupations[0]!.position.latitudeDeg).toBeCloseTo(MARKS.CP2!.latitudeDeg, 10);
    expect(occupations[0]!.position.longitudeDeg).toBeCloseTo(MARKS.CP2!.longitudeDeg, 10);
    expect(messages.map(({ code, severity, text }) => [code, severity, text])).toEqual([
      [
        'moved-to-published-base',
        'info',
        'The log gives base "B1" coordinates 2.000 m from those of the bases file (east +2.000, north 0.000, up 0.000 m). Positions are moved by this difference as the study file asks; about 0.10 ppm of every baseline (common practice: metres / 20) stays in them.',
      ],
    ]);
  });

  it('are told in the same way in whatever order files are read', async () => {
    const files = ['b.csv', 'a.csv'].map((file, k) => [
      shot(0, baseAt(2), { file }),
      shot(300 + 300 * k, baseAt(-3), { file }),
    ]);
    const one = await formed(files[0]!, files[1]!);
    const other = await formed(files[1]!, files[0]!);
    expect(other.messages).toEqual(one.messages);
    expect(one.messages.map(({ file, row }) => `${file}:${row}`)).toEqual([
      'a.csv:2',
      'a.csv:4',
      'b.csv:2',
      'b.csv:3',
    ]);
  });
});

describe('days on which coordinates hold', () => {
  it('leave out the rows of other days, with the reason', async () => {
    const known = control();
    const cp1 = known.marks.get('CP1')!;
    const versions = [{ ...cp1.versions[0]!, from: '2025-03-05' }];
    const marks = new Map([...known.marks, ['CP1', { ...cp1, ...versions[0]!, versions }]]);
    const rows: SetAsideRow[] = [];
    const options = { timeZone: 'UTC', onSetAside: (row: SetAsideRow) => rows.push(row) };
    const { occupations } = await formOccupations(batches([at(0), at(86_400)]), { ...known, marks }, options);
    expect(occupations.map(({ day }) => day)).toEqual(['2025-03-05']);
    expect(rows.map(({ reason, detail }) => [reason, detail])).toEqual([
      ['outside-study', 'the coordinates of mark "CP1" hold from 2025-03-05, not on 2025-03-04'],
    ]);
    const b1 = known.bases.get('B1')!;
    const early = [{ ...b1.versions[0]!, to: '2025-03-03' }];
    const bases = new Map([['B1', { ...b1, ...early[0]!, versions: early }]]);
    await formOccupations(batches([at(0)]), { ...known, bases }, options);
    expect(rows.at(-1)).toMatchObject({
      reason: 'outside-study',
      detail: 'the coordinates of base "B1" hold to 2025-03-03, not on 2025-03-04',
    });
  });
});
