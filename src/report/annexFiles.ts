import { REASON_WORDS } from '../logs/index.js';
import type { FileResult, InputFile, StatedSetting } from '../study/index.js';
import { date, type Html, html } from './html.js';
import type { Page } from './page.js';
import { table } from './table.js';

type Line = readonly [string, string | Html];

/** What the study file set, the seed, and what made the numbers. */
export function settingsSection(page: Page): Html {
  const { study, settings, software, heights } = page.results;
  const { period, leaveOutDays } = settings;
  const number = (
    key: 'confidence' | 'gapSeconds' | 'windowSeconds' | 'centringSigmaMm',
    kind: 'share' | 'plain' | 'error',
  ) => page.number(settings, key, kind);
  const lines: Line[] = [
    ['Software', `ppmwise ${software}`],
    ['Seed of everything random', page.number(study, 'seed', 'plain')],
    ['Time zone of days', study.timeZone ?? 'none: days are local mean solar days at the base'],
    ['Heights', heights],
    ['Form behind the rules', settings.form],
    ['Errors are counted from', settings.reference],
    ['Level of intervals', number('confidence', 'share')],
    ['Wrong fixes looked for', settings.screen ? 'yes' : 'no'],
    ['A longer gap begins a new visit, s', number('gapSeconds', 'plain')],
    [
      'Static occupations cut into shots of, s',
      settings.windowSeconds === null ? 'not cut' : number('windowSeconds', 'plain'),
    ],
    [
      `Centring of the rod per axis, ${page.units.error.name}`,
      settings.centringSigmaMm === 0 ? 'not stated' : number('centringSigmaMm', 'error'),
    ],
    ['Period', period === null ? 'all days' : html`${date(period.from)} to ${date(period.to)}`],
    ['Days left out', leaveOutDays.length === 0 ? 'none' : leaveOutDays.join(', ')],
  ];
  return html`<section id="settings"><h2>Settings and version</h2>
${table('Settings', lines, [
  { head: 'What', cell: ([what]) => what, text: true },
  { head: 'Value', cell: ([, value]) => value, text: true },
])}
${table<StatedSetting>('Every setting of the study file, defaults filled in', settings.stated, [
  { head: 'Setting', cell: ({ key }) => html`<code>${key}</code>`, text: true },
  { head: 'Value', cell: ({ value }) => page.name(value), text: true },
])}
</section>
`;
}

/** The account of each file, with the hash of its bytes. */
export function filesSection(page: Page): Html {
  const { files, inputs, roundingMm } = page.results;
  const { error } = page.units;
  return html`<section id="files"><h2>Files</h2>
${table<FileResult>('Account of each file', files, [
  { head: 'File', cell: ({ file }) => page.name(file), text: true },
  { head: 'Read', cell: (file) => page.number(file, 'read', 'count') },
  { head: 'Used', cell: (file) => page.number(file, 'used', 'count') },
  { head: 'Set aside', cell: (file) => setAside(page, file), text: true },
  { head: `Steps, ${error.name}`, cell: (file) => steps(page, file) },
  { head: 'SHA-256', cell: ({ sha256 }) => html`<code>${sha256}</code>`, text: true },
])}
${table<InputFile>('What was read beside the logs', inputs, [
  { head: 'File', cell: ({ file }) => page.name(file), text: true },
  { head: 'What it is', cell: ({ role }) => role, text: true },
  { head: 'SHA-256', cell: ({ sha256 }) => html`<code>${sha256}</code>`, text: true },
])}
${
  roundingMm === null
    ? null
    : html`<p class="small">Steps are those of plan and height in which positions are written. Their rounding adds
${page.number(roundingMm, 'horizontal', 'error to a hundredth')} ${error.name} to the horizontal and ${page.number(roundingMm, 'vertical', 'error to a hundredth')} ${error.name} to the vertical constant, as squares.
Every row set aside, with its reason, stands in tables/set-aside.csv.</p>\n`
}</section>
`;
}

function setAside(page: Page, { setAside: reasons }: FileResult): Html {
  const told = Object.entries(reasons).map(([reason, found], k) => {
    const rows = found.firstRows.map(
      (_, i) =>
        html`${i === 0 ? '' : ', '}${page.number(found.firstRows as unknown as number[], i, 'plain')}`,
    );
    const more = found.count > found.firstRows.length ? ', …' : '';
    return html`${k === 0 ? '' : '; '}${reason} (${REASON_WORDS[reason as keyof typeof REASON_WORDS]}) ${page.number(found, 'count', 'count')}, ${found.firstRows.length === 1 ? 'line' : 'lines'} ${rows}${more}`;
  });
  return told.length === 0 ? html`none` : html`${told}`;
}

function steps(page: Page, { resolution }: FileResult): Html {
  if (resolution === null) return html`—`;
  return html`${page.number(resolution, 'horizontalStepMm', 'error to a hundredth')} / ${page.number(resolution, 'verticalStepMm', 'error to a hundredth')}`;
}
