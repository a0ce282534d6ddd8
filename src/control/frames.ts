import { type Message, message, quoted } from '../logs/index.js';
import type { Bases } from './bases.js';
import { isAre, markNames } from './markNames.js';
import type { Mark, Marks } from './marks.js';
import type { PointCoordinates, Versioned } from './versions.js';

/** What is stated of frames beyond marks and bases. */
export interface FrameStatements {
  /** Frames that logs state; their positions are in that of the base all the same, unless they are transformed. */
  readonly logFrames: readonly {
    readonly frame: string;
    readonly epoch: number;
    readonly transformed: boolean;
  }[];
  /** Marks, bases or all logs are brought to one frame by the study file. */
  readonly broughtToOneFrame: boolean;
}

/** Strain that adds up between two epochs, ppm a year: a common upper size within a plate's deforming zones. */
const STRAIN_PPM_PER_YEAR = 0.1;
const SAME_EPOCH_YEARS = 0.5;

/** Where marks, bases and logs say that they are in different frames, or belong to different epochs. */
export function frameMessages(
  marks: Marks,
  bases: Bases,
  { logFrames, broughtToOneFrame }: FrameStatements,
): Message[] {
  return [
    ...(broughtToOneFrame ? [] : [...controlFrames(marks, bases), ...epochMessages(marks, bases)]),
    ...logFrameMessages(logFrames, bases),
  ];
}

const same = (a: string, b: string): boolean =>
  a.toLowerCase().replace(/[\s_-]/g, '') === b.toLowerCase().replace(/[\s_-]/g, '');

function controlFrames(marks: Marks, bases: Bases): Message[] {
  return [...bases.values()].flatMap((base) => {
    if (base.frame === '') return [];
    const other = [...marks.values()].filter(({ frame }) => frame !== '' && !same(frame, base.frame));
    const [first] = other;
    if (first === undefined) return [];
    return [
      message(
        'warning',
        'frames-differ',
        `Positions are in the frame of their base, whatever their label: base ${quoted(base.name)} is in ${quoted(base.frame)}, ${markNames(other)} ${isAre(other)} in ${quoted(first.frame)}. Frames of the satellite age differ by shifts up to metres and by a scale of up to 0.01 ppm, older ones by 1 to 10 ppm (common practice). State the transformation of the marks, or give both in one frame.`,
      ),
    ];
  });
}

function epochMessages(marks: Marks, bases: Bases): Message[] {
  return [...bases.values()].flatMap((base) => {
    const years = (mark: Mark): number => yearsApart(mark, base);
    const other = [...marks.values()].filter((mark) => years(mark) > SAME_EPOCH_YEARS);
    if (other.length === 0) return [];
    const most = Math.max(...other.map(years));
    const ppm = most * STRAIN_PPM_PER_YEAR;
    const own = [...new Set(base.versions.map(({ epoch }) => epoch))].filter((epoch) => !Number.isNaN(epoch));
    return [
      message(
        'warning',
        'epochs-differ',
        `Coordinates of base ${quoted(base.name)} belong to ${own.join(' and ')}, those of ${markNames(other)} to epochs up to ${most.toFixed(1)} years away. Where the ground is strained by ${STRAIN_PPM_PER_YEAR} ppm a year this adds up to ${ppm.toFixed(1)} ppm, and a motion that both share drops out. Bring both to one epoch.`,
      ),
    ];
  });
}

/** The most years between coordinates of two points that hold on the same day; 0 where none are known. */
function yearsApart(a: Versioned, b: Versioned): number {
  const years = a.versions.flatMap((one) =>
    b.versions.filter((other) => holdTogether(one, other)).map((other) => Math.abs(one.epoch - other.epoch)),
  );
  return Math.max(0, ...years.filter((value) => !Number.isNaN(value)));
}

const holdTogether = (a: PointCoordinates, b: PointCoordinates): boolean =>
  (a.to === '' || b.from === '' || b.from <= a.to) && (b.to === '' || a.from === '' || a.from <= b.to);

function logFrameMessages(logFrames: FrameStatements['logFrames'], bases: Bases): Message[] {
  const [base] = bases.values();
  const stated = logFrames.filter(({ frame, transformed }) => frame !== '' && !transformed);
  const differs = stated.find(
    ({ frame }) => base !== undefined && base.frame !== '' && !same(frame, base.frame),
  );
  if (differs === undefined) return [];
  return [
    message(
      'warning',
      'frames-differ',
      `The logs are labelled ${quoted(differs.frame)} and base ${quoted(base!.name)} stands in ${quoted(base!.frame)}: positions are in the frame of the coordinate that the base was run with. Check which coordinate that was, or state the transformation of the logs.`,
    ),
  ];
}
