import { beforeAll, describe, expect, it } from 'vitest';
import { logText, marksText, simulateLog } from '../../src/campaign/index.js';
import type { InputError } from '../../src/logs/index.js';
import { readStudy, runStudy, type StudyRun } from '../../src/study/index.js';
import type { RuleInput } from '../../src/study/makeRules.js';
import { resultsSchema } from '../../src/study/resultsSchema.js';
import { siteHeight } from '../../src/study/siteHeight.js';
import { planJobs } from '../../src/study/studyJobs.js';
import { testFolder } from '../files.js';

/*
 * What rules are used for, in one study: a base on an assumed coordinate, a site above it, a job, and standards with a
 * field test among the shots.
 */

const folder = testFolder();
const campaign = simulateLog({
  seed: 8,
  days: 20,
  utcOffsetHours: 0,
  epochsPerOccupation: 2,
  marks: { count: 10, nearestKm: 0.5, farthestKm: 15, lowestM: 20, highestM: 400 },
  occupationsPerDay: { from: 14, to: 18 },
});
const { base } = campaign;
/** Rover points 5 m apart, near the base. */
const [FT1, FT2] = [
  { latitudeDeg: base.latitudeDeg + 0.001, longitudeDeg: base.longitudeDeg, heightM: base.heightM },
  { latitudeDeg: base.latitudeDeg + 0.001045, longitudeDeg: base.longitudeDeg, heightM: base.heightM },
];
const place = ({ latitudeDeg, longitudeDeg, heightM }: typeof FT1): string =>
  `${latitudeDeg.toFixed(9)},${longitudeDeg.toFixed(9)},${heightM.toFixed(4)}`;

/** Five sets on the last day at 19 h, five minutes apart, each point 2 mm too high on every other set. */
function fieldTestLines(): string {
  const day = new Date(campaign.rows.at(-1)!.timeMs).toISOString().slice(0, 10);
  return Array.from({ length: 5 }, (_, k) =>
    [FT1, FT2]
      .map((point, p) => {
        const time = `${day}T19:${String(5 * k + 2 * p).padStart(2, '0')}:00Z`;
        const raised = { ...point, heightM: point.heightM + (k % 2 === 0 ? 0.002 : 0) };
        return `${time},${base.name},FT${p + 1},R1,A,${place(raised)},fixed,14,1.5,1.0`;
      })
      .join('\n'),
  ).join('\n');
}

const STUDY = `
marks: marks.csv
bases: bases.csv
logs: [{files: log.csv}]
timeZone: UTC
terms: [height-difference]
site: {heightDifferenceM: 200}
jobs: [{file: job.csv, limitMm: 25}]
checkShots: {falseAlarmsPerYear: 2, checksPerYear: 400}
standards: [NSSDA, ISO 17123-8, GUM, land-title]
tolerances: [{component: horizontal, limitMm: 40}, {component: vertical, limitMm: 80}]
`;

async function run(
  study = STUDY,
  bases = `base,latitude,longitude,height,source,horizontalSigmaMm,verticalSigmaMm,sigmaLevel\n${base.name},${place(base)},assumed,2000,1000,rms\nOTHER,${place({ ...base, latitudeDeg: base.latitudeDeg + 0.2 })},assumed,8000,4000,rms\n`,
) {
  const marks = `${marksText(campaign.marks, { horizontal: 2, vertical: 3 })}FT1,${place(FT1)},1,1,rms,tape and level,open\nFT2,${place(FT2)},1,1,rms,tape and level,open\n`;
  folder.write('marks.csv', marks);
  folder.write('bases.csv', bases);
  folder.write('log.csv', `${logText(campaign.rows)}${fieldTestLines()}\n`);
  folder.write('job.csv', `point,latitude,longitude\nnear,${base.latitudeDeg + 0.01},${base.longitudeDeg}\n`);
  return runStudy(await readStudy(folder.write('study.yaml', study)));
}

/** What rules of a run stand on, with nothing known beside the errors. */
const input = ({ errors, control, models, visits }: StudyRun): RuleInput => ({
  errors,
  used: errors,
  visits,
  control,
  models,
  doubts: new Map(),
  days: [],
  height: undefined,
  wrongFixes: null,
  markSigmaMm: new Map(),
  f107: new Map(),
  options: new Map(models.map(({ component }) => [component, {}])),
});

describe('a study with all that rules are used for', () => {
  let found: StudyRun;
  beforeAll(async () => {
    found = await run();
  });
  const vertical = () => found.results.rules.find(({ component }) => component === 'vertical')!;

  it('takes the ppm of the assumed base into every rule, and says so', () => {
    // √(2² + 2² + 1²) m = 3 m, over 20 m a ppm: 0.15 ppm (common practice).
    for (const { conditions, remarks } of found.results.rules) {
      expect(conditions.basePpm).toBeCloseTo(0.15, 12);
      // Metres of stated precision are a shift of all positions, which no rule holds.
      expect(conditions.baseSigmaMm).toBeNull();
      expect(remarks.join(' ')).toContain('0.15 ppm that its error adds to every baseline');
    }
    expect(found.results.messages.map(({ code }) => code)).toContain('assumed-base');
  });
  it('has a shorter rule from a base that is known worse', () => {
    const [job] = found.results.jobs;
    const [own, other] = job!.bases;
    expect(own!.maximumBaselineKm).toBe(job!.maximumBaselineKm);
    expect(other!.maximumBaselineKm!).toBeLessThan(own!.maximumBaselineKm!);
    expect(job!.points).toMatchObject([{ point: 'near', bestBase: base.name, needsAnotherBase: false }]);
    expect(job).toMatchObject({ component: 'horizontal', limitMm: 25, share: 0.95 });
  });
  it('warns of points higher above their base than the vertical rule is for', async () => {
    const jobs = [
      {
        file: 'job.csv',
        limitMm: null,
        points: [{ name: 'top', position: { ...FT1, heightM: base.heightM + 350 }, limitMm: null }],
      },
    ];
    const study = await readStudy(folder.write('study.yaml', STUDY));
    const told = (more: object) =>
      planJobs(jobs, { ...input(found), ...more }, study).messages.map(({ code }) => code);
    expect(told({ height: { differenceM: 200, mmPer100M: 1 } })).toEqual(['job-points-steep']);
    expect(told({ height: { differenceM: -400, mmPer100M: 1 } })).toEqual([]);
    const { messages } = planJobs(jobs, input(found), { ...study, tolerances: [] });
    expect(messages.map(({ text }) => text).join(' ')).toContain(
      'State tolerances in the study file, limitMm of the job',
    );
  });
  it('has vertical rules for the site', () => {
    expect(vertical().conditions.heightDifferenceM).toBe(200);
    expect(vertical().remarks).toContain('The rule is for sites 200 m above or below their base.');
  });
  it('says that a site needs the height term', () => {
    const none = siteHeight(found.errors, [], { siteHeightDifferenceM: 200 });
    expect(none.height).toBeUndefined();
    expect(none.messages[0]!.text).toContain('Add terms: [height-difference]');
    expect(siteHeight(found.errors, [], { siteHeightDifferenceM: null }).messages).toEqual([]);
  });
  it('recognises the field test, whose height deviation is known by hand', () => {
    const iso = found.results.standards.filter(({ name }) => name === 'ISO 17123-8');
    expect(iso).toHaveLength(1);
    const [plan, height, distance] = iso[0]!.figures;
    // Heights 2, 0, 2, 0, 2 mm on both points: Σ r² = 2 · 4.8 mm², 8 degrees of freedom.
    expect(height!.valueMm!).toBeCloseTo(Math.sqrt(9.6 / 8), 1);
    expect(plan!.valueMm!).toBeLessThan(0.2);
    expect(distance!.valueMm!).toBeLessThan(0.2);
    expect(iso[0]!.outcome).toContain('simplified test on "FT1" and "FT2"');
    expect(iso[0]!.lacking.join(' ')).toContain('from the own fit at this distance');
  });
  it('names a field test that is not there, and takes what is stated of one that is', async () => {
    const day = found.errors.find(({ mark }) => mark === 'FT1')!.day;
    const named = `fieldTests: [{marks: [FT1, FT2], day: ${day}, planMm: 15, heightMm: 25, distanceM: 5.01}, {marks: [M01, FT1], day: ${day}}]\n`;
    const results = (await run(`${STUDY}${named}`)).results.standards.filter(
      ({ name }) => name === 'ISO 17123-8',
    );
    expect(results).toHaveLength(2);
    const [, , distance] = results[0]!.figures;
    // 0.000045° of latitude at 44° are 5.000 m: about 10 mm off the stated distance; a set may be 2.5 · 15 mm off.
    expect(Math.abs(distance!.valueMm! - 10)).toBeLessThan(2);
    expect(distance!.allowedMm).toBe(37.5);
    expect(results[1]!.outcome).toMatch(
      /^No field test is among the shots: it needs sets on "M01" and "FT1"/,
    );
  });
  it('looks for named field tests without being asked for the standard, and for no day but theirs', async () => {
    const named = 'fieldTests: [{marks: [FT1, FT2], day: 2000-01-01}]\n';
    const { standards } = (await run(`${STUDY.replace(/standards:.*/, '')}${named}`)).results;
    expect(standards.map(({ name }) => name)).toEqual(['ISO 17123-8']);
    expect(standards[0]!.outcome).toMatch(
      /^No field test is among the shots: it needs a first series on 2000-01-01, as fieldTests states: the next one on "FT1" and "FT2" begins on/,
    );
  });
  it('says what each standard lacks', () => {
    const [nssda, , gum, title] = found.results.standards;
    expect(nssda!.lacking).toContain('not met: at least 20 check points in plan');
    expect(nssda!.outcome).toContain('not to be stated as tested');
    expect(gum!.lacking).toContain("not met: the error of the base's coordinates is stated");
    // The visits of the simulator are hours apart: no two marks of one setup within 30 minutes, but for the field test.
    expect(title!.outcome).toContain(title!.figures.length === 0 ? 'Nothing can be said' : 'The limit');
    for (const { caution } of found.results.standards) expect(caution).toContain('from memory');
  });
  it('has limits at the stated number of false alarms, also from two bases at different distances', () => {
    expect(found.results.checkShotLimits).toHaveLength(2);
    for (const { alarmShare, twoBases, limits } of found.results.checkShotLimits) {
      expect(twoBases.length).toBeGreaterThan(5);
      expect(alarmShare).toBe(2 / 800);
      for (const { firstKm, secondKm, limitMm } of twoBases) {
        const at = (km: number) => limits.find(({ baselineKm }) => baselineKm === km)!.twoBasesMm;
        expect(limitMm).toBeGreaterThan(at(firstKm));
        expect(limitMm).toBeLessThan(at(secondKm));
      }
    }
  });
  it('has promises that grow with distance and share, and counts epochs', () => {
    for (const component of ['horizontal', 'vertical']) {
      const own = found.results.promises.filter((one) => one.component === component);
      for (const one of own) {
        const nearer = own.filter(
          ({ share, baselineKm }) => share === one.share && baselineKm < one.baselineKm,
        );
        for (const { limitMm } of nearer)
          if (one.limitMm !== null) expect(limitMm!).toBeLessThan(one.limitMm);
      }
    }
    const rows = found.results.errorByOccupationLength.filter(({ component }) => component === 'horizontal');
    // Those of one epoch are on marks of one day, which say nothing of repeatability.
    expect(rows.map(({ fromEpochs, toEpochs }) => [fromEpochs, toEpochs])).toEqual([[2, 4]]);
  });
  it('is what its schema says', () => {
    expect(resultsSchema.safeParse(JSON.parse(JSON.stringify(found.results))).success).toBe(true);
  });
  it('is refused with a job that is not there or not understood', async () => {
    const refusal = async (study: string): Promise<string> => {
      try {
        await run(study);
        return '';
      } catch (error) {
        return (error as InputError).messages.map(({ text }) => text).join('\n');
      }
    };
    expect(await refusal(STUDY.replace('job.csv', 'jobs.csv'))).toContain(
      'Expected the file of job points "jobs.csv"',
    );
    expect(await refusal(STUDY.replace('[NSSDA,', '[NSDA,'))).toContain('came "NSDA"');
    expect(await refusal(STUDY.replace('PerYear: 2', 'PerYear: 500'))).toContain(
      'fewer false alarms than check shots',
    );
  });
});
