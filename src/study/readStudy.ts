import { existsSync, statSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { dirname, resolve } from 'node:path';
import { InputError, inputError } from '../logs/index.js';
import type { SpecSheet, Tolerance } from '../rule/index.js';
import { FileFinder } from './fileFinder.js';
import { flatSettings } from './flatSettings.js';
import { logLayouts } from './logLayouts.js';
import { parseStudyText } from './parseStudyText.js';
import type { StudySettings } from './settings.js';
import { sources } from './sources.js';
import type { Study } from './study.js';

const MM_PER_FOOT = 304.8;

/**
 * Reads a study file, checks it against the schema and finds the files it names.
 * @throws InputError that names file, line, key, what was expected and what came
 */
export async function readStudy(path: string): Promise<Study> {
  const file = resolve(path);
  if (!existsSync(file) || statSync(file).isDirectory()) {
    throw inputError(
      'no-study-file',
      `Expected a study file, came ${existsSync(file) ? 'a folder' : 'a path that does not exist'}. Name the file, or make one with "ppmwise new DIR".`,
      { file: path },
    );
  }
  const { settings, placeOf } = parseStudyText(await readFile(file, 'utf8'), path);
  const finder = new FileFinder(settings, dirname(file), placeOf);
  const [marks, bases, found] = [finder.control('marks'), finder.control('bases'), finder.logs()];
  const from = sources(settings, finder.grids(), finder.mistake);
  const jobs = finder.jobs();
  const [namePattern, aliases, markTimes] = [finder.namePattern(), finder.aliases(), finder.markTimes(found)];
  const [indices, maps] = [finder.sky('indices'), finder.sky('maps')];
  if (finder.mistakes.length > 0 || marks === null || bases === null) throw new InputError(finder.mistakes);
  const timeZone = settings.timeZone ?? null;
  const read = await logLayouts(found, {
    timeZone,
    heightsOf: (entry) => (settings.logs[entry]!.heights ?? settings.heights)?.kind,
  });
  const logs = read.logs.map((log) => {
    const { entry } = found.find(({ path: known }) => known === log.path)!;
    const system = log.layout.kind === 'nmea' ? null : (log.layout.coordinates ?? log.coordinates);
    return { ...log, changes: from.ofLog(entry, system) };
  });
  // What a log's heights lack is only known once its layout is.
  if (finder.mistakes.length > 0) throw new InputError(finder.mistakes);
  return {
    file,
    folder: finder.folder,
    title: settings.title,
    surveyor: settings.surveyor ?? null,
    reportDate: settings.reportDate ?? null,
    reportUnits: settings.reportUnits,
    showCrews: settings.showCrews,
    timeZone,
    heightKind: from.heightKind,
    marks: { ...marks, changes: from.marks },
    bases: { ...bases, changes: from.bases },
    siteMarks: [...new Set(settings.logs.flatMap(({ sitePlane }) => sitePlane?.marks ?? []))].sort(),
    logFrames: logFrames(settings),
    broughtToOneFrame: isBroughtToOneFrame(settings),
    constantSeparation: from.constantSeparation(),
    namePattern,
    aliases,
    markTimes,
    logs,
    messages: [...finder.notes.values(), ...read.messages],
    period: settings.period ?? null,
    gapSeconds: settings.occupations.gapSeconds,
    windowSeconds: settings.occupations.windowSeconds ?? null,
    ...settings.model,
    tolerances: settings.tolerances.map(tolerance),
    specSheet: settings.specSheet === undefined ? null : specSheet(settings.specSheet),
    siteHeightDifferenceM: settings.site?.heightDifferenceM ?? null,
    jobs: jobs.map((job, k) => ({ ...job, changes: from.jobs[k]!, limitMm: jobLimitMm(settings.jobs[k]!) })),
    checkShots: settings.checkShots,
    // Who names a field test asks for its standard.
    standards: [
      ...new Set([...settings.standards, ...settings.fieldTests.map(() => 'ISO 17123-8' as const)]),
    ],
    fieldTests: settings.fieldTests,
    centringSigmaMm: settings.centringSigmaMm,
    terms: settings.terms,
    by: settings.by,
    indices,
    maps,
    geoidGrids: finder.geoidGrids,
    leaveOutDays: settings.leaveOutDays,
    seed: settings.seed,
    stated: flatSettings(settings),
  };
}

/** Frames that logs state; most state none, and then theirs is that of the base. */
const logFrames = ({ logs }: StudySettings): Study['logFrames'] =>
  logs.flatMap(({ frame, epoch, transformation }) => {
    if (frame === undefined && epoch === undefined && transformation === undefined) return [];
    return [{ frame: frame ?? '', epoch: epoch ?? Number.NaN, transformed: transformation !== undefined }];
  });

const isBroughtToOneFrame = ({ marks, bases, logs }: StudySettings): boolean =>
  [marks, bases].some((source) => typeof source !== 'string' && source.transformation !== undefined) ||
  logs.every(({ transformation }) => transformation !== undefined);

function tolerance(written: StudySettings['tolerances'][number]): Tolerance {
  const { component, limitMm, limitFeet, share, dayShare, confidence } = written;
  return { component, limitMm: limitMm ?? limitFeet! * MM_PER_FOOT, share, dayShare, confidence };
}

function jobLimitMm(job: StudySettings['jobs'][number]): number | null {
  if (typeof job === 'string') return null;
  const { limitMm, limitFeet } = job;
  return limitMm ?? (limitFeet === undefined ? null : limitFeet * MM_PER_FOOT);
}

function specSheet(written: NonNullable<StudySettings['specSheet']>): SpecSheet {
  return { ...written, level: String(written.level) as SpecSheet['level'] };
}
