import { fileURLToPath } from 'node:url';

/** Folder of the installed package. */
export const packageFolder = (): string => fileURLToPath(new URL('../..', import.meta.url));
