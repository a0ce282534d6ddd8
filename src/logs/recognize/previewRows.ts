import { coordinateColumns } from '../coordinateColumns.js';
import type { DelimitedHeader } from '../header.js';
import { type DelimitedLayout, decimalCharacter } from '../layout.js';
import type { ColumnRole } from '../roles.js';
import { type RowCells, TextCells } from '../rowCells.js';
import { numberReaders } from '../rowNumbers.js';
import { rowPosition } from '../rowPosition.js';
import { type RowTime, type TimePlan, timePlan } from '../timePlan.js';
import type { Draft } from './draft.js';
import { dateInName } from './fileDate.js';
import type { PreviewRow, RecognizeOptions } from './recognition.js';

const PREVIEW_ROWS = 5;
const TIME_ROLES: ReadonlySet<ColumnRole> = new Set([
  'time',
  'date',
  'timeOfDay',
  'start',
  'end',
  'gpsWeek',
  'gpsSeconds',
] as const);
/** Coordinates are computed without looking at times; any date does. */
const SOME_DATE = { date: '2000-01-01' };

/** The first rows by the columns of a draft, so far as they are decided. */
export function previewRows(
  draft: Draft,
  layout: DelimitedLayout,
  fileName: string,
  options: RecognizeOptions,
): readonly PreviewRow[] {
  const readTime = timeOfRows(draft, layout, fileName, options);
  const readPlace = placeOfRows(draft, layout, fileName);
  const roles = [...draft.roles].sort(([, a], [, b]) => a.index - b.index);
  return draft.sheet.rows.slice(0, PREVIEW_ROWS).map(({ row, cells }) => {
    const textCells = new TextCells(cells, draft.decimal);
    const when = readTime === null ? null : readTime(textCells);
    const where = readPlace === null ? null : readPlace(row, textCells);
    return {
      row,
      texts: Object.fromEntries(roles.map(([role, { index }]) => [role, textCells.text(index)])),
      time: when === null ? null : written(when),
      coordinates: where?.kind === 'position' ? known(where.position) : null,
    };
  });
}

type Place = ReturnType<ReturnType<typeof rowPosition>>;

const written = (when: RowTime): string | null =>
  when.kind === 'instant' ? new Date(when.utcMs).toISOString() : when.kind === 'date' ? when.day : null;

function known({ latitudeDeg, longitudeDeg, heightM }: Extract<Place, { kind: 'position' }>['position']) {
  return Number.isNaN(latitudeDeg) ? null : { latitudeDeg, longitudeDeg, heightM };
}

const isOpen = ({ doubts }: Draft, ...keys: readonly string[]): boolean =>
  doubts.some(({ key, decisive }) => decisive && keys.some((start) => key.startsWith(start)));

function timeOfRows(
  draft: Draft,
  layout: DelimitedLayout,
  fileName: string,
  { timeZone }: RecognizeOptions,
): TimePlan['read'] | null {
  if (isOpen(draft, 'layout.time', 'layout.constants.date')) return null;
  const fileDate = draft.parts.fromFileName === undefined ? undefined : dateInName(fileName)?.text;
  const has = (role: ColumnRole): boolean => draft.has(role) || (role === 'date' && fileDate !== undefined);
  const textOf = (role: ColumnRole, cells: RowCells): string =>
    cells.text(draft.roles.get(role)?.index ?? -1) || (role === 'date' ? (fileDate ?? '') : '');
  const at = (role: ColumnRole): number => draft.roles.get(role)?.index ?? -1;
  const numberReader = numberReaders(at, {}, decimalCharacter(layout.decimal));
  return timePlan(has, textOf, numberReader, layout.time ?? {}, timeZone ?? null).read;
}

function placeOfRows(
  draft: Draft,
  layout: DelimitedLayout,
  file: string,
): ((row: number, cells: RowCells) => Place) | null {
  const { coordinates, roles } = draft;
  if (coordinates === null || isOpen(draft, 'layout.units', 'layout.decimal')) return null;
  const system = coordinateColumns(coordinates);
  if (!system.roles.every((role) => roles.has(role))) return null;
  const shown = [...roles].filter(([role]) => !TIME_ROLES.has(role));
  const width = draft.columns.length;
  const header: DelimitedHeader = {
    positions: new Map(shown.map(([role, { index }]) => [role, index])),
    headers: new Map(shown.map(([role, { name }]) => [role, name])),
    width,
    namedWidth: width,
    leastWidth: width,
    lastIsText: false,
    readable: true,
    messages: [],
  };
  const { time: _, ...timeless } = layout;
  return rowPosition({
    file,
    header,
    layout: timeless,
    coordinates: system,
    timeZone: null,
    fixValues: new Map(),
    correctionValues: new Map(),
    values: SOME_DATE,
  });
}
