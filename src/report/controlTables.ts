import { isTold } from '../errors/index.js';
import type { Results } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

/** What all positions have in common, its likely causes, suspected blunders, and the coordinates of the marks. */
export function controlTables({ commonCauses, blunders, controlMarks, heights }: Results): ReportTable[] {
  return [
    {
      name: 'common',
      header: [
        'base',
        'marks',
        'days',
        'parameter',
        'unit',
        'estimate',
        'standardError',
        'degreesOfFreedom',
        'toldFromNothing',
        'heights',
      ],
      rows: commonCauses.bases.flatMap(({ base, marks, days, parameters }) =>
        parameters.map((p): Cell[] => [
          base,
          marks,
          days,
          p.name,
          p.unit,
          p.estimate,
          p.standardError,
          p.degreesOfFreedom,
          p.standardError === null ? null : isTold(p),
          heights,
        ]),
      ),
    },
    {
      name: 'causes',
      header: ['code', 'text', 'remedy'],
      rows: commonCauses.causes.map(({ code, text, remedy }) => [code, text, remedy]),
    },
    {
      name: 'blunders',
      header: ['day', 'mark', 'crew', 'rover', 'cause', 'file', 'row'],
      rows: blunders.map((b) => [b.day, b.mark, b.crew, b.rover, b.cause, b.file, b.row]),
    },
    {
      name: 'control-marks',
      header: [
        'mark',
        'from',
        'to',
        'source',
        'frame',
        'epoch',
        'horizontalSigmaMm',
        'verticalSigmaMm',
        'sky',
        'siteMark',
        'combinedFactor',
        'heights',
      ],
      rows: controlMarks.map((m) => [
        m.mark,
        m.from,
        m.to,
        m.source,
        m.frame,
        m.epoch,
        m.horizontalSigmaMm,
        m.verticalSigmaMm,
        m.sky,
        m.siteMark,
        // As text: cells of numbers are cut at six decimals, which are 1 ppm.
        m.combinedFactor === null ? null : m.combinedFactor.toFixed(9),
        heights,
      ]),
    },
  ];
}
