import type { CommonCauses } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';

/** One warning for each cause that errors have in common. */
export const causeMessages = ({ causes }: CommonCauses): Message[] =>
  causes.map(({ code, text, remedy }) => message('warning', code, `${text} Nothing is repaired. ${remedy}`));
