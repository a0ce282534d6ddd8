import type { EstimateWithLimits } from '../fit/index.js';
import type { Results } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

/** What fits rest on, forms, terms, crews and the sky compared, as tables. */
export function evidenceTables(results: Results): ReportTable[] {
  return [
    {
      name: 'forms-compared',
      header: ['component', 'against', 'gain', 'se', 'days', 'verdict'],
      rows: results.comparison.map((one) => [
        one.component,
        one.against,
        one.gain,
        one.se,
        one.days,
        one.verdict,
      ]),
    },
    specSheetTable(results),
    {
      name: 'information-shares',
      header: ['component', 'by', 'group', 'share', 'occupations', 'groups'],
      rows: results.evidence.flatMap(({ component, shares }) =>
        shares.flatMap(({ by, largest, groups }) =>
          largest.map((one): Cell[] => [component, by, one.group, one.share, one.occupations, groups]),
        ),
      ),
    },
    termTable(results),
    groupTable(results),
    dayModelTable(results),
    ...skyTables(results),
  ];
}

const three = ({ estimate, low, high }: EstimateWithLimits): Cell[] => [estimate, low, high];

const specSheetTable = ({ specSheetTest }: Results): ReportTable => ({
  name: 'spec-sheet',
  header: ['component', 'baselineKm', 'ownOverSheet', 'low', 'high', 'verdict', 'verdictOverall'],
  rows: specSheetTest.flatMap(({ component, ratios, verdict }) =>
    ratios.map((one): Cell[] => [
      component,
      one.baselineKm,
      one.ratio,
      one.low,
      one.high,
      one.verdict,
      verdict,
    ]),
  ),
});

const termTable = ({ terms }: Results): ReportTable => ({
  name: 'terms',
  header: ['component', 'part', 'unit', 'estimate', 'low', 'high', 'gain', 'se', 'verdict'],
  rows: terms.flatMap(({ component, constantMm, ownConstantMm, ppm, terms: further }): Cell[][] => [
    [component, 'constant', 'mm', ...three(constantMm), null, null, null],
    [component, 'constant without centring and marks', 'mm', ...three(ownConstantMm), null, null, null],
    [component, 'ppm', 'ppm', ...three(ppm), null, null, null],
    ...further.map((one): Cell[] => [
      component,
      one.term,
      one.unit,
      ...three(one),
      one.gain,
      one.se,
      one.verdict,
    ]),
  ]),
});

const groupTable = ({ groups }: Results): ReportTable => ({
  name: 'groups',
  header: [
    'by',
    'component',
    'reference',
    'group',
    'constantMm',
    'constantLowMm',
    'constantHighMm',
    'ppm',
    'ppmLow',
    'ppmHigh',
    'occupations',
    'days',
    'tested',
    'reason',
    'pValue',
    'verdict',
  ],
  rows: groups.flatMap(({ by, component, reference, groups: each, pValue, verdict }) =>
    each.map((one): Cell[] => [
      by,
      component,
      reference,
      one.group,
      ...three(one.constantMm),
      ...three(one.ppm),
      one.occupations,
      one.days,
      one.tested,
      one.reason,
      pValue,
      verdict,
    ]),
  ),
});

const dayModelTable = ({ dayModels }: Results): ReportTable => ({
  name: 'day-models',
  header: [
    'component',
    'medianDayPpm',
    'medianDayPpmLow',
    'medianDayPpmHigh',
    'longRunPpm',
    'longRunPpmLow',
    'longRunPpmHigh',
    'spread',
    'spreadLow',
    'spreadHigh',
    'effectiveShare',
    'lagOneCorrelation',
    'clusteredBy',
  ],
  rows: dayModels.map((one) => [
    one.component,
    ...three(one.medianDayPpm),
    ...three(one.longRunPpm),
    ...three(one.spread),
    one.effectiveShare,
    one.lagOneCorrelation,
    one.clusteredBy,
  ]),
});

/** Days of the sky, what went with them, and thresholds of Kp; without rows where no file tells of the sky. */
function skyTables({ sky }: Results): ReportTable[] {
  const days = sky?.days ?? [];
  const keys = Object.keys(days[0] ?? { day: '' }) as (keyof (typeof days)[number])[];
  return [
    { name: 'sky-days', header: keys, rows: days.map((day) => keys.map((key) => day[key] as Cell)) },
    {
      name: 'sky-associations',
      header: ['outcome', 'measure', 'days', 'spearman', 'low', 'high', 'pValue', 'adjustedPValue'],
      rows: (sky?.associations ?? []).map((one) => [
        one.outcome,
        one.measure,
        one.days,
        one.spearman,
        one.low,
        one.high,
        one.pValue,
        one.adjustedPValue,
      ]),
    },
    {
      name: 'kp-thresholds',
      header: [
        'component',
        'kpFrom',
        'flaggedDays',
        'caught',
        'degradedDays',
        'falseAlarms',
        'otherDays',
        'youden',
      ],
      rows: (sky?.thresholds ?? []).flatMap(({ component, thresholds }) =>
        thresholds.map((one): Cell[] => [
          component,
          one.kpFrom,
          one.flaggedDays,
          one.caught.count,
          one.caught.of,
          one.falseAlarms.count,
          one.falseAlarms.of,
          one.youden,
        ]),
      ),
    },
  ];
}
