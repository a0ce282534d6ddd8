import { quoted } from '../../logs/index.js';
import { assumedBasePpm } from '../assumedBase.js';
import type { BaseParameters, LikelyCause, ReadAs } from './commonCauses.js';
import type { MarkVector } from './markVectors.js';
import { type CommonParameter, isTold } from './similarity.js';
import { siteFactors } from './siteFactor.js';

/** Smaller than these, what marks have in common is left to the reference of the fit. */
const PLAN_SHIFT_MM = 20;
const UP_SHIFT_MM = 30;
const SCALE_PPM = 1;
const ROTATION_ARCSEC = 1;
const TILT_MM_PER_KM = 3;
/** A height that is off by so much is of another kind, not measured with another rod. */
const GEOID_MM = 3000;
/** A scale agrees with a factor of the site within this, or three standard errors. */
const SAME_SCALE_PPM = 1;

/** What most likely made the shifts, scales, rotations and tilts that are told from nothing. */
export function causesInVectors(
  bases: readonly BaseParameters[],
  vectors: readonly MarkVector[],
  logs: readonly ReadAs[],
): LikelyCause[] {
  return bases.flatMap((base) => [
    ...shiftCauses(base, bases),
    ...scaleCauses(base, vectors, logs),
    ...turnCauses(base),
  ]);
}

const parameter = ({ parameters }: BaseParameters, name: CommonParameter['name']): CommonParameter | null =>
  parameters.find((each) => each.name === name) ?? null;

function shiftCauses(own: BaseParameters, all: readonly BaseParameters[]): LikelyCause[] {
  const [east, north, up] = [
    parameter(own, 'shift-east'),
    parameter(own, 'shift-north'),
    parameter(own, 'shift-up'),
  ];
  const causes: LikelyCause[] = [];
  if (east !== null && north !== null) {
    const size = Math.hypot(east.estimate, north.estimate);
    if (size > PLAN_SHIFT_MM && (isTold(east) || isTold(north)))
      causes.push(planShift(own, east, north, up, all));
  }
  const planToo = causes.length > 0;
  if (up !== null && isTold(up) && Math.abs(up.estimate) > UP_SHIFT_MM && !planToo)
    causes.push(upShift(own, up));
  return causes;
}

function planShift(
  own: BaseParameters,
  east: CommonParameter,
  north: CommonParameter,
  up: CommonParameter | null,
  all: readonly BaseParameters[],
): LikelyCause {
  const sizeM = Math.hypot(east.estimate, north.estimate, up?.estimate ?? 0) / 1000;
  const vector = [east, north, ...(up === null ? [] : [up])]
    .map((each) => `${each.name.slice('shift-'.length)} ${withError(each, 0)}`)
    .join(', ');
  const others = all.filter((each) => each !== own && !shifted(each));
  const found = `All positions from base ${quoted(own.base)} are shifted by ${sizeM.toFixed(3)} m (${vector} mm)`;
  const ppm = `about ${assumedBasePpm(sizeM).toFixed(2)} ppm of every baseline (common practice: metres / 20)`;
  if (others.length > 0) {
    return {
      code: 'base-coordinate',
      text: `${found}, and those from base ${quoted(others[0]!.base)} are not: the coordinate of this base is not the one it was run with. A base on an assumed coordinate adds ${ppm}.`,
      remedy:
        'Correct the base in the bases file, or give the coordinates it was run with (baseLatitude, baseLongitude, baseHeight in the log or its constants) and state moveToPublishedBase: true.',
    };
  }
  return {
    code: 'frame-or-base',
    text: `${found}. Either the base was run on an assumed coordinate, which adds ${ppm}, or base and marks are in different frames or realisations.`,
    remedy:
      'Give the coordinates the base was run with (baseLatitude, baseLongitude, baseHeight in the log or its constants) and state moveToPublishedBase: true, or state the transformation between the frames of marks and base.',
  };
}

const shifted = (base: BaseParameters): boolean => {
  const [east, north] = [parameter(base, 'shift-east'), parameter(base, 'shift-north')];
  if (east === null || north === null) return false;
  return Math.hypot(east.estimate, north.estimate) > PLAN_SHIFT_MM && (isTold(east) || isTold(north));
};

function upShift({ base }: BaseParameters, up: CommonParameter): LikelyCause {
  const found = `All heights from base ${quoted(base)} are off by ${withError(up, 0)} mm, the plan is not`;
  if (Math.abs(up.estimate) > GEOID_MM) {
    return {
      code: 'height-kind',
      text: `${found}: the size of a geoid separation. Ellipsoidal heights are compared with orthometric ones.`,
      remedy: 'State heights of logs, marks and bases, and the geoid separation between them.',
    };
  }
  return {
    code: 'rod-height',
    text: `${found}: a rod height, an antenna reference or the antenna height of the base.`,
    remedy:
      'Look up the heights in the field book; state heightOf: antenna and antennaHeight where the log holds heights of the antenna, or correct the base height.',
  };
}

function scaleCauses(
  own: BaseParameters,
  vectors: readonly MarkVector[],
  logs: readonly ReadAs[],
): LikelyCause[] {
  const scale = parameter(own, 'scale');
  if (scale === null || !isTold(scale) || Math.abs(scale.estimate) < SCALE_PPM) return [];
  const found = `Positions from base ${quoted(own.base)} are stretched by ${withError(scale, 2)} ppm along the baselines, on all days alike`;
  const near = vectors.find(({ base }) => base === own.base)!;
  const within = Math.max(SAME_SCALE_PPM, 3 * scale.standardError!);
  const factor = [...new Set(logs.map(({ system }) => system))]
    .flatMap((system) => siteFactors(system, near.known))
    .filter(({ ppm }) => Math.abs(ppm) > 2 * within && Math.abs(ppm - scale.estimate) < within)
    .sort((a, b) => Math.abs(a.ppm - scale.estimate) - Math.abs(b.ppm - scale.estimate))[0];
  if (factor !== undefined) {
    return [
      {
        code: 'grid-for-ground',
        text: `${found}. This is ${factor.words} of the site (${factor.ppm.toFixed(1)} ppm): coordinates on the ground and on the grid are compared.`,
        remedy: 'State the groundGrid of the logs or marks: its factor and the point it is about.',
      },
    ];
  }
  return [
    {
      code: 'systematic-scale',
      text: `${found}. It is a signed ppm and no part of the scatter: another frame or realisation, a transformation of the job with a scale, or an ionosphere that shortens single-frequency baselines.`,
      remedy: 'State the transformation, or rest the rule on repeatability, in which it is not contained.',
    },
  ];
}

function turnCauses(own: BaseParameters): LikelyCause[] {
  const causes: LikelyCause[] = [];
  const rotation = parameter(own, 'rotation');
  if (rotation !== null && isTold(rotation) && Math.abs(rotation.estimate) > ROTATION_ARCSEC) {
    causes.push({
      code: 'rotated',
      text: `Positions from base ${quoted(own.base)} are turned by ${withError(rotation, 2)} seconds of arc about it: a local transformation of the job, or a frame that is turned.`,
      remedy: 'State the sitePlane or the transformation of the logs.',
    });
  }
  const tilts = [parameter(own, 'tilt-east'), parameter(own, 'tilt-north')].filter(
    (tilt): tilt is CommonParameter =>
      tilt !== null && isTold(tilt) && Math.abs(tilt.estimate) > TILT_MM_PER_KM,
  );
  for (const tilt of tilts) {
    causes.push({
      code: 'tilted',
      text: `Heights from base ${quoted(own.base)} grow by ${withError(tilt, 1)} mm per km to the ${tilt.name.slice('tilt-'.length)}: the slope of a geoid that one separation stands for, or a tilt in a transformation of the job. It looks like vertical ppm.`,
      remedy: 'State separations from a grid file or for each mark, or the sitePlane of the logs.',
    });
  }
  return causes;
}

/** An estimate with its standard error. */
function withError({ estimate, standardError }: CommonParameter, decimals: number): string {
  const sign = estimate < 0 ? '−' : '+';
  const value = `${sign}${Math.abs(estimate).toFixed(decimals)}`;
  return standardError === null ? value : `${value} ± ${standardError.toFixed(Math.max(decimals, 1))}`;
}
