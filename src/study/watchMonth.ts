import type { OccupationError, SetAsideOccupation, Visit } from '../errors/index.js';
import type { OccupationReason, RowReason } from '../logs/index.js';
import { type MarkShift, markShifts, type NextMark, nextMarks, type WatchBasis } from '../rule/index.js';
import { type LateOccupations, lateOccupations } from './lateOccupations.js';
import type { FileResult, Results } from './results.js';

/** What happened on new days, for the page of a month. */
export interface WatchMonth {
  /** Days after this one are new; null without an earlier day. */
  readonly after: string | null;
  readonly from: string | null;
  readonly to: string | null;
  /** New days with a visit. */
  readonly days: number;
  /** Earlier days of which logs came late: nothing below counts them. */
  readonly late: LateOccupations;
  readonly crews: readonly CrewShots[];
  readonly visits: {
    readonly withFix: number;
    readonly withoutFix: number;
    readonly shareWithoutFix: number | null;
  };
  /** The share in the earlier study. */
  readonly earlierShareWithoutFix: number | null;
  /** Rows set aside that the earlier run did not set aside for the same reason. */
  readonly rowsSetAside: readonly RowsSetAside[];
  readonly occupationsSetAside: readonly NewlySetAside[];
  readonly markShifts: readonly MarkShift[];
  readonly nextMarks: readonly NextMark[];
  /** Messages that the earlier run told too; they are not told again. */
  readonly messagesToldBefore: number;
}

/** The new days of one crew; a crew that the logs do not name is blank. */
export interface CrewShots {
  readonly crew: string;
  readonly days: number;
  readonly visits: number;
  readonly visitsWithoutFix: number;
  readonly occupations: number;
}

export interface RowsSetAside {
  readonly file: string;
  readonly reason: RowReason;
  readonly count: number;
  /** Lines of the first ones; none for a file that the earlier run read too, where old and new stand together. */
  readonly firstRows: readonly number[];
}

export interface NewlySetAside {
  readonly day: string;
  readonly mark: string;
  readonly crew: string;
  readonly reason: OccupationReason;
  readonly detail: string;
  readonly file: string;
  readonly row: number;
}

/** What of an earlier run new days are held against. */
export type EarlierRun = Pick<Results, 'watch' | 'period' | 'visits' | 'files' | 'marks' | 'messages'>;

/** What was read of the new days. */
export interface NewDays {
  readonly results: Results;
  readonly errors: readonly OccupationError[];
  readonly weights: Float64Array | undefined;
  readonly setAside: readonly SetAsideOccupation[];
  readonly visits: readonly Visit[];
  readonly messagesToldBefore: number;
}

export function watchMonth(earlier: EarlierRun, read: NewDays): WatchMonth {
  const bases = earlier.watch.flatMap(({ basis }) => (basis === null ? [] : [basis]));
  const after = bases[0]?.lastDay ?? earlier.period?.to ?? null;
  const isNew = ({ day }: { readonly day: string }): boolean => after === null || day > after;
  const errors = read.errors.filter(isNew);
  const weights = read.weights && Float64Array.from(read.weights.filter((_, i) => isNew(read.errors[i]!)));
  const visits = read.visits.filter(isNew);
  const days = [...new Set(visits.map(({ day }) => day))].sort();
  const withoutFix = visits.filter(({ fixedRows }) => fixedRows === 0).length;
  const shifts = bases.flatMap((basis) => markShifts(errors, earlier.marks, basis, weights));
  return {
    after,
    from: days[0] ?? null,
    to: days.at(-1) ?? null,
    days: days.length,
    late: lateOccupations({ ...read, files: read.results.files }, earlier.files, after),
    crews: crewShots(visits, errors),
    visits: {
      withFix: visits.length - withoutFix,
      withoutFix,
      shareWithoutFix: share(withoutFix, visits.length),
    },
    earlierShareWithoutFix: share(
      earlier.visits.withoutFix,
      earlier.visits.withFix + earlier.visits.withoutFix,
    ),
    rowsSetAside: rowsSetAside(read.results.files, earlier.files),
    occupationsSetAside: read.setAside
      .filter(({ error }) => isNew(error))
      .map(({ reason, detail, error: { day, mark, crew, file, row } }) => ({
        day,
        mark,
        crew,
        reason,
        detail,
        file,
        row,
      })),
    markShifts: shifts,
    messagesToldBefore: read.messagesToldBefore,
    nextMarks: nextMarks(earlier.marks, daysAtMarks(visits), shifts, horizontalOr(bases)),
  };
}

const share = (part: number, all: number): number | null => (all === 0 ? null : part / all);

const horizontalOr = (bases: readonly WatchBasis[]): WatchBasis | null =>
  bases.find(({ component }) => component === 'horizontal') ?? bases[0] ?? null;

function crewShots(visits: readonly Visit[], errors: readonly OccupationError[]): CrewShots[] {
  const crews = [...new Set([...visits, ...errors].map(({ crew }) => crew))].sort();
  return crews.map((crew): CrewShots => {
    const own = visits.filter((visit) => visit.crew === crew);
    return {
      crew,
      days: new Set(own.map(({ day }) => day)).size,
      visits: own.length,
      visitsWithoutFix: own.filter(({ fixedRows }) => fixedRows === 0).length,
      occupations: errors.filter((error) => error.crew === crew).length,
    };
  });
}

function daysAtMarks(visits: readonly Visit[]): Map<string, number> {
  const days = new Map<string, Set<string>>();
  for (const { mark, day } of visits) days.set(mark, (days.get(mark) ?? new Set<string>()).add(day));
  return new Map([...days].map(([mark, found]) => [mark, found.size]));
}

/** Of a file that the earlier run read too, what it did not count under the reason; such a file may have grown. */
function rowsSetAside(files: readonly FileResult[], earlier: readonly FileResult[]): RowsSetAside[] {
  return files.flatMap(({ file, read, setAside }) => {
    const before = earlier.find((one) => one.file === file && one.read <= read);
    return (Object.entries(setAside) as [RowReason, FileResult['setAside'][RowReason]][]).flatMap(
      ([reason, found]): RowsSetAside[] => {
        const count = found!.count - (before?.setAside[reason]?.count ?? 0);
        const firstRows = before === undefined ? found!.firstRows : [];
        return count > 0 ? [{ file, reason, count, firstRows }] : [];
      },
    );
  });
}
