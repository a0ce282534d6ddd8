import type { ControlMark, Results } from '../study/index.js';
import { NOT_GIVEN } from './format.js';
import { type Html, html } from './html.js';
import { type Column, table } from './table.js';

/** Where the coordinates of the marks come from; columns of which nothing is stated are left out. */
export function controlTable({ controlMarks, heights }: Results): Html {
  const stated = (key: keyof ControlMark): boolean => controlMarks.some((mark) => mark[key] !== null);
  const columns: Column<ControlMark>[] = [
    { head: 'Mark', cell: ({ mark, siteMark }) => (siteMark ? `${mark} (site mark)` : mark), text: true },
  ];
  const add = (shown: boolean, column: Column<ControlMark>): void => {
    if (shown) columns.push(column);
  };
  add(stated('from') || stated('to'), { head: 'Holds', cell: holds, text: true });
  add(stated('source'), { head: 'Source', cell: ({ source }) => source ?? NOT_GIVEN, text: true });
  add(stated('frame'), { head: 'Frame', cell: ({ frame }) => frame ?? NOT_GIVEN, text: true });
  add(stated('epoch'), { head: 'Epoch', cell: ({ epoch }) => (epoch === null ? NOT_GIVEN : String(epoch)) });
  add(stated('horizontalSigmaMm'), {
    head: 'Plan, mm per axis',
    cell: ({ horizontalSigmaMm: value }) => (value === null ? NOT_GIVEN : value.toFixed(1)),
  });
  add(stated('verticalSigmaMm'), {
    head: 'Height, mm',
    cell: ({ verticalSigmaMm: value }) => (value === null ? NOT_GIVEN : value.toFixed(1)),
  });
  add(stated('sky'), { head: 'Sky', cell: ({ sky }) => sky ?? NOT_GIVEN, text: true });
  add(stated('combinedFactor'), {
    head: 'Combined factor',
    cell: ({ combinedFactor: factor }) => (factor === null ? NOT_GIVEN : factor.toFixed(7)),
  });
  add(stated('combinedFactor'), {
    head: 'Grid − ground, ppm',
    cell: ({ combinedFactor: factor }) =>
      factor === null ? NOT_GIVEN : ((factor - 1) * 1e6).toFixed(1).replace('-', '−'),
  });
  if (columns.length === 1 && !controlMarks.some(({ siteMark }) => siteMark)) return html``;
  return html`${table(`Coordinates of the marks; heights are ${heights}`, controlMarks, columns)}
${notes(stated, heights)}`;
}

const holds = ({ from, to }: ControlMark): string =>
  [from && `from ${from}`, to && `to ${to}`].filter(Boolean).join(' ') || 'always';

function notes(stated: (key: keyof ControlMark) => boolean, heights: Results['heights']): Html | null {
  const texts = [
    ...(stated('horizontalSigmaMm') || stated('verticalSigmaMm')
      ? ['Precisions are one standard deviation, whatever level the marks file states.']
      : []),
    ...(stated('combinedFactor')
      ? [
          `The combined factor is point scale × height factor: a distance on the ground times it is one on the grid.${heights === 'orthometric' ? ' It is formed with orthometric heights; each metre of geoid above the ellipsoid lowers it by 0.16 ppm.' : ''}`,
        ]
      : []),
  ];
  return texts.length === 0 ? null : html`<p class="small">${texts.join(' ')}</p>\n`;
}
