import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import type { Control } from '../control/index.js';
import type { FormedOccupations, OccupationError, SetAsideOccupation } from '../errors/index.js';
import { type Message, type OccupationReason, totalAccount } from '../logs/index.js';
import type { FileResult, Results } from './results.js';
import type { Study } from './study.js';

/** What reading gave, before any fit. */
export interface ReadParts {
  readonly formed: FormedOccupations;
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly messages: readonly Message[];
}

/** The results of reading: accounts, visits, occupations and messages. */
export async function summarizeRun(study: Study, control: Control, parts: ReadParts): Promise<Results> {
  const { formed, errors, setAside, messages } = parts;
  const days = [...new Set(errors.map(({ day }) => day))].sort();
  const withoutFix = formed.visits.filter(({ fixedRows }) => fixedRows === 0).length;
  const counts: Partial<Record<OccupationReason, number>> = {};
  for (const { reason } of setAside) counts[reason] = (counts[reason] ?? 0) + 1;
  const files: FileResult[] = [];
  // One after the other: a study may have more logs than a process may have open files.
  for (const account of formed.files) {
    const { path } = study.logs.find(({ file }) => file === account.file)!;
    files.push({ ...account, sha256: await sha256(path) });
  }
  return {
    version: 1,
    study: { title: study.title, timeZone: study.timeZone, seed: study.seed },
    messages,
    rows: totalAccount(formed.files),
    files,
    visits: { withFix: formed.visits.length - withoutFix, withoutFix },
    occupations: { formed: formed.occupations.length, used: errors.length, setAside: counts },
    days: days.length,
    period: days.length === 0 ? null : { from: days[0]!, to: days.at(-1)! },
    bases: [...control.bases.keys()].filter((base) => errors.some((error) => error.base === base)),
    fits: [],
    lengthClasses: [],
    marks: [],
    rules: [],
    specSheet: study.specSheet,
  };
}

async function sha256(path: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path)) hash.update(chunk as Buffer);
  return hash.digest('hex');
}
