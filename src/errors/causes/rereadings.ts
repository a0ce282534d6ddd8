import { type Geodetic, geodeticToGeocentric } from '../../geodesy/index.js';
import { median } from '../../stats/index.js';
import { type Candidate, heightCandidates, planCandidates } from './candidates.js';
import type { LikelyCause, ReadAs } from './commonCauses.js';

/** Where a mark was measured and where it should be. */
export interface ComparedPlace {
  readonly mark: string;
  readonly known: Geodetic;
  readonly measured: Geodetic;
  readonly base: Geodetic;
}

/** Only misfits above these are worth another reading, m. */
const PLAN_M = 0.1;
const HEIGHT_M = 1;
/** Another reading must leave less than this share of the misfit … */
const LEFT_OVER = 0.1;
/** … and no more than this, m, or than this share: far smaller than any misreading by chance. */
const SMALL_M = 0.5;
const SMALL_SHARE = 1e-3;
/** Readings that leave up to so many times the least agree alike. */
const ALIKE = 3;

/**
 * Ways of reading the coordinates of logs or marks under which they agree far better: swapped axes, another unit or
 * zone. Of several that would do, the one that leaves least is named.
 */
export function rereadings(
  places: readonly ComparedPlace[],
  read: { readonly logs: readonly ReadAs[]; readonly marks: ReadAs },
): LikelyCause[] {
  const plan = places.filter(({ known }) => !Number.isNaN(known.latitudeDeg));
  const heights = places.filter(({ known }) => !Number.isNaN(known.heightM));
  const logs = [...new Map(read.logs.map((one) => [JSON.stringify(one), one])).values()];
  const candidates = (of: (as: ReadAs) => Candidate[]): Trial[] => [
    ...logs.flatMap((as) => tried('logs', of(as))),
    ...tried('marks', of(read.marks)),
  ];
  const [inPlan, inHeight] = [candidates(planCandidates), candidates(heightCandidates)];
  return [
    ...best(plan, inPlan, planDistanceM, PLAN_M, 'in plan'),
    ...best(heights, inHeight, heightDistanceM, HEIGHT_M, 'in height'),
  ];
}

interface Trial {
  readonly whose: 'logs' | 'marks';
  readonly candidate: Candidate;
}

const tried = (whose: Trial['whose'], candidates: readonly Candidate[]): Trial[] =>
  candidates.map((candidate) => ({ whose, candidate }));

type Distance = (known: Geodetic, measured: Geodetic) => number;

function best(
  places: readonly ComparedPlace[],
  trials: readonly Trial[],
  distance: Distance,
  worthM: number,
  where: string,
): LikelyCause[] {
  if (places.length === 0) return [];
  const before = median(places.map(({ known, measured }) => distance(known, measured)));
  if (!(before > worthM)) return [];
  const good = trials
    .map((trial) => ({ ...trial, after: misfit(places, trial, distance) }))
    .filter(({ after }) => after < LEFT_OVER * before && (after < SMALL_M || after < SMALL_SHARE * before));
  const least = Math.min(...good.map(({ after }) => after));
  // Logs or marks, read the other way, may agree alike: what is far from the base is what was misread.
  const found = good
    .filter(({ after }) => after <= ALIKE * least)
    .sort((a, b) => fromBaseM(places, b.whose) - fromBaseM(places, a.whose) || a.after - b.after)[0];
  if (found === undefined) return [];
  const { whose, candidate, after } = found;
  return [
    {
      code: candidate.code,
      text: `Positions and marks are ${metres(before)} apart ${where} (median of ${countWords(places)}), and ${metres(after)} if the ${whose === 'logs' ? 'logs' : 'marks file'} is read another way: its ${candidate.text}.`.replace(
        'logs is read another way: its',
        'logs are read another way: their',
      ),
      remedy: `For the ${whose}, ${candidate.remedy}.`,
    },
  ];
}

const countWords = (places: readonly ComparedPlace[]): string => {
  const marks = new Set(places.map(({ mark }) => mark)).size;
  return marks === 1 ? '1 mark' : `${marks} marks`;
};

/** Median distance of the logs' or the marks' places from the base as they stand. */
const fromBaseM = (places: readonly ComparedPlace[], whose: Trial['whose']): number =>
  median(places.map(({ known, measured, base }) => planDistanceM(base, whose === 'logs' ? measured : known)));

/** Median distance after another reading; infinite where most places cannot be read so. */
function misfit(places: readonly ComparedPlace[], { whose, candidate }: Trial, distance: Distance): number {
  return median(
    places.map(({ known, measured }) => {
      const reread = candidate.reread(whose === 'logs' ? measured : known);
      if (reread === null) return Number.POSITIVE_INFINITY;
      return whose === 'logs' ? distance(known, reread) : distance(reread, measured);
    }),
  );
}

const heightDistanceM: Distance = (known, measured) => Math.abs(measured.heightM - known.heightM);

/** Straight distance of the two places brought to one height. */
const planDistanceM: Distance = (known, measured) => {
  const [a, b] = [known, measured].map((place) => geodeticToGeocentric({ ...place, heightM: 0 }));
  return Math.hypot(a!.xM - b!.xM, a!.yM - b!.yM, a!.zM - b!.zM);
};

const metres = (value: number): string =>
  value >= 10_000 ? `${(value / 1000).toFixed(0)} km` : `${value.toFixed(value < 10 ? 3 : 0)} m`;
