import type { Column } from './columns.js';
import type { Draft } from './draft.js';
import { soundsOrthometric } from './headerName.js';
import { askFoot, setUnits, statedUnit } from './lengthUnits.js';
import { isPlane } from './planeFit.js';
import type { RecognizeOptions } from './recognition.js';

/** Settles unit, kind and reference point of the heights, or asks for them. */
export function settleHeights(draft: Draft, options: RecognizeOptions): void {
  const height = draft.roles.get('height');
  if (height !== undefined && draft.coordinates !== 'geocentric') {
    settleUnit(draft, height);
    if (options.heights === undefined) settleKind(draft, height);
  }
  askHeightOf(draft);
}

function settleUnit(draft: Draft, height: Column): void {
  const stated = statedUnit([height]);
  const asked = draft.doubts.some(({ key, decisive }) => decisive && key === 'layout.units.length');
  if (stated === null || asked) return;
  const units = draft.parts.units;
  const length = (typeof units === 'object' ? units.length : undefined) ?? 'metre';
  if (stated === 'foot') askFoot(draft, 'height', `The name of ${height.label} says feet, not which.`);
  else if (stated !== length) setUnits(draft, { height: stated });
}

function settleKind(draft: Draft, height: Column): void {
  const question = 'Are the heights ellipsoidal, or orthometric (above sea level)?';
  const common = {
    code: 'height-kind',
    question,
    key: 'heights.kind',
    choices: ['ellipsoidal', 'orthometric'],
  };
  if (height.name !== '' && soundsOrthometric(height.name)) {
    const because = `Heights named like ${height.label} mostly are orthometric, and the two differ by tens of metres.`;
    draft.doubt({ ...common, because, decisive: true });
    return;
  }
  const isBare = height.name === '' || /^z$/i.test(height.name);
  if (isBare && (draft.coordinates === null || isPlane(draft.coordinates))) {
    const because = `Nothing in the file says which heights stand in ${height.label} of this list of plane coordinates.`;
    draft.doubt({ ...common, because, decisive: false });
  }
}

function askHeightOf(draft: Draft): void {
  const rod = draft.roles.get('antennaHeight');
  const lengths = rod?.numbers?.filter((value) => value !== 0) ?? [];
  if (rod === undefined || lengths.length === 0) return;
  draft.doubt({
    code: 'height-of',
    question: 'Are the heights those of the mark, or of the antenna?',
    because: `There are antenna heights such as ${rod.texts.find((text) => Number(text) !== 0)} in ${rod.label}, and nothing says whether they were subtracted already.`,
    key: 'layout.heightOf',
    choices: ['mark', 'antenna'],
    decisive: true,
  });
}
