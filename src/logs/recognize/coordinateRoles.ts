import { isDms } from './cellKinds.js';
import type { Column } from './columns.js';
import { earthRadius, findCoordinates, looksLikeHeight } from './contentCoordinates.js';
import type { Draft } from './draft.js';
import { askFoot, setUnits } from './lengthUnits.js';
import { settlePlane } from './planeCoordinates.js';
import { isPlane } from './planeFit.js';
import type { RecognizeOptions } from './recognition.js';

/** Finds the coordinates by names, else by cells, and settles their system, order and units or asks for them. */
export function settleCoordinates(draft: Draft, options: RecognizeOptions): void {
  const { roles } = draft;
  const isGeocentric = settleXyz(draft);
  const plane = draft.has('easting', 'northing');
  const geographic = draft.has('latitude', 'longitude');
  if (plane && (isPlane(options.coordinates) || (!geographic && !isGeocentric))) {
    const columns = [roles.get('easting')!, roles.get('northing')!] as const;
    settlePlane(draft, { columns, order: 'easting-northing' }, options);
  } else if (isGeocentric && (options.coordinates === 'geocentric' || !geographic)) {
    draft.coordinates = 'geocentric';
  } else if (geographic) {
    draft.coordinates = 'geographic';
    settleAngles(draft, [roles.get('latitude')!, roles.get('longitude')!]);
  } else if (!isHalfNamed(draft)) settleByCells(draft, options);
}

/** A set of which one column is named and the other is not: a misspelt name is not replaced by a guess. */
const isHalfNamed = ({ roles, asked }: Draft): boolean =>
  (['latitude', 'longitude', 'easting', 'northing'] as const).some((role) => roles.has(role)) ||
  [...asked].some(({ numbers }) => numbers !== null);

/** True when columns X, Y, Z are geocentric. Plane coordinates go by these names too: then the order is not known. */
function settleXyz(draft: Draft): boolean {
  const { roles } = draft;
  const [x, y, z] = [roles.get('x'), roles.get('y'), roles.get('z')];
  if (x !== undefined && y !== undefined && z !== undefined) {
    const unit = earthRadius(x, y, z);
    if (unit === 'feet')
      askFoot(draft, 'length', `${sentence(x)}, Y and Z give the radius of the earth in feet.`);
    // Without a single value the names are believed.
    if (unit !== null || x.texts.length === 0) return true;
  }
  for (const role of ['x', 'y', 'z'] as const) roles.delete(role);
  if (z !== undefined && !draft.has('height') && ![...draft.asked].includes(z)) draft.assign('height', z);
  return false;
}

const sentence = ({ label }: Column): string => label[0]!.toUpperCase() + label.slice(1);

function settleByCells(draft: Draft, options: RecognizeOptions): void {
  const found = findCoordinates(draft);
  if (found === null) return;
  if (found.kind === 'geocentric') {
    const [x, y, z] = found.columns;
    draft.coordinates = 'geocentric';
    draft.assign('x', x);
    draft.assign('y', y);
    draft.assign('z', z);
    if (found.feet)
      askFoot(draft, 'length', `${sentence(x)} and the two after it give the radius of the earth in feet.`);
    return;
  }
  const [a, b] = found.columns;
  if (found.kind === 'geographic') {
    draft.coordinates = 'geographic';
    settleLatitude(draft, a, b);
    settleAngles(draft, [a, b]);
  } else settlePlane(draft, { columns: [a, b], order: 'unknown' }, options);
  if (draft.has('height')) return;
  const next = draft.free().find(({ index }) => index === b.index + 1);
  if (next !== undefined && looksLikeHeight(next)) draft.assign('height', next);
}

/** Which of two columns of degrees is the latitude: by letters, by size, else the user must say. */
function settleLatitude(draft: Draft, a: Column, b: Column): void {
  const isLongitude = ({ texts, least, greatest }: Column): boolean =>
    texts.some((text) => /[EW]/i.test(text) || degreesOf(text) > 90) || least < -90 || greatest > 90;
  const isLatitude = ({ texts }: Column): boolean => texts.some((text) => /[NS]/i.test(text));
  if (isLongitude(b) || isLatitude(a)) assignPlace(draft, a, b);
  else if (isLongitude(a) || isLatitude(b)) assignPlace(draft, b, a);
  else {
    draft.doubt(
      {
        code: 'latitude-longitude-order',
        question: `Which of ${a.label} and ${b.label} is the latitude?`,
        because: `The first row has ${a.texts[0]} and ${b.texts[0]}: both may be latitudes.`,
        key: 'layout.columns',
        choices: [place(a, b), place(b, a)],
        decisive: true,
      },
      [a, b],
    );
  }
}

const place = (latitude: Column, longitude: Column): string =>
  `{latitude: ${latitude.reference}, longitude: ${longitude.reference}}`;

function assignPlace(draft: Draft, latitude: Column, longitude: Column): void {
  draft.assign('latitude', latitude);
  draft.assign('longitude', longitude);
}

/** Degrees of an angle in degrees, minutes and seconds, without sign; 0 for other texts. */
const degreesOf = (text: string): number => Number(/^\D*(\d{1,3})\D+\d/.exec(text)?.[1] ?? 0);

function settleAngles(draft: Draft, columns: readonly [Column, Column]): void {
  const texts = columns.flatMap((column) => (column.numbers === null ? column.texts : []));
  const angles = texts.filter(isDms).length;
  if (angles > 0 && 2 * angles >= texts.length && columns.every(({ numbers }) => numbers === null)) {
    setUnits(draft, { angle: 'dms' });
  }
}
