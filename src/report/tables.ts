import type { OccupationError } from '../errors/index.js';
import type { StudyRun } from '../study/index.js';
import { controlTables } from './controlTables.js';
import { evidenceTables } from './evidenceTables.js';
import { findingTables } from './findingTables.js';
import { withHeightsColumn } from './heightsColumn.js';
import { outcomeTables } from './outcomeTables.js';
import { splitTable } from './splitTable.js';

export type Cell = string | number | boolean | null;

/** A table to be written as CSV: file name without ending, header with units in the names, rows. */
export interface ReportTable {
  readonly name: string;
  readonly header: readonly string[];
  readonly rows: readonly (readonly Cell[])[];
}

const digits = (value: number, places: number): Cell =>
  Number.isFinite(value) ? Number(value.toFixed(places)) : null;
/** Blank for a shot that has a date and no time of day. */
const iso = (ms: number): Cell => (Number.isNaN(ms) ? null : new Date(ms).toISOString());

const ERROR_COLUMNS: readonly [head: string, cell: (error: OccupationError) => Cell][] = [
  ['day', (e) => e.day],
  ['start', (e) => iso(e.startMs)],
  ['solarHour', (e) => digits(e.solarHour, 3)],
  ['mark', (e) => e.mark],
  ['base', (e) => e.base],
  ['setup', (e) => e.setup],
  ['rover', (e) => e.rover],
  ['crew', (e) => e.crew],
  ['epochs', (e) => e.epochs],
  ['baselineKm', (e) => digits(e.baselineKm, 6)],
  ['azimuthDeg', (e) => digits(e.azimuthDeg, 4)],
  ['heightDifferenceM', (e) => digits(e.heightDifferenceM, 3)],
  ['eastMm', (e) => digits(e.east, 2)],
  ['northMm', (e) => digits(e.north, 2)],
  ['upMm', (e) => digits(e.up, 2)],
  ['alongMm', (e) => digits(e.along, 2)],
  ['acrossMm', (e) => digits(e.across, 2)],
  ['scatterEastMm', (e) => digits(e.scatterEastMm, 2)],
  ['scatterNorthMm', (e) => digits(e.scatterNorthMm, 2)],
  ['scatterUpMm', (e) => digits(e.scatterUpMm, 2)],
  ['satellites', (e) => digits(e.satellites, 1)],
  ['pdop', (e) => digits(e.pdop, 2)],
  ['ageSeconds', (e) => digits(e.ageSeconds, 2)],
  ['file', (e) => e.file],
  ['row', (e) => e.row],
];

/** Every table of a run. */
export function reportTables(run: StudyRun): ReportTable[] {
  const { errors, weights, setAside, visits, results } = run;
  const { fits, rules, marks, lengthClasses, messages } = results;
  const errorHeads = ERROR_COLUMNS.map(([head]) => head);
  const errorCells = (error: OccupationError): Cell[] => ERROR_COLUMNS.map(([, cell]) => cell(error));
  const tables: ReportTable[] = [
    {
      name: 'errors',
      header: [...errorHeads, 'weight'],
      // Suspected wrong fixes stand among the occupations that are set aside.
      rows: errors.flatMap((error, i) =>
        weights[i]! < 0.5 ? [] : [[...errorCells(error), digits(weights[i]!, 4)]],
      ),
    },
    {
      name: 'set-aside-occupations',
      header: ['reason', 'detail', ...errorHeads],
      rows: setAside.map(({ reason, detail, error }) => [reason, detail, ...errorCells(error)]),
    },
    {
      name: 'visits-without-fix',
      header: ['day', 'start', 'end', 'mark', 'base', 'setup', 'rover', 'crew', 'rows'],
      rows: visits
        .filter(({ fixedRows }) => fixedRows === 0)
        .map((v) => [v.day, iso(v.startMs), iso(v.endMs), v.mark, v.base, v.setup, v.rover, v.crew, v.rows]),
    },
    {
      name: 'fits',
      header: [
        'component',
        'reference',
        'composed',
        'form',
        'screened',
        'basisOfRule',
        'basis',
        'confidence',
        'constantMm',
        'constantLowMm',
        'constantHighMm',
        'ppm',
        'ppmLow',
        'ppmHigh',
        'interval',
        'occupations',
        'days',
        'informationNumber',
      ],
      rows: fits.map((f) => [
        f.component,
        f.reference,
        f.composed,
        f.form,
        f.screened,
        f.basisOfRule,
        f.basis,
        f.confidence,
        f.constantMm.estimate,
        f.constantMm.low,
        f.constantMm.high,
        f.ppm.estimate,
        f.ppm.low,
        f.ppm.high,
        f.interval,
        f.occupations,
        f.days,
        f.informationNumber,
      ]),
    },
    {
      name: 'rules',
      header: [
        'component',
        'limitMm',
        'share',
        'dayShare',
        'confidence',
        'method',
        'maximumBaselineKm',
        'bestEstimateKm',
        'longestSupportedKm',
        'reason',
      ],
      rows: rules.map((r) => [
        r.component,
        r.limitMm,
        r.share,
        r.dayShare,
        r.confidence,
        r.method,
        r.maximumBaselineKm,
        r.bestEstimateKm,
        r.longestSupportedKm,
        r.reason,
      ]),
    },
    {
      name: 'marks',
      header: [
        'mark',
        'base',
        'baselineKm',
        'azimuthDeg',
        'occupations',
        'days',
        'eastMm',
        'northMm',
        'upMm',
        'seEastMm',
        'seNorthMm',
        'seUpMm',
      ],
      rows: marks.map((m) => [
        m.mark,
        m.base,
        m.baselineKm,
        m.azimuthDeg,
        m.occupations,
        m.days,
        m.east,
        m.north,
        m.up,
        m.se.east,
        m.se.north,
        m.se.up,
      ]),
    },
    {
      name: 'length-classes',
      header: [
        'fromKm',
        'toKm',
        'baselineKm',
        'occupations',
        'days',
        'visitsWithoutFix',
        'radialRmsMm',
        'radialRmsLowMm',
        'radialRmsHighMm',
        'verticalRmsMm',
        'verticalRmsLowMm',
        'verticalRmsHighMm',
        'tooFew',
      ],
      rows: lengthClasses.map((c) => [
        c.fromKm,
        c.toKm,
        c.baselineKm,
        c.occupations,
        c.days,
        c.visitsWithoutFix,
        c.horizontalRmsMm?.estimate ?? null,
        c.horizontalRmsMm?.low ?? null,
        c.horizontalRmsMm?.high ?? null,
        c.verticalRmsMm?.estimate ?? null,
        c.verticalRmsMm?.low ?? null,
        c.verticalRmsMm?.high ?? null,
        c.tooFew,
      ]),
    },
    ...controlTables(results),
    ...evidenceTables(results),
    ...findingTables(results),
    splitTable(run),
    {
      name: 'messages',
      header: ['severity', 'code', 'file', 'row', 'column', 'text'],
      rows: messages.map((m) => [m.severity, m.code, m.file, m.row, m.column, m.text]),
    },
    ...outcomeTables(results),
  ];
  return tables.map((table) => withHeightsColumn(table, results.heights));
}
