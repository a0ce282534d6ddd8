import type { Control } from '../control/index.js';
import {
  type CommonCauses,
  type FormedOccupations,
  type OccupationError,
  type SetAsideOccupation,
  staticMessage,
  staticShots,
} from '../errors/index.js';
import {
  type LogResolution,
  type Message,
  type OccupationReason,
  roundingSigmaMm,
  totalAccount,
} from '../logs/index.js';
import { controlMarks } from './controlMarks.js';
import { inputFiles, sha256 } from './inputFiles.js';
import type { FileResult, Results } from './results.js';
import { statedStudy } from './statedStudy.js';
import type { Study } from './study.js';

/** What reading gave, before any fit. */
export interface ReadParts {
  readonly formed: FormedOccupations;
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly causes: CommonCauses;
  readonly messages: readonly Message[];
}

/** The results of reading: accounts, visits, occupations and messages. */
export async function summarizeRun(study: Study, control: Control, parts: ReadParts): Promise<Results> {
  const { formed, errors, setAside, causes, messages } = parts;
  const days = [...new Set(errors.map(({ day }) => day))].sort();
  const withoutFix = formed.visits.filter(({ fixedRows }) => fixedRows === 0).length;
  const counts: Partial<Record<OccupationReason, number>> = {};
  for (const { reason } of setAside) counts[reason] = (counts[reason] ?? 0) + 1;
  const files: FileResult[] = [];
  // One after the other: a study may have more logs than a process may have open files.
  for (const account of formed.files) {
    const { path } = study.logs.find(({ file }) => file === account.file)!;
    files.push({
      ...account,
      sha256: await sha256(path),
      resolution: formed.resolutions.get(account.file) ?? null,
    });
  }
  const shots = study.windowSeconds === null ? null : staticShots(errors, study.windowSeconds);
  return {
    version: 1,
    ...statedStudy(study),
    messages: [...messages, ...(shots === null ? [] : staticMessage(shots))],
    rows: totalAccount(formed.files),
    files,
    inputs: await inputFiles(study),
    roundingMm: rounding([...formed.resolutions.values()]),
    staticShots: shots,
    visits: { withFix: formed.visits.length - withoutFix, withoutFix },
    occupations: { formed: formed.occupations.length, used: errors.length, setAside: counts },
    heights: study.heightKind,
    commonCauses: causes,
    blunders: blunders(setAside),
    controlMarks: controlMarks(study, control, errors),
    siteMarks: study.siteMarks,
    days: days.length,
    period: days.length === 0 ? null : { from: days[0]!, to: days.at(-1)! },
    bases: [...control.bases.keys()].filter((base) => errors.some((error) => error.base === base)),
    crews: distinct(formed.visits.map(({ crew }) => crew)),
    rovers: distinct(formed.visits.map(({ rover }) => rover)),
    fits: [],
    comparison: [],
    setups: [],
    markComponents: [],
    wrongFixes: [],
    terms: [],
    groups: [],
    evidence: [],
    dayModels: [],
    dailyFactors: [],
    degradedDays: [],
    timeOfDay: [],
    hoursOfCaution: [],
    shotHours: null,
    lengthClasses: [],
    marks: [],
    sky: null,
    leftOut: null,
    rules: [],
    ruleMoves: [],
    adjustmentWeights: [],
    ruleTable: [],
    promises: [],
    rulesByHour: [],
    rulesBySeason: [],
    backTest: [],
    specSheetTest: [],
    checkShotLimits: [],
    watch: [],
    jobs: [],
    standards: [],
    secondVisits: [],
    errorByOccupationLength: [],
    specSheet: study.specSheet,
  };
}

const distinct = (names: readonly string[]): string[] =>
  [...new Set(names)].filter((name) => name !== '').sort();

/** The occupations taken for blunders, in the order of days. */
const blunders = (setAside: readonly SetAsideOccupation[]): Results['blunders'] =>
  setAside
    .filter(({ reason }) => reason === 'suspected-blunder')
    .map(({ detail, error: { mark, day, crew, rover, file, row } }) => ({
      mark,
      day,
      crew,
      rover,
      cause: detail,
      file,
      row,
    }))
    .sort(
      (a, b) =>
        (a.day < b.day ? -1 : a.day > b.day ? 1 : 0) ||
        (a.file < b.file ? -1 : a.file > b.file ? 1 : a.row - b.row),
    );

/** What the rounding of the coarsest log adds to the constant: both axes of the plan count. */
function rounding(resolutions: readonly LogResolution[]): Results['roundingMm'] {
  if (resolutions.length === 0) return null;
  const coarsest = (step: keyof LogResolution): number =>
    Math.max(...resolutions.map((found) => found[step]));
  return {
    horizontal: Math.SQRT2 * roundingSigmaMm(coarsest('horizontalStepMm')),
    vertical: roundingSigmaMm(coarsest('verticalStepMm')),
  };
}
