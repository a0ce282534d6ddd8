import type { ControlMark } from '../study/index.js';
import { NOT_GIVEN } from './format.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { type Column, table } from './table.js';

/** Where the coordinates of the marks come from; columns of which nothing is stated are left out. */
export function controlTable(page: Page): Html {
  const { controlMarks, heights } = page.results;
  const stated = (key: keyof ControlMark): boolean => controlMarks.some((mark) => mark[key] !== null);
  const columns: Column<ControlMark>[] = [
    {
      head: 'Mark',
      cell: ({ mark, siteMark }) => html`${page.name(mark)}${siteMark ? ' (site mark)' : ''}`,
      text: true,
    },
  ];
  const add = (shown: boolean, column: Column<ControlMark>): void => {
    if (shown) columns.push(column);
  };
  add(stated('from') || stated('to'), { head: 'Holds', cell: holds, text: true });
  add(stated('source'), {
    head: 'Source',
    cell: ({ source }) => (source === null ? NOT_GIVEN : page.name(source)),
    text: true,
  });
  add(stated('frame'), { head: 'Frame', cell: ({ frame }) => frame ?? NOT_GIVEN, text: true });
  add(stated('epoch'), { head: 'Epoch', cell: (mark) => page.number(mark, 'epoch', 'plain') });
  add(stated('horizontalSigmaMm'), {
    head: `Plan, ${page.units.error.name} per axis`,
    cell: (mark) => page.number(mark, 'horizontalSigmaMm', 'error'),
  });
  add(stated('verticalSigmaMm'), {
    head: `Height, ${page.units.error.name}`,
    cell: (mark) => page.number(mark, 'verticalSigmaMm', 'error'),
  });
  add(stated('sky'), { head: 'Sky', cell: ({ sky }) => sky ?? NOT_GIVEN, text: true });
  add(stated('combinedFactor'), {
    head: 'Combined factor',
    cell: (mark) => page.number(mark, 'combinedFactor', 'factor'),
  });
  if (columns.length === 1 && !controlMarks.some(({ siteMark }) => siteMark)) return html``;
  return html`${table(`Coordinates of the marks; heights are ${heights}`, controlMarks, columns)}
${notes(page, stated)}`;
}

const holds = ({ from, to }: ControlMark): string =>
  [from && `from ${from}`, to && `to ${to}`].filter(Boolean).join(' ') || 'always';

function notes(page: Page, stated: (key: keyof ControlMark) => boolean): Html | null {
  const { heights } = page.results;
  const texts = [
    ...(stated('horizontalSigmaMm') || stated('verticalSigmaMm')
      ? ['Precisions are one standard deviation, whatever level the marks file states.']
      : []),
    ...(stated('combinedFactor')
      ? [
          `The combined factor is point scale × height factor: a distance on the ground times it is one on the grid; less 1 it is the ppm of the grid over the ground.${heights === 'orthometric' ? ' It is formed with orthometric heights; each metre of geoid above the ellipsoid lowers it by 0.16 ppm.' : ''}`,
        ]
      : []),
  ];
  return texts.length === 0 ? null : html`<p class="small">${page.text(texts.join(' '))}</p>\n`;
}
