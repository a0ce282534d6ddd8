import { readFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import type { Control } from '../../src/control/index.js';
import type { LogFile } from '../../src/logs/index.js';
import { readStudy } from '../../src/study/index.js';
import { loadControl } from '../../src/study/loadControl.js';
import { DISGUISES, studyText } from '../disguises/disguises.js';

/** A kind of log to be damaged: one of the disguises, as it is when whole. */
export interface LogKind {
  readonly name: string;
  readonly log: LogFile;
  readonly control: Control;
  readonly timeZone: string | null;
  readonly bytes: Buffer;
  /** Line of the header, 0 where there is none. */
  readonly headerLine: number;
}

/** The disguises laid out in a folder that holds a copy of test/fixtures/disguises. */
export async function logKinds(
  folder: string,
  write: (name: string, text: string) => string,
): Promise<LogKind[]> {
  return Promise.all(
    DISGUISES.map(async (disguise, k) => {
      const study = await readStudy(write(`fuzz-${k}.yaml`, studyText(disguise)));
      const { control } = await loadControl(study);
      const log = study.logs.at(-1)!;
      const bytes = readFileSync(join(folder, basename(log.path)));
      const headless = log.layout.kind === 'nmea' || log.layout.header === false;
      return {
        name: disguise.name,
        log,
        control,
        timeZone: study.timeZone,
        bytes,
        headerLine: headless ? 0 : 1,
      };
    }),
  );
}
