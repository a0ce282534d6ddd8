import {
  crsDefinition,
  type Geocentric,
  type Geodetic,
  geocentricToGeodetic,
  geodeticToGeocentric,
  type LengthUnit,
  metresPer,
  type Projection,
  projection,
} from '../../geodesy/index.js';
import { type CoordinateSystem, systemOf } from '../../logs/index.js';
import type { ReadAs } from './commonCauses.js';

/** A way in which coordinates may have been read wrongly, and how they stand when it is undone. */
export interface Candidate {
  readonly code: string;
  /** What was done to them, and what to state in the study file instead. */
  readonly text: string;
  readonly remedy: string;
  /** The same coordinates read the other way; null where they cannot be. */
  readonly reread: (place: Geodetic) => Geodetic | null;
}

const UNIT_WORDS: Readonly<Record<LengthUnit, string>> = {
  metre: 'metres',
  'international-foot': 'international feet',
  'us-survey-foot': 'US survey feet',
};

/** Ways in which coordinates of a system may have been read wrongly in plan. */
export function planCandidates({ system, length }: ReadAs): Candidate[] {
  const { kind } = systemOf(system);
  if (kind === 'geographic') return [swappedAngles()];
  if (kind === 'geocentric') return geocentricCandidates(length);
  return planeCandidates(system, length);
}

/** Ways in which heights may have been read wrongly. */
export function heightCandidates({ height }: ReadAs): Candidate[] {
  return unitsMeant(height).map(([from, to, words, factor]) => ({
    code: 'height-unit',
    text: `heights look like ${words}`,
    remedy: `state height: ${to} under units (now ${from})`,
    reread: (place) => ({ ...place, heightM: place.heightM * factor }),
  }));
}

/** Units that may have been meant where one was read: read as, meant, words, and what to multiply by. */
function unitsMeant(read: LengthUnit): (readonly [LengthUnit, LengthUnit, string, number])[] {
  const units = Object.keys(UNIT_WORDS) as LengthUnit[];
  return units
    .filter((meant) => meant !== read)
    .map((meant) => [
      read,
      meant,
      `${UNIT_WORDS[meant]} read as ${UNIT_WORDS[read]}`,
      metresPer(meant) / metresPer(read),
    ]);
}

const swappedAngles = (): Candidate => ({
  code: 'swapped-axes',
  text: 'latitude and longitude look swapped',
  remedy: 'name the columns the other way round under columns',
  reread: ({ latitudeDeg, longitudeDeg, heightM }) =>
    Math.abs(longitudeDeg) <= 90 ? { latitudeDeg: longitudeDeg, longitudeDeg: latitudeDeg, heightM } : null,
});

function geocentricCandidates(length: LengthUnit): Candidate[] {
  const reread = (change: (c: Geocentric) => Geocentric) => (place: Geodetic) => {
    try {
      return geocentricToGeodetic(change(geodeticToGeocentric(place)));
    } catch {
      // Too near to the centre of the earth: no place.
      return null;
    }
  };
  return [
    {
      code: 'swapped-axes',
      text: 'x and y look swapped',
      remedy: 'name the columns the other way round under columns',
      reread: reread(({ xM, yM, zM }) => ({ xM: yM, yM: xM, zM })),
    },
    ...unitsMeant(length).map(([from, to, words, factor]) => ({
      code: 'plan-unit',
      text: `coordinates look like ${words}`,
      remedy: `state length: ${to} under units (now ${from})`,
      reread: reread(({ xM, yM, zM }) => ({ xM: xM * factor, yM: yM * factor, zM: zM * factor })),
    })),
  ];
}

function planeCandidates(system: CoordinateSystem, length: LengthUnit): Candidate[] {
  const plane = projection(system);
  const through =
    (change: (e: number, n: number) => readonly [number, number], other: Projection = plane) =>
    (place: Geodetic): Geodetic | null => {
      try {
        const { eastingM, northingM } = plane.forward(place);
        const [e, n] = change(eastingM, northingM);
        return { ...other.inverse({ eastingM: e, northingM: n }), heightM: place.heightM };
      } catch {
        // Outside the reach of the projection: these coordinates cannot be read so.
        return null;
      }
    };
  return [
    {
      code: 'swapped-axes',
      text: 'easting and northing look swapped',
      remedy: 'name the columns the other way round under columns',
      reread: through((e, n) => [n, e]),
    },
    ...unitsMeant(length).map(([from, to, words, factor]) => ({
      code: 'plan-unit',
      text: `coordinates look like ${words}`,
      remedy: `state length: ${to} under units (now ${from})`,
      reread: through((e, n) => [e * factor, n * factor]),
    })),
    ...neighbourZones(system).map(({ zone, definition }) => ({
      code: 'wrong-zone',
      text: `coordinates look like those of ${zone}`,
      remedy: `state coordinates: ${/^EPSG/.test(definition) ? definition : `"${definition}"`}`,
      reread: through((e, n) => [e, n], projection(definition)),
    })),
  ];
}

/** The zones beside a zone, in the words of the definition itself. */
function neighbourZones(system: CoordinateSystem): { zone: string; definition: string }[] {
  if (/^EPSG:/i.test(system)) return neighbourCodes(system);
  const proj = /^(.*\+proj=utm.*\+zone=)(\d{1,2})(\b.*)$/.exec(system);
  if (proj === null) return [];
  const [, before, zone, after] = proj as unknown as [string, string, string, string];
  return [-1, 1]
    .map((step) => ((Number(zone) + step + 59) % 60) + 1)
    .map((next) => ({ zone: `zone ${next}`, definition: `${before}${next}${after}` }));
}

/** Zones of one grid have codes that follow each other. */
function neighbourCodes(system: CoordinateSystem): { zone: string; definition: string }[] {
  const own = crsDefinition(system);
  return [-1, 1].flatMap((step) => {
    const code = Number(own.code.slice('EPSG:'.length)) + step;
    try {
      const next = crsDefinition(code);
      const alike = next.kind === 'projected' && next.frame === own.frame;
      return alike ? [{ zone: next.name, definition: next.code }] : [];
    } catch {
      // No such code: no neighbour on this side.
      return [];
    }
  });
}
