import type { WatchFound } from './monthHtml.js';
import type { Cell, ReportTable } from './tables.js';

/** The tables of the page of a month. */
export function monthTables({ watches, month }: WatchFound): ReportTable[] {
  const { crews, rowsSetAside, occupationsSetAside, markShifts, nextMarks } = month;
  return [
    {
      name: 'new-days',
      header: [
        'component',
        'day',
        'occupations',
        'ppmRatio',
        'ppmSum',
        'constantRatio',
        'constantSum',
        'outside',
      ],
      rows: watches.flatMap(({ component, days }) =>
        days.map((one): Cell[] => [
          component,
          one.day,
          one.occupations,
          one.ppm?.ratio ?? null,
          one.ppmSum,
          one.constant?.ratio ?? null,
          one.constantSum,
          one.outside,
        ]),
      ),
    },
    {
      name: 'new-shots-by-crew',
      header: ['crew', 'days', 'visits', 'visitsWithoutFix', 'occupations'],
      rows: crews.map((one) => [one.crew, one.days, one.visits, one.visitsWithoutFix, one.occupations]),
    },
    {
      name: 'new-rows-set-aside',
      header: ['file', 'reason', 'count'],
      rows: rowsSetAside.map(({ file, reason, count }) => [file, reason, count]),
    },
    {
      name: 'new-occupations-set-aside',
      header: ['day', 'mark', 'crew', 'reason', 'detail', 'file', 'row'],
      rows: occupationsSetAside.map((one) => [
        one.day,
        one.mark,
        one.crew,
        one.reason,
        one.detail,
        one.file,
        one.row,
      ]),
    },
    {
      name: 'mark-shifts',
      header: [
        'component',
        'mark',
        'base',
        'baselineKm',
        'newDays',
        'eastMm',
        'northMm',
        'upMm',
        'seMm',
        'pValue',
        'verdict',
      ],
      rows: markShifts.map(({ component, mark, base, baselineKm, days, shiftMm, seMm, pValue, verdict }) => [
        component,
        mark,
        base,
        baselineKm,
        days,
        ...(component === 'horizontal' ? [shiftMm[0]!, shiftMm[1]!, null] : [null, null, shiftMm[0]!]),
        seMm,
        pValue,
        verdict,
      ]),
    },
    {
      name: 'next-marks',
      header: ['mark', 'baselineKm', 'days', 'reason', 'informationGain'],
      rows: nextMarks.map(({ mark, baselineKm, days, reason, informationGain }) => [
        mark,
        baselineKm,
        days,
        reason,
        informationGain,
      ]),
    },
  ];
}
