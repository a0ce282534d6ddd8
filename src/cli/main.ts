#!/usr/bin/env node
import { tooOld } from './nodeVersion.js';

// The program is loaded only after the question, because an older Node.js stumbles over it before it can say why.
const told = tooOld(process.versions.node);
if (told === null) await import('./program.js');
else {
  process.stderr.write(`${told}\n`);
  process.exitCode = 2;
}
