import {
  type Control,
  comparabilityMessages,
  type MarkTimes,
  readAliases,
  readBases,
  readMarks,
  readMarkTimes,
} from '../control/index.js';
import type { Message } from '../logs/index.js';
import type { Study } from './study.js';

/**
 * Reads everything that is known beforehand: marks, bases, other names of marks, lists of stays.
 * @throws InputError when one of the files cannot be understood
 */
export async function loadControl(study: Study): Promise<{ control: Control; messages: Message[] }> {
  const { marks, messages } = await readMarks(study.marks);
  const bases = await readBases(study.bases);
  const { aliases: list, namePattern: pattern } = study;
  const aliases = list === null ? new Map<string, string>() : await readAliases(list.path, list.file, marks);
  const lists = new Map<string, MarkTimes>();
  const markTimes = new Map<string, MarkTimes>();
  for (const [log, { path, file }] of study.markTimes) {
    const times = lists.get(path) ?? (await readMarkTimes(path, file, marks, study.timeZone));
    lists.set(path, times);
    markTimes.set(log, times);
  }
  return {
    control: { marks, bases: bases.bases, names: { pattern, aliases }, markTimes },
    messages: [...messages, ...bases.messages, ...comparabilityMessages(marks, bases.bases, study)],
  };
}
