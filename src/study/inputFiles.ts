import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { relative } from 'node:path';
import type { NamedFile } from './fileFinder.js';
import type { Study } from './study.js';

/** A file that a run read beside the logs, and what it is. */
export interface InputFile {
  readonly file: string;
  readonly role: (typeof INPUT_ROLES)[number];
  /** SHA-256 of its bytes. */
  readonly sha256: string;
}

export const INPUT_ROLES = [
  'study file',
  'marks',
  'bases',
  'job points',
  'other names of marks',
  'list of stays',
  'geoid separations',
  'geomagnetic indices',
  'ionosphere maps',
] as const;

/** The files of a study beside its logs, each once, with the hashes of their bytes. */
export async function inputFiles(study: Study): Promise<InputFile[]> {
  const named: [InputFile['role'], readonly NamedFile[]][] = [
    ['study file', [{ path: study.file, file: relative(study.folder, study.file) }]],
    ['marks', [study.marks]],
    ['bases', [study.bases]],
    ['job points', study.jobs],
    ['other names of marks', study.aliases === null ? [] : [study.aliases]],
    ['list of stays', [...study.markTimes.values()]],
    ['geoid separations', study.geoidGrids],
    ['geomagnetic indices', study.indices],
    ['ionosphere maps', study.maps],
  ];
  const files: InputFile[] = [];
  for (const [role, list] of named) {
    for (const { path, file } of list) {
      const known = files.some((one) => one.role === role && one.file === file);
      if (!known) files.push({ file, role, sha256: await sha256(path) });
    }
  }
  return files;
}

export async function sha256(path: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path)) hash.update(chunk as Buffer);
  return hash.digest('hex');
}
