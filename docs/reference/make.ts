import { writeFileSync } from 'node:fs';
import { referencePages } from './pages.js';

// Writes the reference pages beside this file.
for (const [name, text] of Object.entries(referencePages()))
  writeFileSync(new URL(name, import.meta.url), text);
