import {
  type Geocentric,
  type Geodetic,
  geocentricToGeodetic,
  geodeticToGeocentric,
  metresPer,
  type Projection,
  projection,
} from '../../geodesy/index.js';
import type { CoordinateSystem } from '../../logs/index.js';

/** A way in which coordinates may have been read wrongly, and how they stand when it is undone. */
export interface Candidate {
  readonly code: string;
  /** What was done to them, and what to state in the study file instead. */
  readonly text: string;
  readonly remedy: string;
  /** The same coordinates read the other way; null where they cannot be. */
  readonly reread: (place: Geodetic) => Geodetic | null;
}

const FEET = [
  ['international-foot', 'international feet'],
  ['us-survey-foot', 'US survey feet'],
] as const;

/** Ways in which coordinates of a system may have been read wrongly in plan. */
export function planCandidates(system: CoordinateSystem): Candidate[] {
  if (system === 'geographic') return [swappedAngles()];
  if (system === 'geocentric') return geocentricCandidates();
  return planeCandidates(system);
}

/** Ways in which heights may have been read wrongly. */
export function heightCandidates(): Candidate[] {
  return unitPairs().map(([from, to, words, factor]) => ({
    code: 'height-unit',
    text: `heights look like ${words}`,
    remedy: `state height: ${to} under units (now ${from})`,
    reread: (place) => ({ ...place, heightM: place.heightM * factor }),
  }));
}

/** Of every pair of units that can be mistaken for each other: read as, meant, words, and what to multiply by. */
function unitPairs(): (readonly [string, string, string, number])[] {
  const units = ['metre', 'international-foot', 'us-survey-foot'] as const;
  const wordsOf = (unit: string): string => FEET.find(([name]) => name === unit)?.[1] ?? 'metres';
  return units.flatMap((read) =>
    units
      .filter((meant) => meant !== read)
      .map(
        (meant) =>
          [
            read,
            meant,
            `${wordsOf(meant)} read as ${wordsOf(read)}`,
            metresPer(meant) / metresPer(read),
          ] as const,
      ),
  );
}

const swappedAngles = (): Candidate => ({
  code: 'swapped-axes',
  text: 'latitude and longitude look swapped',
  remedy: 'name the columns the other way round under columns',
  reread: ({ latitudeDeg, longitudeDeg, heightM }) =>
    Math.abs(longitudeDeg) <= 90 ? { latitudeDeg: longitudeDeg, longitudeDeg: latitudeDeg, heightM } : null,
});

function geocentricCandidates(): Candidate[] {
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
    ...unitPairs().map(([from, to, words, factor]) => ({
      code: 'plan-unit',
      text: `coordinates look like ${words}`,
      remedy: `state length: ${to} under units (now ${from})`,
      reread: reread(({ xM, yM, zM }) => ({ xM: xM * factor, yM: yM * factor, zM: zM * factor })),
    })),
  ];
}

function planeCandidates(system: CoordinateSystem): Candidate[] {
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
    ...unitPairs().map(([from, to, words, factor]) => ({
      code: 'plan-unit',
      text: `coordinates look like ${words}`,
      remedy: `state length: ${to} under units (now ${from})`,
      reread: through((e, n) => [e * factor, n * factor]),
    })),
    ...neighbourZones(system).map(({ zone, definition }) => ({
      code: 'wrong-zone',
      text: `coordinates look like those of zone ${zone}`,
      remedy: `state coordinates: "${definition}"`,
      reread: through((e, n) => [e, n], projection(definition)),
    })),
  ];
}

/** The zones beside a zone of the universal transverse Mercator grid, in the words of the definition itself. */
function neighbourZones(system: CoordinateSystem): { zone: number; definition: string }[] {
  const proj = /^(.*\+proj=utm.*\+zone=)(\d{1,2})(\b.*)$/.exec(system);
  // WGS 84 zones north and south, of which the last two digits are the zone (EPSG dataset).
  const code = /^(EPSG:32[67])(\d{2})()$/i.exec(system);
  const found = proj ?? code;
  if (found === null) return [];
  const [, before, zone, after] = found as unknown as [string, string, string, string];
  return [-1, 1]
    .map((step) => ((Number(zone) + step + 59) % 60) + 1)
    .map((next) => ({
      zone: next,
      definition: `${before}${code === null ? next : String(next).padStart(2, '0')}${after}`,
    }));
}
