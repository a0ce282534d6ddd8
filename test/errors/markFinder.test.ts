import { describe, expect, it } from 'vitest';
import type { Control } from '../../src/control/index.js';
import { type FormOccupationsOptions, formOccupations } from '../../src/errors/index.js';
import type { LogBatch, Position, SetAsideRow } from '../../src/logs/index.js';
import { at, control, MARKS, START_MS } from './world.js';

/* Which mark a position belongs to: what the row says, then the list of stays, then nearness. */

const nameless = { mark: '' };
const stays = (mark: string, from: number, to: number, rover = '') => ({
  mark,
  rover,
  fromMs: START_MS + 1000 * from,
  toMs: START_MS + 1000 * to,
});

async function form(
  positions: readonly Position[],
  known: Control,
  { nearestMarkM = null, ...options }: FormOccupationsOptions & { nearestMarkM?: number | null } = {},
) {
  const setAside: SetAsideRow[] = [];
  async function* batches(): AsyncGenerator<LogBatch> {
    const file = positions[0]!.file;
    yield { file, rowsRead: positions.length, positions, setAside: [], messages: [], nearestMarkM };
  }
  const formed = await formOccupations(batches(), known, {
    ...options,
    onSetAside: (row) => setAside.push(row),
  });
  return {
    marks: formed.occupations.map(({ mark }) => mark),
    epochs: formed.occupations.map(({ epochs }) => epochs),
    details: setAside.map(({ reason, detail }) => `${reason}: ${detail}`),
    messages: formed.messages.map(({ text }) => text),
  };
}

describe('the mark of a position', () => {
  const timed: Control = { ...control(), markTimes: new Map([['a.csv', [stays('CP2', 0, 60)]]]) };

  it('that the row names goes before stays and nearness', async () => {
    const row = at(10, { ...MARKS.CP3!, mark: 'CP1' });
    expect((await form([row], timed, { nearestMarkM: 3 })).marks).toEqual(['CP1']);
  });

  it('of a stay goes before nearness', async () => {
    const rows = [at(10, { ...nameless, ...MARKS.CP3! }), at(100, { ...nameless, ...MARKS.CP3! })];
    const { marks, details } = await form(rows, timed, { nearestMarkM: 3 });
    expect([marks, details]).toEqual([['CP2', 'CP3'], []]);
  });

  it('is the nearest where row and stay tell none', async () => {
    const rows = [
      at(100, { ...nameless, ...MARKS.CP1! }),
      at(200, { ...nameless, pointNumber: '1023', ...MARKS.CP1! }),
    ];
    expect((await form(rows, control(), { nearestMarkM: 3 })).marks).toEqual(['CP1', 'CP1']);
  });

  it('is unknown where nothing tells it, and the detail says what was tried', async () => {
    const away = { ...MARKS.CP1!, latitudeDeg: 47.02 };
    const row = at(100, { ...nameless, ...away });
    expect((await form([row], control())).details).toEqual(['unknown-mark: the row names no mark']);
    expect((await form([row], timed)).details).toEqual([
      'unknown-mark: the list of stays has the rover on no mark at that time',
    ]);
    expect((await form([row], control(), { nearestMarkM: 3 })).details).toEqual([
      'unknown-mark: no mark lies within 3 m of the position',
    ]);
    // A position that has no coordinates lies near nothing.
    const blank = { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: Number.NaN };
    expect(
      (await form([at(100, { ...nameless, ...blank })], control(), { nearestMarkM: 3 })).details,
    ).toEqual(['unknown-mark: the row names no mark']);
  });

  it('by stays of one log says nothing of another', async () => {
    const other = at(10, { ...nameless, file: 'b.csv' });
    expect((await form([other], timed)).details).toEqual(['unknown-mark: the row names no mark']);
  });

  it('by stays changes from row to row, and for each rover', async () => {
    const known: Control = {
      ...control(),
      markTimes: new Map([
        ['a.csv', [stays('CP1', 0, 2, 'R1'), stays('CP2', 0, 9, 'R2'), stays('CP3', 3, 5, 'R1')]],
      ]),
    };
    const rows = [0, 1, 2, 3, 4, 5, 6].flatMap((second) =>
      ['R1', 'R2'].map((rover) => {
        const name = rover === 'R2' ? 'CP2' : second < 3 ? 'CP1' : 'CP3';
        return at(second, { ...nameless, rover, ...MARKS[name]! });
      }),
    );
    const { marks, epochs, details } = await form(rows, known);
    expect(marks.map((name, k) => `${name} ${epochs[k]}`).sort()).toEqual(['CP1 3', 'CP2 7', 'CP3 3']);
    expect(details).toEqual(['unknown-mark: the list of stays has the rover on no mark at that time']);
  });

  it('by nearness is judged anew for each row', async () => {
    const rows = [MARKS.CP1!, MARKS.CP2!, MARKS.CP1!].map((place, k) =>
      at(100 * k, { ...nameless, ...place }),
    );
    expect((await form(rows, control(), { nearestMarkM: 3 })).marks).toEqual(['CP1', 'CP2', 'CP1']);
  });

  it('by pattern and alias goes before stays', async () => {
    const known: Control = {
      ...timed,
      names: { pattern: /^CHK (\w+)/, aliases: new Map([['pillar', 'CP3']]) },
    };
    const rows = [
      at(10, { ...nameless, description: 'CHK CP1' }),
      at(20, { ...nameless, ...MARKS.CP3!, description: 'pillar' }),
      at(30, { ...nameless, ...MARKS.CP2!, description: 'CHK nothing' }),
    ];
    expect((await form(rows, known)).marks).toEqual(['CP1', 'CP3', 'CP2']);
  });

  it('that is nearly named is asked about once', async () => {
    const rows = [0, 1, 2].map((second) => at(second, { mark: 'CP-2' }));
    expect((await form(rows, control())).messages).toEqual([
      '3 rows are set aside as unknown-mark: no mark is named "CP-2" (did you mean "CP2"?). Add the mark to the marks file or correct the name.',
    ]);
  });
});
