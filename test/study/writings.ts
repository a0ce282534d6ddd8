import {
  frameTransformation,
  type Geodetic,
  geocentricToGeodetic,
  geodeticToGeocentric,
  groundGrid,
  metresPer,
  projection,
  sitePlane,
} from '../../src/geodesy/index.js';

/** A way of writing places: the header, the cells of a place, and the keys of the study file that say so. */
export interface Writing {
  readonly columns: readonly string[];
  readonly cells: (place: Geodetic) => readonly string[];
  /** Keys of a log entry, of marks or of bases. */
  readonly keys: Readonly<Record<string, unknown>>;
  /** Keys that stand in the layout of a log, and beside the others in marks and bases. */
  readonly layout?: Readonly<Record<string, unknown>>;
}

/** An invented geoid: a plane in latitude and longitude, which a grid gives exactly. */
export const separationM = ({ latitudeDeg, longitudeDeg }: Geodetic): number =>
  47 + 1.5 * (latitudeDeg - 48) - 2.5 * (longitudeDeg - 9.5);

export const CONSTANT_M = 46.9;

/** The invented geoid as an ASCII grid around the site. */
export function geoidGridText(): string {
  const [west, south, step, count] = [9, 47.5, 0.1, 13];
  const rows = Array.from({ length: count }, (_, r) =>
    Array.from({ length: count }, (_, c) =>
      separationM({
        latitudeDeg: south + step * (count - 1 - r),
        longitudeDeg: west + step * c,
        heightM: 0,
      }).toFixed(9),
    ).join(' '),
  );
  return `ncols ${count}\nnrows ${count}\nxllcenter ${west}\nyllcenter ${south}\ncellsize ${step}\nNODATA_value -9999\n${rows.join('\n')}\n`;
}

const PLANE = ['easting', 'northing', 'height'];

const plane = (definition: string, keys: Writing['keys'] = { coordinates: definition }): Writing => {
  const { forward } = projection(definition);
  return {
    columns: PLANE,
    cells: (place) => {
      const { eastingM, northingM } = forward(place);
      return [eastingM, northingM, place.heightM].map((value) => value.toFixed(7));
    },
    keys,
  };
};

const ANGLES = ['latitude', 'longitude', 'height'];

const degrees: Writing = {
  columns: ANGLES,
  cells: ({ latitudeDeg, longitudeDeg, heightM }) =>
    [latitudeDeg, longitudeDeg, heightM].map((value) => value.toFixed(12)),
  keys: { coordinates: 'geographic' },
};

const dms = (value: number, letters: string): string => {
  // In whole billionths of a second, so that no seconds are rounded to 60.
  const billionths = Math.round(Math.abs(value) * 3600e9);
  const seconds = (billionths % 60e9) / 1e9;
  const minutes = Math.floor(billionths / 60e9);
  return `${Math.floor(minutes / 60)} ${minutes % 60} ${seconds.toFixed(9)} ${letters[value < 0 ? 1 : 0]}`;
};

/** The same heights counted from elsewhere. */
const raised = (writing: Writing, by: (place: Geodetic) => number, more: Partial<Writing>): Writing => ({
  ...writing,
  ...more,
  cells: (place) => writing.cells({ ...place, heightM: place.heightM + by(place) }),
  keys: { ...writing.keys, ...more.keys },
});

const orthometric = (geoid: object): Writing['keys'] => ({ heights: { kind: 'orthometric', ...geoid } });

const ABOUT = { aboutEastingM: 544_000, aboutNorthingM: 5_327_000 };
const GROUND = { factor: 1.000443, ...ABOUT, shiftEastingM: -500_000, shiftNorthingM: -5_300_000 };
const SITE = {
  ...ABOUT,
  shiftEastingM: 12.34,
  shiftNorthingM: -5.6,
  rotationArcSeconds: 400,
  scalePpm: 300,
  heightShiftM: -2.5,
  tiltEastMmPerKm: 20,
  tiltNorthMmPerKm: -12,
};
const SEVEN = {
  shiftM: [0.62, -0.41, 0.55],
  rotationArcSeconds: [0.02, -0.03, 0.01],
  scalePpm: 0.3,
  convention: 'position-vector',
} as const;
const FOURTEEN = {
  ...SEVEN,
  rates: { shiftMm: [2, -1, 3], rotationMas: [0.8, 0.5, -0.8], scalePpb: 0.1 },
  referenceYear: 2010,
} as const;

/** Written in another frame: `toOwn` leads from the frame of the study to it. */
const inFrame = (toOwn: (place: Geodetic) => Geodetic, keys: object): Writing => ({
  ...degrees,
  cells: (place) => degrees.cells(toOwn(place)),
  keys: { ...degrees.keys, transformation: keys },
});

const seven = frameTransformation(SEVEN);
const fourteen = frameTransformation(FOURTEEN);
const onEarth =
  (change: (c: ReturnType<typeof geodeticToGeocentric>) => ReturnType<typeof geodeticToGeocentric>) =>
  (place: Geodetic): Geodetic =>
    geocentricToGeodetic(change(geodeticToGeocentric(place)));

const changedPlane = (
  change: (p: { eastingM: number; northingM: number; heightM: number }) => {
    eastingM: number;
    northingM: number;
    heightM: number;
  },
  keys: Writing['keys'],
): Writing => ({
  columns: PLANE,
  cells: (place) => {
    const { eastingM, northingM, heightM } = change({
      ...projection('EPSG:25832').forward(place),
      heightM: place.heightM,
    });
    return [eastingM, northingM, heightM].map((value) => value.toFixed(7));
  },
  keys: { coordinates: 'EPSG:25832', ...keys },
});

const foot = metresPer('us-survey-foot');

/** Ways of writing that say the same of ellipsoidal places. */
export const WRITINGS: Readonly<Record<string, Writing>> = {
  degrees,
  'longitudes from 0 to 360, west of Greenwich too': {
    ...degrees,
    cells: (place) =>
      degrees.cells({ ...place, longitudeDeg: place.longitudeDeg + (place.longitudeDeg < 0 ? 360 : 0) }),
  },
  'degrees, minutes and seconds': {
    columns: ANGLES,
    cells: ({ latitudeDeg, longitudeDeg, heightM }) => [
      dms(latitudeDeg, 'NS'),
      dms(longitudeDeg, 'EW'),
      heightM.toFixed(7),
    ],
    keys: { coordinates: 'geographic' },
    layout: { units: { angle: 'dms' } },
  },
  'heights of the antenna': {
    columns: [...ANGLES, 'antennaHeight'],
    cells: (place) => [...degrees.cells({ ...place, heightM: place.heightM + 1.8 }), '1.8'],
    keys: degrees.keys,
    layout: { heightOf: 'antenna' },
  },
  geocentric: {
    columns: ['x', 'y', 'z'],
    cells: (place) => {
      const { xM, yM, zM } = geodeticToGeocentric(place);
      return [xM, yM, zM].map((value) => value.toFixed(7));
    },
    keys: { coordinates: 'geocentric' },
  },
  'a code': plane('EPSG:25832'),
  'a code with a geographic neighbour': { ...degrees, keys: { coordinates: 'EPSG:4258' } },
  'another zone': plane('EPSG:25833'),
  'a proj string': plane('+proj=tmerc +lat_0=48 +lon_0=9.5 +k=1 +x_0=1000 +y_0=2000 +ellps=GRS80'),
  'US survey feet, heights in metres': {
    columns: PLANE,
    cells: (place) => {
      const { eastingM, northingM } = projection('EPSG:25832').forward(place);
      return [(eastingM / foot).toFixed(7), (northingM / foot).toFixed(7), place.heightM.toFixed(7)];
    },
    keys: { coordinates: 'EPSG:25832' },
    layout: { units: { length: 'us-survey-foot', height: 'metre' } },
  },
  'the ground': changedPlane((p) => ({ ...p, ...groundGrid(GROUND).forward(p) }), { groundGrid: GROUND }),
  'the plane of a job': changedPlane((p) => sitePlane(SITE).forward(p), { sitePlane: SITE }),
  'the plane of a job on the ground': changedPlane(
    (p) =>
      sitePlane(SITE).forward({
        ...p,
        ...groundGrid({ ...GROUND, shiftEastingM: 0, shiftNorthingM: 0 }).forward(p),
      }),
    { sitePlane: SITE, groundGrid: { ...GROUND, shiftEastingM: 0, shiftNorthingM: 0 } },
  ),
  'another frame by 7 parameters': inFrame(
    onEarth((c) => seven.inverse(c)),
    SEVEN,
  ),
  'another frame, its parameters backwards': inFrame(
    onEarth((c) => seven.forward(c)),
    { ...SEVEN, backwards: true },
  ),
  'another frame by 14 parameters at an epoch': inFrame(
    onEarth((c) => fourteen.inverse(c, 2024.5)),
    { ...FOURTEEN, epoch: 2024.5 },
  ),
  'heights above the geoid of a grid': raised(degrees, (p) => -separationM(p), {
    keys: orthometric({ geoid: 'grid', file: 'geoid.asc' }),
  }),
  'heights above the geoid, with a column of separations': {
    ...degrees,
    columns: [...ANGLES, 'geoidSeparation'],
    cells: (p) => [
      ...degrees.cells({ ...p, heightM: p.heightM - separationM(p) }),
      separationM(p).toFixed(9),
    ],
    keys: { ...degrees.keys, ...orthometric({ geoid: 'column' }) },
  },
  'heights under a constant separation': raised(degrees, () => -CONSTANT_M, {
    keys: orthometric({ geoid: 'constant', separationM: CONSTANT_M }),
  }),
};
