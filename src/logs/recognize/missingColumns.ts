import { coordinateColumns } from '../coordinateColumns.js';
import type { ColumnRole } from '../roles.js';
import type { Draft } from './draft.js';
import type { RecognizeOptions } from './recognition.js';

/** Asks for each coordinate that no column was found for. */
export function askForMissing(draft: Draft, options: RecognizeOptions): void {
  for (const role of missingCoordinates(draft, options)) {
    // What another question is about is not asked for twice.
    if (isAsked(draft, role)) continue;
    const left = draft.free().filter(({ numbers }) => numbers !== null);
    draft.doubt({
      code: 'missing-column',
      question: `Which column is the ${role}?`,
      because:
        left.length === 0
          ? 'No column is left that may be it.'
          : 'No column is named so, or surely looks like it.',
      key: `layout.columns.${role}`,
      choices: left.map(({ reference }) => String(reference)),
      decisive: true,
    });
  }
}

function missingCoordinates(draft: Draft, options: RecognizeOptions): readonly ColumnRole[] {
  const plane: readonly ColumnRole[] = ['easting', 'northing', 'height'];
  const isPlane = draft.doubts.some(({ code }) => code === 'projection');
  const system = draft.coordinates ?? options.coordinates ?? 'geographic';
  const roles = isPlane ? plane : coordinateColumns(system).roles;
  return roles.filter((role) => !draft.has(role));
}

const isAsked = ({ doubts }: Draft, role: ColumnRole): boolean =>
  doubts.some(
    ({ key, choices, decisive }) =>
      decisive &&
      (key === `layout.columns.${role}` ||
        (key === 'layout.columns' && choices.some((choice) => choice.includes(`${role}:`)))),
  );
