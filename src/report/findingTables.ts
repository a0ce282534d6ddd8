import type { EstimateWithLimits } from '../fit/index.js';
import type { AdjustmentWeight, ConstantAndPpm, Results } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

/** What follows from the fits, as tables: rules for many limits, how they move and held, weights, days, hours, setups. */
export function findingTables(results: Results): ReportTable[] {
  return [
    records('rule-table', results.ruleTable),
    records('rule-moves', results.ruleMoves),
    records('rules-by-hour', results.rulesByHour),
    records('rules-by-month', results.rulesBySeason),
    backTestTable(results),
    failureTable(results),
    weightsTable(results.adjustmentWeights),
    checkShotTable(results),
    records('daily-factors', results.dailyFactors),
    records('degraded-days', results.degradedDays),
    hoursTable(results),
    {
      name: 'setups',
      header: [
        'setup',
        'visits',
        'eastMm',
        'northMm',
        'upMm',
        'seEastMm',
        'seNorthMm',
        'seUpMm',
        'separable',
        'reason',
      ],
      rows: results.setups.map((s) => [
        s.setup,
        s.visits,
        s.east,
        s.north,
        s.up,
        s.se.east,
        s.se.north,
        s.se.up,
        s.separable,
        s.reason,
      ]),
    },
    records('wrong-fixes', results.wrongFixes),
  ];
}

/** Objects with plain values as rows; their keys are the header. */
function records<T extends object>(name: string, list: readonly T[]): ReportTable {
  const header = Object.keys(list[0] ?? {});
  return { name, header, rows: list.map((one) => header.map((key) => one[key as keyof T] as Cell)) };
}

const backTestTable = ({ backTest }: Results): ReportTable => ({
  name: 'back-test',
  header: ['component', 'limitOf', 'fromKm', 'toKm', 'occupations', 'days', 'shareInside', 'low', 'high'],
  rows: backTest.flatMap(({ component, lengthClasses, specSheet }) =>
    [
      ...lengthClasses.map((one) => ['own model', one] as const),
      ...(specSheet?.lengthClasses ?? []).map((one) => ['spec sheet', one] as const),
    ].map(([whose, one]): Cell[] => [
      component,
      whose,
      one.fromKm,
      one.toKm,
      one.occupations,
      one.days,
      one.observedShare,
      one.low,
      one.high,
    ]),
  ),
});

const failureTable = ({ backTest }: Results): ReportTable => ({
  name: 'rule-failures',
  header: [
    'component',
    'limitMm',
    'day',
    'mark',
    'base',
    'crew',
    'rover',
    'baselineKm',
    'errorMm',
    'suspectedWrongFix',
  ],
  rows: backTest.flatMap(({ component, rules }) =>
    rules.flatMap(({ limitMm, failures }) =>
      failures.map((shot): Cell[] => [
        component,
        limitMm,
        shot.day,
        shot.mark,
        shot.base,
        shot.crew,
        shot.rover,
        shot.baselineKm,
        shot.errorMm,
        shot.suspected,
      ]),
    ),
  ),
});

function weightsTable(weights: readonly AdjustmentWeight[]): ReportTable {
  const both = (value: ConstantAndPpm | null): Cell[] => [value?.constantMm ?? null, value?.ppm ?? null];
  return {
    name: 'weights',
    header: [
      'component',
      'form',
      'markError',
      'centring',
      'perAxisConstantMm',
      'perAxisPpm',
      'radialRmsConstantMm',
      'radialRmsPpm',
      'share95ConstantMm',
      'share95Ppm',
    ],
    rows: weights.map(({ component, form, markError, centring, perAxis, radialRms, share95 }) => [
      component,
      form,
      markError,
      centring,
      ...both(perAxis),
      ...both(radialRms),
      ...both(share95),
    ]),
  };
}

const checkShotTable = ({ checkShotLimits }: Results): ReportTable => ({
  name: 'check-shot-limits',
  header: ['component', 'baselineKm', 'knownMarkMm', 'otherDayMm', 'twoBasesMm', 'alarmShare'],
  rows: checkShotLimits.flatMap(({ component, limits, alarmShare }) =>
    limits.map((one): Cell[] => [
      component,
      one.baselineKm,
      one.knownMarkMm,
      one.otherDayMm,
      one.twoBasesMm,
      alarmShare,
    ]),
  ),
});

function hoursTable({ timeOfDay }: Results): ReportTable {
  const three = ({ estimate, low, high }: EstimateWithLimits): Cell[] => [estimate, low, high];
  return {
    name: 'hours',
    header: ['component', 'pValue', 'fromHour', 'toHour', 'ppm', 'ppmLow', 'ppmHigh', 'occupations', 'days'],
    rows: timeOfDay.flatMap(({ component, pValue, hours }) =>
      hours.map((hour): Cell[] => [
        component,
        pValue,
        hour.from,
        hour.to,
        ...three(hour.ppm),
        hour.occupations,
        hour.days,
      ]),
    ),
  };
}
