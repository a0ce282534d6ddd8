import { LEAP_SECONDS_KNOWN_UNTIL } from '../time/index.js';
import type { CoordinateChanges } from './coordinateChanges.js';
import { coordinateColumns } from './coordinateColumns.js';
import type { CoordinateSystem } from './coordinateSystem.js';
import { valuesFromFileName } from './fileName.js';
import { FileNotes } from './fileNotes.js';
import { type DelimitedLayout, decimalCharacter, type LogLayout } from './layout.js';
import { inputError, type Message, message } from './messages.js';
import { readNmea } from './nmea/readNmea.js';
import { nmeaConstants } from './nmeaConstants.js';
import { CORRECTION_KINDS, type Corrections, type Fix, type Position } from './position.js';
import { readDelimited } from './readDelimited.js';
import type { SetAsideRow } from './reasons.js';
import { type LogResolution, ResolutionMeter } from './resolution.js';
import type { ColumnRole } from './roles.js';
import { rowPosition } from './rowPosition.js';
import { wordMeanings } from './wordMeanings.js';

export interface LogFile {
  readonly path: string;
  /** Name in messages and accounts, relative to the study file. */
  readonly file: string;
  readonly layout: LogLayout;
  readonly coordinates: CoordinateSystem;
  /** A position that names no known mark belongs to the nearest one within this distance, m. */
  readonly nearestMarkM?: number | null | undefined;
  /** Marks may come from a list of times instead of the rows. */
  readonly marksByTime?: boolean | undefined;
  /** What must be done to the coordinates before they can be compared with those of marks and bases. */
  readonly changes?: CoordinateChanges | undefined;
  /** From where the corrections of rows came that do not tell. */
  readonly corrections?: Corrections | undefined;
  /** Positions are to be moved by the difference between the base coordinates in the log and the published ones. */
  readonly moveToPublishedBase?: boolean | undefined;
}

/** A stretch of one log. `rowsRead = positions + setAside`. */
export interface LogBatch {
  readonly file: string;
  readonly rowsRead: number;
  readonly positions: readonly Position[];
  readonly setAside: readonly SetAsideRow[];
  /** Messages about the file as a whole, each sent once. */
  readonly messages: readonly Message[];
  /** A position that names no known mark belongs to the nearest one within this distance, m. */
  readonly nearestMarkM?: number | null | undefined;
  /** Positions are to be moved by the difference between the base coordinates in the log and the published ones. */
  readonly moveToPublishedBase?: boolean | undefined;
  /** In what steps the positions are written; comes with the last batch of a file. */
  readonly resolution?: LogResolution | null | undefined;
}

export interface ReadLogsOptions {
  /** Zone of times that are written without one; null refuses them. */
  readonly timeZone: string | null;
}

/**
 * Positions of the logs, as a stream in the order of files and rows. A file is opened when its turn comes, and
 * memory does not depend on the length of a log.
 * @throws InputError for a layout that cannot be: an unknown time format or zone, a faulty pattern
 */
export async function* readLogs(
  files: readonly LogFile[],
  options: ReadLogsOptions,
): AsyncGenerator<LogBatch> {
  for (const log of files) {
    const values = layoutValues(log);
    const batches =
      log.layout.kind === 'nmea'
        ? readNmeaLog(log, values)
        : readDelimitedLog(log, log.layout, values, options);
    const { nearestMarkM, moveToPublishedBase } = log;
    for await (const batch of batches) yield { ...batch, nearestMarkM, moveToPublishedBase };
  }
}

type Values = Readonly<Partial<Record<ColumnRole, string>>>;

/** Values that stand in no column: constants, and what the name of the file gives. */
function layoutValues({ file, layout, corrections }: LogFile): Values {
  const stated = corrections === undefined ? {} : { corrections };
  const fromName = layout.fromFileName === undefined ? {} : valuesFromFileName(layout.fromFileName, file);
  return { ...stated, ...layout.constants, ...fromName };
}

async function* readNmeaLog(log: LogFile, values: Values): AsyncGenerator<LogBatch> {
  const { path, file, changes } = log;
  const { texts, extras } = layoutOr(file, () => nmeaConstants(values, changes));
  for await (const batch of readNmea({ path, file, date: values.date ?? null, changes })) {
    const positions = batch.positions.map((position) => ({
      ...position,
      ...texts,
      extras: extras(position.extras),
    }));
    yield { ...batch, positions };
  }
}

async function* readDelimitedLog(
  log: LogFile,
  layout: DelimitedLayout,
  values: Values,
  options: ReadLogsOptions,
): AsyncGenerator<LogBatch> {
  const { file, path } = log;
  const coordinates = coordinateColumns(layout.coordinates ?? log.coordinates, log.changes);
  const notes = new FileNotes(file);
  const known = (roles: readonly ColumnRole[]): boolean => roles.some((role) => values[role] !== undefined);
  const named = known(NAME_ROLES) || log.nearestMarkM != null || log.marksByTime === true;
  const needed: readonly ColumnRole[] = coordinates.rowSeparations
    ? [...coordinates.roles, 'geoidSeparation']
    : coordinates.roles;
  const required = needed.filter((role) => values[role] === undefined);
  const requiredOneOf = [
    ...(known(TIME_ROLES) ? [] : [{ what: 'the time', roles: TIME_ROLES }]),
    ...(named ? [] : [{ what: 'the mark', roles: NAME_ROLES }]),
  ];
  let read: ReturnType<typeof rowPosition> | null = null;
  let meter: ResolutionMeter | null = null;
  let latestMs = Number.NEGATIVE_INFINITY;
  let gpsScale = layout.time?.scale === 'gps';
  let batch = new Collected();
  const sink = {
    header(header: Parameters<typeof notes.see>[0]) {
      const { timeZone } = options;
      read = layoutOr(file, () =>
        rowPosition({
          file,
          header,
          layout,
          coordinates,
          timeZone,
          fixValues: wordMeanings<Fix>(['fixed', 'float'], layout.fixValues),
          correctionValues: wordMeanings(CORRECTION_KINDS, layout.correctionValues),
          changes: log.changes ?? {},
          values,
        }),
      );
      notes.see(header, values.fix !== undefined);
      gpsScale ||= header.positions.has('gpsWeek');
      meter = new ResolutionMeter(header, coordinates, layout);
    },
    row(row: number, cells: Parameters<NonNullable<typeof read>>[1]) {
      const outcome = read!(row, cells);
      batch.rowsRead += 1;
      if (outcome.kind === 'set-aside') batch.setAside.push(outcome.row);
      else {
        batch.positions.push(outcome.position);
        latestMs = Math.max(latestMs, outcome.position.utcMs || latestMs);
        notes.add(outcome);
        meter!.add(row, cells);
      }
    },
    fault(row: number, detail: string) {
      batch.rowsRead += 1;
      batch.setAside.push({ file, row, reason: 'unreadable', column: null, detail });
    },
    message(told: Message) {
      batch.messages.push(told);
    },
  };
  const delimited = { ...layout, decimal: decimalCharacter(layout.decimal), required, requiredOneOf };
  for await (const _ of readDelimited(path, file, delimited, sink)) {
    const { rowsRead, positions, setAside, messages } = batch;
    batch = new Collected();
    notes.rows += rowsRead;
    yield { file, rowsRead, positions, setAside, messages };
  }
  // Assigned in a callback, which the compiler does not follow.
  const measured = meter as ResolutionMeter | null;
  const messages = [
    ...notes.messages(),
    ...(measured?.messages(file) ?? []),
    ...(gpsScale ? leapSecondMessage(file, latestMs) : []),
  ];
  const resolution = measured?.resolution() ?? null;
  yield { file, rowsRead: 0, positions: [], setAside: [], messages, resolution };
}

/** Times on the GPS scale need the leap seconds, and the table of them ends somewhere. */
function leapSecondMessage(file: string, latestMs: number): Message[] {
  if (latestMs <= Date.parse(LEAP_SECONDS_KNOWN_UNTIL)) return [];
  return [
    message(
      'info',
      'leap-seconds',
      `The leap seconds are known until ${LEAP_SECONDS_KNOWN_UNTIL}, and later GPS times are turned with the last value. Look whether a leap second was announced since.`,
      { file },
    ),
  ];
}

const NAME_ROLES: readonly ColumnRole[] = ['mark', 'pointNumber', 'description'];
const TIME_ROLES: readonly ColumnRole[] = ['time', 'date', 'start', 'gpsWeek'];

class Collected {
  rowsRead = 0;
  readonly positions: Position[] = [];
  readonly setAside: SetAsideRow[] = [];
  readonly messages: Message[] = [];
}

/** A fault of the layout itself is the user's mistake. */
function layoutOr<T>(file: string, make: () => T): T {
  try {
    return make();
  } catch (error) {
    const fault = (error as Error).message.replace(/\.$/, '');
    throw inputError('bad-layout', `The layout of this log cannot be used: ${fault}. Correct it.`, { file });
  }
}
