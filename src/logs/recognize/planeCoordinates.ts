import { metresPer } from '../../geodesy/index.js';
import type { Column } from './columns.js';
import type { Draft } from './draft.js';
import { askFoot, askUnit, type KnownUnit, setUnits, statedUnit, tellMetres } from './lengthUnits.js';
import { fitsProjection, isPlane } from './planeFit.js';
import type { RecognizeOptions } from './recognition.js';

/** Two columns of plane coordinates; which is the easting may not be known. */
export interface PlanePair {
  readonly columns: readonly [Column, Column];
  readonly order: 'easting-northing' | 'northing-easting' | 'unknown';
}

interface Reading {
  readonly easting: Column;
  readonly northing: Column;
  readonly unit: 'metre' | 'foot';
}

/** Settles order, unit and projection of plane coordinates, or asks for them. */
export function settlePlane(draft: Draft, pair: PlanePair, options: RecognizeOptions): void {
  const [a, b] = pair.columns;
  const stated = statedUnit([a, b]);
  const readings = possibleReadings(pair, stated);
  const system = isPlane(options.coordinates) ? options.coordinates : null;
  draft.coordinates = system;
  if (system === null) askProjection(draft, pair);
  const fitting =
    system === null
      ? readings
      : readings.filter(({ easting, northing, unit }) =>
          fitsProjection(
            system,
            easting.numbers ?? [],
            northing.numbers ?? [],
            unit === 'metre' ? 1 : metresPer('international-foot'),
          ),
        );
  // Where nothing fits, the projection is another one: the file's own words remain.
  const left = fitting.length > 0 ? fitting : readings;
  settleOrder(draft, pair, left);
  settleUnit(draft, pair, stated, left, system !== null && fitting.length > 0);
}

function possibleReadings({ columns: [a, b], order }: PlanePair, stated: KnownUnit): readonly Reading[] {
  const units =
    stated === null ? (['metre', 'foot'] as const) : ([stated === 'metre' ? 'metre' : 'foot'] as const);
  const orders = [
    { easting: a, northing: b, known: order === 'easting-northing' },
    { easting: b, northing: a, known: order === 'northing-easting' },
  ].filter(({ known }) => known || order === 'unknown');
  return units.flatMap((unit) => orders.map(({ easting, northing }) => ({ easting, northing, unit })));
}

function settleOrder(draft: Draft, { columns: [a, b] }: PlanePair, left: readonly Reading[]): void {
  const [easting, other] = new Set(left.map((reading) => reading.easting));
  if (easting !== undefined && other === undefined) {
    draft.assign('easting', easting);
    draft.assign('northing', easting === a ? b : a);
    return;
  }
  draft.doubt(
    {
      code: 'northing-easting-order',
      question: `Which of ${a.label} and ${b.label} is the northing?`,
      because: `The first row has ${a.texts[0]} and ${b.texts[0]}: nothing in the file tells the order.`,
      key: 'layout.columns',
      choices: [columnsChoice(b, a), columnsChoice(a, b)],
      decisive: true,
    },
    [a, b],
  );
}

const columnsChoice = (easting: Column, northing: Column): string =>
  `{easting: ${easting.reference}, northing: ${northing.reference}}`;

function settleUnit(
  draft: Draft,
  { columns: [a, b] }: PlanePair,
  stated: KnownUnit,
  left: readonly Reading[],
  fitted: boolean,
): void {
  if (stated === 'foot') {
    askFoot(draft, 'length', `The names of ${a.label} and ${b.label} say feet, not which.`);
    return;
  }
  if (stated !== null) {
    if (stated !== 'metre') setUnits(draft, { length: stated });
    return;
  }
  const mayBe = (unit: Reading['unit']): boolean => left.some((reading) => reading.unit === unit);
  const example = `${a.texts[0]} and ${b.texts[0]}`;
  if (fitted && !mayBe('metre')) {
    askFoot(draft, 'length', 'The projection has a place for the coordinates only if they are feet.');
  } else if (!fitted && !lookLikeMetres(a, b)) {
    askUnit(draft, `The first row has ${example}, which may be metres as well as feet.`);
  } else if (!fitted) {
    tellMetres(draft, `No column states a unit; ${example} are of the size usual in metres.`);
  } else if (mayBe('foot')) {
    tellMetres(draft, `No column states a unit; ${example} lie on the projection as metres and as feet.`);
  }
}

/** Eastings of hundreds and northings of thousands of kilometres: the size of coordinates in zones of six degrees. */
function lookLikeMetres(a: Column, b: Column): boolean {
  const [small, large] = a.median < b.median ? [a, b] : [b, a];
  return small.least >= 1e5 && small.greatest <= 9e5 && large.least >= 3.5e6 && large.greatest <= 1e7;
}

function askProjection(draft: Draft, { columns: [a, b] }: PlanePair): void {
  draft.doubt({
    code: 'projection',
    question: 'Which projection are the plane coordinates of?',
    because: `The first row has ${a.texts[0] ?? 'no value'} in ${a.label} and ${b.texts[0] ?? 'no value'} in ${b.label}: these are no degrees, and no projection is stated.`,
    key: 'coordinates',
    choices: [],
    decisive: true,
  });
}
