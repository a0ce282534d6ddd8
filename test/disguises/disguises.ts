/** One way in which the study of test/fixtures/disguises is written, and how finely. */
export interface Disguise {
  readonly name: string;
  /** Entry of the logs of a study file. */
  readonly log: string;
  /** Further keys of the study file, after `marks: {file: marks.csv` and on the top level. */
  readonly names?: string;
  readonly rows: Readonly<{ read: number; used: number; setAside: Readonly<Record<string, number>> }>;
  /** Steps in which plan coordinates and heights are written, mm on the ground. */
  readonly planStepMm: number;
  readonly heightStepMm: number;
  /** Directions that a step may have: along the axes of the error, turned in plan, or anyhow. */
  readonly steps: 'along axes' | 'turned in plan' | 'anyhow';
  /** Rows are means already. */
  readonly averaged?: boolean;
  /** The rows say no time of day. */
  readonly dated?: boolean;
}

/** A degree of latitude at 44° or of longitude at the equator has no more than this, mm. */
const DEGREE_MM = 111.32e6;
/** 1200/3937 m. */
const US_FOOT_MM = 304.8006;

const EPOCHS = { read: 59, used: 54, setAside: { 'not-fixed': 5 } };

export const DISGUISES: readonly Disguise[] = [
  {
    name: '(a) geographic UTC with role headers',
    log: '{files: a.csv, layout: {kind: delimited}}',
    rows: EPOCHS,
    planStepMm: 1e-9 * DEGREE_MM,
    heightStepMm: 0.1,
    steps: 'along axes',
  },
  {
    name: '(b) semicolons, decimal commas and local time',
    log: `{files: b.txt, layout: {kind: delimited, delimiter: semicolon, decimal: comma, encoding: latin1,
      columns: {time: Date and time, description: Bemerkung},
      time: {format: dd.MM.yyyy HH:mm:ss, zone: Atlantic/Azores}}}`,
    rows: EPOCHS,
    planStepMm: 1e-9 * DEGREE_MM,
    heightStepMm: 0.1,
    steps: 'along axes',
  },
  {
    name: '(c) UTM in US survey feet, antenna heights',
    log: `{files: c.csv, coordinates: +proj=utm +zone=26 +ellps=WGS84, layout: {kind: delimited, units: us-survey-foot,
      heightOf: antenna, columns: {mark: Point, height: Ell Ht (ft), antennaHeight: Rod (ft), timeOfDay: Clock (UTC)},
      time: {format: MM/dd/yyyy HH:mm:ss, zone: UTC}}}`,
    rows: EPOCHS,
    planStepMm: 1e-4 * US_FOOT_MM,
    heightStepMm: 1e-4 * US_FOOT_MM,
    steps: 'turned in plan',
  },
  {
    name: '(d) geocentric with GPS week and seconds',
    log: '{files: d.tsv, coordinates: geocentric, layout: {kind: delimited, delimiter: tab}}',
    rows: EPOCHS,
    planStepMm: 0.1,
    heightStepMm: 0.1,
    steps: 'anyhow',
  },
  {
    name: '(e) comments and runs of blanks',
    log: `{files: e.txt, layout: {kind: delimited, delimiter: blanks, comment: "#", header: false,
      columns: {time: 1, mark: 2, latitude: 3, longitude: 4, height: 5, fix: 6}}}`,
    rows: EPOCHS,
    planStepMm: 1e-8 * DEGREE_MM,
    heightStepMm: 1,
    steps: 'along axes',
  },
  {
    name: '(f) NMEA 0183, marks by a list of stays',
    log: '{files: f.nmea, layout: {kind: nmea}, markTimes: stays.csv}',
    rows: EPOCHS,
    planStepMm: (1e-8 * DEGREE_MM) / 60,
    // Height and geoid separation are rounded apart, but the separation is exact here.
    heightStepMm: 0.1,
    steps: 'along axes',
  },
  {
    name: '(f) NMEA 0183, marks by nearness',
    log: '{files: f.nmea, layout: {kind: nmea}, nearestMarkM: 3}',
    rows: EPOCHS,
    planStepMm: (1e-8 * DEGREE_MM) / 60,
    heightStepMm: 0.1,
    steps: 'along axes',
  },
  {
    name: '(g) degrees, minutes and seconds with a 12-hour clock',
    log: `{files: g.csv, layout: {kind: delimited, units: {angle: dms}, columns: {time: Date and time, mark: Name},
      time: {format: MM/dd/yyyy hh:mm:ss a, zone: Atlantic/Azores}}}`,
    rows: EPOCHS,
    planStepMm: (1e-5 * DEGREE_MM) / 3600,
    heightStepMm: 0.1,
    steps: 'along axes',
  },
  {
    name: '(h) one averaged row a shot',
    log: '{files: h.csv, layout: {kind: delimited}}',
    rows: { read: 15, used: 14, setAside: { 'not-fixed': 1 } },
    planStepMm: 1e-10 * DEGREE_MM,
    heightStepMm: 0.1,
    steps: 'along axes',
    averaged: true,
  },
  {
    name: '(i) point lists without header, times and base',
    log: `{files: points_*.txt, coordinates: +proj=utm +zone=26 +ellps=WGS84, layout: {kind: delimited, header: false,
      columns: {pointNumber: 1, northing: 2, easting: 3, height: 4, description: 5}, constants: {base: B1},
      fromFileName: 'points_(?<date>\\d{4}-\\d{2}-\\d{2})'}}`,
    names: "names: {pattern: '^(?:CHK )?(CP\\d+)(?:-\\d+)?$'}",
    rows: { read: 28, used: 14, setAside: { 'unknown-mark': 14 } },
    planStepMm: 1,
    heightStepMm: 1,
    steps: 'turned in plan',
    averaged: true,
    dated: true,
  },
];

/** The study file of a disguise, to be laid beside the files of test/fixtures/disguises. */
export const studyText = ({ log, names }: Disguise): string => `timeZone: Atlantic/Azores
marks: {file: marks.csv${names === undefined ? '' : `, ${names}`}}
bases: bases.csv
logs:
  - ${log}
`;

/**
 * How far an error may be from what was put in, mm: half a step of the written coordinates along an axis; in plan
 * √2 times that where the axes of the coordinates are turned against east and north, and √3 times where all three are.
 * The scale of UTM here (1.00002) and the projection of the sum of rounded rows do not count.
 */
export function toleranceMm({ planStepMm, heightStepMm, steps }: Disguise): { plan: number; height: number } {
  const turned = { 'along axes': 1, 'turned in plan': Math.SQRT2, anyhow: Math.sqrt(3) }[steps];
  const height = steps === 'anyhow' ? Math.sqrt(3) : 1;
  return {
    plan: (planStepMm / 2) * turned + COMPUTING_MM,
    height: (heightStepMm / 2) * height + COMPUTING_MM,
  };
}

/** Rounding of the computing itself: coordinates of seven digits before the point in doubles, 1e-9 m, and the levelled
 * height of a point a decimetre from its mark. */
const COMPUTING_MM = 0.001;
