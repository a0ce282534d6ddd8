import { type Message, message, quoted } from '../logs/index.js';
import { median } from '../stats/index.js';
import type { OccupationError, SetAsideOccupation } from './computeErrors.js';
import { groupIndices } from './groupIndices.js';

/** A mark is named from this size on, however small the others are. */
const SMALLEST_MM = 100;
/** … and when it is this many times the usual offset of a mark. */
const TIMES_USUAL = 8;
/** Above this share of occupations more than 10 m off, the cause is the study, not the occupation. */
const WHOLE_STUDY_SHARE = 0.2;

/**
 * Names marks whose median error is far larger than that of the others (wrong coordinates, a wrong name, another
 * frame) and occupations more than 10 m off. Nothing is repaired or dropped here.
 */
export function suspectMarks(
  errors: readonly OccupationError[],
  setAside: readonly SetAsideOccupation[],
): Message[] {
  return [...farOffMarks(errors), ...farOffOccupations(errors, setAside)];
}

function farOffMarks(errors: readonly OccupationError[]): Message[] {
  const byMark = groupIndices(errors.map(({ mark }) => mark));
  const offsets = [...byMark].map(([mark, indices]) => {
    const list = indices.map((i) => errors[i]!);
    const middle = (component: 'east' | 'north' | 'up'): number => {
      const known = list.map((error) => error[component]).filter((value) => !Number.isNaN(value));
      return known.length === 0 ? 0 : median(known);
    };
    const [east, north, up] = [middle('east'), middle('north'), middle('up')];
    return { mark, list, east, north, up, size: Math.hypot(east, north, up) };
  });
  if (offsets.length === 0) return [];
  // The lower of the two middle ones: of two marks the better one says what is usual.
  const usual = offsets.map(({ size }) => size).sort((x, y) => x - y)[(offsets.length - 1) >> 1]!;
  if (usual > SMALLEST_MM) return [allFarOff(usual, offsets.length)];
  return offsets
    .filter(({ size }) => size > SMALLEST_MM && size > TIMES_USUAL * usual)
    .map(({ mark, list, east, north, up, size }) => {
      const days = new Set(list.map(({ day }) => day)).size;
      const rest = `medians of ${counted(list.length, 'occupation')} on ${counted(days, 'day')}`;
      return message(
        'warning',
        'mark-far-off',
        `Mark ${quoted(mark)} is measured ${(size / 1000).toFixed(3)} m from its known coordinates (east ${signed(east)}, north ${signed(north)}, up ${signed(up)} mm, ${rest}), other marks ${usual.toFixed(0)} mm. It is kept and spoils the fit: check its coordinates, its name and its frame.`,
      );
    });
}

/** Whole millimetres with their sign; what rounds to nothing has none. */
function signed(valueMm: number): string {
  const whole = Math.round(valueMm);
  return `${whole < 0 ? '−' : whole > 0 ? '+' : ''}${Math.abs(whole)}`;
}

const counted = (count: number, what: string): string => `${count} ${what}${count === 1 ? '' : 's'}`;

/** Offsets of most marks are no matter of single marks. */
function allFarOff(usualMm: number, marks: number): Message {
  const which = marks === 1 ? 'The only mark is' : `At least half of the ${marks} marks are`;
  return message(
    'warning',
    'marks-far-off',
    `${which} measured ${(usualMm / 1000).toFixed(3)} m or more from the known coordinates. Nothing is set aside for it, and it spoils the fit: check the coordinates of the base, the frames of base and marks, the kind of heights and the antenna heights.`,
  );
}

function farOffOccupations(
  errors: readonly OccupationError[],
  setAside: readonly SetAsideOccupation[],
): Message[] {
  if (setAside.length === 0) return [];
  const all = errors.length + setAside.length;
  const { error } = setAside[0]!;
  const size = Math.hypot(error.east || 0, error.north || 0, error.up || 0) / 1000;
  const count = setAside.length === 1 ? '1 occupation is' : `${setAside.length} of ${all} occupations are`;
  const marks = new Set(setAside.map((one) => one.error.mark)).size;
  const which =
    setAside.length === 1
      ? `on mark ${quoted(error.mark)}, by ${size.toFixed(1)} m`
      : marks === 1
        ? `all on mark ${quoted(error.mark)}, the first by ${size.toFixed(1)} m`
        : `on ${marks} marks, the first on mark ${quoted(error.mark)}, by ${size.toFixed(1)} m`;
  const remedy =
    setAside.length > WHOLE_STUDY_SHARE * all
      ? 'So many have one cause: check units, coordinate system, height system, and the coordinates of marks and bases.'
      : 'Check the name of the mark and the coordinates.';
  return [
    message(
      'warning',
      'error-over-10-m',
      `${count} more than 10 m from the known coordinates and set aside: ${which}. ${remedy}`,
      { file: error.file, row: error.row },
    ),
  ];
}
