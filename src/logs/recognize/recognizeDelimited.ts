import { type Message, message, quoted } from '../messages.js';
import { sheetColumns } from './columns.js';
import { settleCoordinates } from './coordinateRoles.js';
import { commasCutNumbers, decimalMark, thousandsExample } from './decimalMark.js';
import { Draft } from './draft.js';
import { allColumns, draftLayout, structureDoubts } from './draftLayout.js';
import { findFix, settleFix } from './fixRoles.js';
import { assignByHeader } from './headerRoles.js';
import type { HeadText } from './headText.js';
import { settleHeights } from './heights.js';
import { settleLeftColumns } from './leftColumns.js';
import { askForMissing } from './missingColumns.js';
import { findNames, settleMark } from './nameRoles.js';
import { previewRows } from './previewRows.js';
import type { Doubt, Recognition, RecognizeOptions, UnrecognizedLog } from './recognition.js';
import { cutSheet, type NoSheet, type Sheet } from './sheet.js';
import { findNumericTimes, findWrittenTimes, settleTimeOfDay } from './timeColumns.js';
import { settleTimes } from './timeLayout.js';
import { type Trial, tryLayout } from './tryLayout.js';

/** Recognises delimited text by its first lines. */
export function recognizeDelimited(head: HeadText, fileName: string, options: RecognizeOptions): Recognition {
  const sheet = cutSheet(head.lines);
  const refusal = typeof sheet === 'string' ? noSheet(sheet, fileName) : unusable(sheet, fileName);
  if (refusal !== null || typeof sheet === 'string') return unrecognized(refusal!);
  const { decimal, doubt } = decimalMark(sheet);
  const draft = new Draft(sheet, sheetColumns(sheet, decimal), decimal);
  if (doubt !== null) draft.doubt(doubt);

  assignByHeader(draft);
  const named = draft.roles.size;
  settleTimeOfDay(draft);
  findWrittenTimes(draft);
  findFix(draft);
  settleCoordinates(draft, options);
  if (named < 2 && draft.coordinates === null && !draft.doubts.some(({ code }) => code === 'projection')) {
    return unrecognized(notALog(sheet, fileName));
  }
  findNumericTimes(draft);
  findNames(draft);
  settleTimes(draft, fileName, options);
  settleHeights(draft, options);
  settleMark(draft);
  settleFix(draft);
  askForMissing(draft, options);
  settleLeftColumns(draft);

  const layout = draftLayout(draft, head);
  const asked = [...draft.doubts, ...structureDoubts(draft, head)];
  const { coordinates } = draft;
  if (coordinates !== null && !asked.some(({ decisive }) => decisive)) {
    asked.push(...trialDoubts(tryLayout(head, layout, coordinates, fileName, options)));
  }
  const unsure = [...asked].sort((a, b) => Number(b.decisive) - Number(a.decisive));
  const complete = !unsure.some(({ decisive }) => decisive);
  const preview = previewRows(draft, layout, fileName, options);
  const columns = allColumns(draft);
  return { kind: 'recognized', file: fileName, layout, columns, coordinates, preview, unsure, complete };
}

/** Rows that cannot be read though nothing was asked: a few are damaged ones, all of them are a wrong layout. */
function trialDoubts({ rows, refusals }: Trial): Doubt[] {
  if (refusals.length === 0) return [];
  return [
    {
      code: 'unreadable-rows',
      question: 'Is the file read as it was meant?',
      because: `Of the first ${rows} rows ${refusals.length} cannot be read, the first: ${refusals[0]}.`,
      key: 'layout',
      choices: [],
      decisive: refusals.length === rows,
    },
  ];
}

const unrecognized = (told: Message): UnrecognizedLog => ({
  kind: 'unrecognized',
  message: told,
  unsure: [],
});

function noSheet(why: NoSheet, file: string): Message {
  if (why === 'no-rows') {
    return message(
      'error',
      'no-rows',
      'Expected rows of cells with coordinates, came text without such rows. Export the positions as CSV and name that file.',
      { file },
    );
  }
  const came = why === 'empty' ? 'an empty file' : 'a header alone';
  return message('error', 'empty-log', `Expected a header and positions, came ${came}. Export it again.`, {
    file,
  });
}

function unusable(sheet: Sheet, file: string): Message | null {
  const thousands = thousandsExample(sheet);
  if (thousands !== null) {
    return message(
      'error',
      'thousands-marks',
      `Expected plain numbers, came numbers with marks between thousands like ${quoted(thousands)}. Export them without these marks.`,
      { file, row: sheet.rows[0]!.row },
    );
  }
  if (commasCutNumbers(sheet)) {
    return message(
      'error',
      'decimal-commas',
      `Expected ${sheet.header!.cells.length} cells a row as in the header, came ${sheet.cut.width}: the commas between cells and the decimal commas cannot be told apart. Export with semicolons between cells or with decimal points.`,
      { file, row: sheet.rows[0]!.row },
    );
  }
  return null;
}

function notALog({ rows }: Sheet, file: string): Message {
  const line = rows[0];
  return message(
    'error',
    'no-coordinates',
    `Expected columns with coordinates, came rows like ${quoted(line?.cells.join(' ') ?? '')} in which none were found. Write the names of the columns into the first line or state the layout.`,
    { file, ...(line === undefined ? {} : { row: line.row }) },
  );
}
