import { describe, expect, it } from 'vitest';
import { jobMapChart, renderSvg } from '../../src/charts/index.js';
import type { JobResult } from '../../src/study/index.js';
import { layersOf } from './data.js';

// One degree of latitude is 111 km: 0.09° are about 10 km.
const place = (latitudeDeg: number) => ({ latitudeDeg, longitudeDeg: -18.4, heightM: null });
const point = (name: string, latitudeDeg: number, needsAnotherBase: boolean) => ({
  point: name,
  ...place(latitudeDeg),
  bestBase: 'B1',
  baselineKm: 1,
  promisedMm: needsAnotherBase ? 31.26 : 14.04,
  reason: null,
  reachedFrom: needsAnotherBase ? [] : ['B1'],
  needsAnotherBase,
});
const job = (maximumBaselineKm: number | null, points: JobResult['points']): JobResult => ({
  file: 'jobs/road.csv',
  component: 'horizontal',
  limitMm: 25,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
  maximumBaselineKm,
  reason: null,
  bases: [
    { base: 'B1', ...place(44.3), maximumBaselineKm, reason: null, baseOfRule: true },
    { base: 'B2', ...place(45.3), maximumBaselineKm, reason: null, baseOfRule: false },
  ],
  points,
  reaches: [],
  sentence: 'The sentence.',
});
const two = [point('near', 44.32, false), point('far', 44.4, true)];

describe('jobMapChart', () => {
  const chart = jobMapChart({ job: job(7.96, two) });
  const [rings, reached, missed, bases] = layersOf(chart.vegaLite);
  it('says how many points need another base, and what can be promised', () => {
    expect(chart.title).toBe('1 of 2 points needs another base for 25 mm in plan');
    expect(chart.subtitle.join(' ')).toContain('7.9 km');
    expect(chart.subtitle.join(' ')).toContain('14 to 31.3 mm');
    expect(jobMapChart({ job: job(7.96, [two[0]!]) }).title).toBe('The point is reached for 25 mm in plan');
    expect(jobMapChart({ job: job(null, two) }).title).toBe(
      'No rule for 25 mm in plan: no point can be promised it',
    );
  });
  it('draws points in their place by their kind, and leaves out bases far from the job', () => {
    expect(reached!.data.values.map(({ name }) => name)).toEqual(['near']);
    expect(missed!.data.values.map(({ name }) => name)).toEqual(['far']);
    expect(bases!.data.values.map(({ name }) => name)).toEqual(['B1']);
    // A degree of the meridian at 44.36° is 111.12 km (series of Helmert 1880, from memory).
    expect(missed!.data.values[0]!.northKm as number).toBeCloseTo(11.112, 2);
  });
  it('draws a ring as far as the rule reaches, and none without a rule', () => {
    for (const { eastKm, northKm } of rings!.data.values)
      expect(Math.hypot(eastKm as number, northKm as number)).toBeCloseTo(7.96, 9);
    expect(layersOf(jobMapChart({ job: job(null, two) }).vegaLite)[0]!.data.values).toEqual([]);
  });
  it('draws points that would cover each other as one, so that 50 000 take no more than some hundreds', async () => {
    const crowd = Array.from({ length: 50_000 }, (_, k) =>
      point(`P${k}`, 44.2 + ((k * 7919) % 50_000) / 250_000, k % 3 === 0),
    );
    const crowded = jobMapChart({ job: job(7.96, crowd) });
    const drawn = layersOf(crowded.vegaLite).flatMap(({ data }) => data.values.filter(({ kind }) => kind));
    expect(drawn.length).toBeLessThan(1000);
    expect(new Set(drawn.map(({ kind }) => kind))).toEqual(new Set(['base', 'reached', 'not reached']));
    expect(crowded.subtitle.join(' ')).toContain('drawn as one');
    expect((await renderSvg(crowded)).length).toBeLessThan(200_000);
  });
  it('is drawn, the same bytes twice', async () => {
    const svg = await renderSvg(chart);
    expect(svg).toContain('far');
    expect(await renderSvg(jobMapChart({ job: job(7.96, two) }))).toBe(svg);
  });
});
