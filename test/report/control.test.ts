import { beforeAll, describe, expect, it } from 'vitest';
import { annexHtml, reportHtml, reportTables, summaryText } from '../../src/report/index.js';
import { type Results, readStudy, runStudy, type StudyRun } from '../../src/study/index.js';
import { testFolder } from '../files.js';
import { BASE, MARK_PLACES, planeRows, ZONE_32 } from '../study/spoiledStudy.js';
import { NO_PICTURES } from './pictures.js';

const folder = testFolder();
let run: StudyRun;
let page: string;
let annex: string;

/** What a reader sees of a part of a page. */
const seen = (html: string): string => html.replace(/<data [^>]*>/g, '').replaceAll('</data>', '');

/** A study in the plane of zone 32 whose heights are all 90 mm too high and one of them 340 mm. */
beforeAll(async () => {
  const line = (name: string, place: typeof BASE, rest: string): string => {
    const { eastingM, northingM } = ZONE_32.forward(place);
    return `${name},${eastingM.toFixed(4)},${northingM.toFixed(4)},${place.heightM.toFixed(4)},${rest}`;
  };
  const marks = [...MARK_PLACES].map(([name, place]) =>
    line(name, place, `9.8,19.6,95,${name === 'P3' ? 'static <2019>' : ''},Regional,2010.5,open`),
  );
  folder.write(
    'marks.csv',
    `mark,easting,northing,height,horizontalSigmaMm,verticalSigmaMm,sigmaLevel,source,frame,epoch,sky\n${marks.join('\n')}`,
  );
  folder.write('bases.csv', `base,easting,northing,height,source\n${line('B1', BASE, '')}`);
  const rows = planeRows().map(({ time, mark, eastingM, northingM, heightM }, k) =>
    [time, mark, 'Ann', eastingM, northingM, heightM + 0.09 + (k === 100 ? 0.25 : 0)].join(','),
  );
  folder.write('log.csv', `time,mark,crew,easting,northing,height\n${rows.join('\n')}`);
  const path = folder.write(
    'study.yaml',
    'timeZone: UTC\ncoordinates: EPSG:25832\nheights: {kind: orthometric}\nmarks: marks.csv\nbases: bases.csv\nlogs: [{files: log.csv, layout: {kind: delimited}, sitePlane: {marks: [P1]}}]\ntolerances: [{component: vertical, limitMm: 40}]\n',
  );
  run = await runStudy(await readStudy(path));
  page = reportHtml(run.results, NO_PICTURES);
  annex = seen(annexHtml(run, NO_PICTURES));
}, 60_000);

describe('the report on what is compared with what', () => {
  it('tells what all positions have in common, with size, cause and remedy', () => {
    const section = annex.slice(annex.indexOf('id="common"'), annex.indexOf('id="marks"'));
    expect(section).toMatch(/<th scope="row">Shift up<\/th><td class="number">\+(89|90|91)\.\d<\/td>/);
    expect(section).toMatch(/<th scope="row">Shift east<\/th>.*<td>no<\/td>/);
    expect(section).toContain('the plan is not: a rod height');
    expect(section).toContain('state heightOf: antenna');
    expect(section).toContain('another thing than the ppm of the error model');
    // It comes before the numbers that it spoils.
    expect(page.indexOf('class="first"')).toBeLessThan(page.indexOf('class="rules"'));
    expect(summaryText(run.results)).toContain('First: All heights from base "B1" are off by');
  });

  it('says so where nothing was found', () => {
    const clean: Results = {
      ...run.results,
      commonCauses: { ...run.results.commonCauses, causes: [] },
      blunders: [],
    };
    const text = annexHtml({ ...run, results: clean }, NO_PICTURES);
    expect(text).toContain('Nothing was found that all positions have in common');
    expect(text).not.toContain('id="blunders"');
  });

  it('names the kind of heights wherever a vertical error stands', () => {
    for (const where of [
      'Vertical (orthometric heights)',
      'vertical positions (orthometric heights)',
      'vertical: orthometric heights',
      'Up (orthometric)',
      'heights are orthometric',
    ])
      expect(page + annex).toContain(where);
    expect(page + annex).not.toContain('ellipsoidal heights)');
    expect(summaryText(run.results)).toContain('Vertical (orthometric heights)');
  });

  it('lists suspected blunders with their cause', () => {
    const section = annex.slice(annex.indexOf('id="blunders"'), annex.indexOf('id="occupations"'));
    expect(section).toContain('1 occupation looks like a mistake of a person');
    expect(section).toMatch(/The height alone is off by \+2\d\d mm: rod height or antenna reference/);
    expect(section).toContain('<td>crew 1</td>');
    expect(section).toContain('line 102');
  });

  it('shows where coordinates come from, and which marks are residuals', () => {
    expect(annex).toContain('<bdi>P1</bdi> (residual)');
    expect(annex).toContain('<bdi>P1</bdi> (site mark)');
    expect(annex).toContain('static &lt;2019&gt;');
    const p3 = run.results.controlMarks.find(({ mark }) => mark === 'P3')!;
    expect(p3).toMatchObject({ frame: 'Regional', epoch: 2010.5, sky: 'open', siteMark: false, from: null });
    // A 95 % figure is 1.960 standard deviations.
    expect(p3.horizontalSigmaMm).toBeCloseTo(5, 3);
    expect(p3.verticalSigmaMm).toBeCloseTo(10, 3);
    // UTM 44 km from its meridian at 640 m: 0.9996 (1 + 44.6²/(2 · 6382²)) (1 − 640/6382000) = 0.999524.
    expect(p3.combinedFactor).toBeCloseTo(0.999524, 5);
    expect(annex).toContain(p3.combinedFactor!.toFixed(7));
  });

  it('writes all of it as tables too', () => {
    const tables = new Map(reportTables(run).map((table) => [table.name, table]));
    for (const { header, rows } of tables.values())
      for (const row of rows) expect(row).toHaveLength(header.length);
    expect(tables.get('common')!.rows).toHaveLength(7);
    expect(tables.get('causes')!.rows.map(([code]) => code)).toEqual(['rod-height']);
    expect(tables.get('blunders')!.rows).toHaveLength(1);
    expect(tables.get('control-marks')!.rows).toHaveLength(8);
    const shiftUp = tables.get('common')!.rows.find((row) => row.includes('shift-up'))!;
    expect(shiftUp.at(-2)).toBe(true);
    expect(shiftUp.at(-1)).toBe('orthometric');
    for (const name of [
      'fits',
      'rules',
      'marks',
      'length-classes',
      'errors',
      'weights',
      'check-shot-limits',
    ]) {
      const { header, rows } = tables.get(name)!;
      const component = header.indexOf('component');
      expect(header.filter((head) => head === 'heights')).toHaveLength(1);
      for (const row of rows) {
        const plan = component >= 0 && row[component] === 'horizontal';
        expect(row[header.indexOf('heights')]).toBe(plan ? null : 'orthometric');
      }
    }
  });
});
