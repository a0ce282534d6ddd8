import type { ErrorsInput } from '../errors/index.js';

/** The errors as records, whichever form they came in. */
export const recordsOf = (errors: ErrorsInput): readonly object[] =>
  'objects' in errors ? errors.objects() : errors;
