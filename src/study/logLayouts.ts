import {
  autoLayout,
  InputError,
  type LogFile,
  type LogLayout,
  type Message,
  readHead,
} from '../logs/index.js';

/** A log whose layout may still have to be recognised. */
export type FoundLog = Omit<LogFile, 'layout'> & {
  /** Null when the study file gives none. */
  readonly layout: LogLayout | null;
  /** Number of its entry in the study file. */
  readonly entry: number;
};

export interface LayoutOptions {
  readonly timeZone: string | null;
  /** Kind of the heights of an entry of the study file; undefined when it does not state it. */
  readonly heightsOf: (entry: number) => 'ellipsoidal' | 'orthometric' | undefined;
}

/**
 * Recognises the layouts that the study file does not give. Files of one entry with the same first line share what was
 * found for the first of them, so that thousands of logs are not looked through one by one.
 * @throws InputError with every question of every file that must be answered in the study file
 */
export async function logLayouts(
  found: readonly FoundLog[],
  { timeZone, heightsOf }: LayoutOptions,
): Promise<{ logs: LogFile[]; messages: Message[] }> {
  const known = new Map<string, LogLayout>();
  const logs: LogFile[] = [];
  const messages: Message[] = [];
  const questions: Message[] = [];
  for (const { layout, entry, ...log } of found) {
    if (layout !== null) {
      logs.push({ ...log, layout });
      continue;
    }
    const firstLine = (await readHead(log.path)).toString('latin1').split(/[\r\n]/, 1)[0]!;
    const key = `${entry} ${firstLine}`;
    const same = known.get(key);
    if (same !== undefined) {
      logs.push({ ...log, layout: same });
      continue;
    }
    try {
      const recognised = await autoLayout(log.path, log.file, {
        coordinates: log.coordinates,
        timeZone,
        heights: heightsOf(entry),
      });
      logs.push({ ...log, layout: recognised.layout });
      messages.push(...recognised.messages);
      // Only names of columns say the same of another file; first rows without a header would differ anyway.
      if (hasHeader(recognised.layout)) known.set(key, recognised.layout);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      questions.push(...error.messages);
    }
  }
  if (questions.length > 0) throw new InputError(questions);
  return { logs, messages };
}

const hasHeader = (layout: LogLayout): boolean => layout.kind === 'delimited' && layout.header !== false;
