import { chooseDelimiter } from '../header.js';
import type { DelimitedLayout } from '../layout.js';
import { type ColumnRole, roleOfHeader } from '../roles.js';
import type { Column } from './columns.js';
import type { Draft } from './draft.js';
import type { HeadText } from './headText.js';
import type { Doubt } from './recognition.js';

/** The layout of a draft: only what the file does not show by itself and no question is about. */
export function draftLayout(draft: Draft, head: HeadText): DelimitedLayout {
  const { sheet, decimal, parts, doubts } = draft;
  const columns = statedColumns(draft);
  const headerless = sheet.header === null;
  const open = new Set(doubts.filter(({ decisive }) => decisive).map(({ key }) => key));
  const time = parts.time ?? {};
  return {
    kind: 'delimited',
    ...(headerless || !isDelimiterShown(draft, head, columns) ? { delimiter: sheet.cut.name } : {}),
    ...(decimal === ',' && !open.has('layout.decimal') ? { decimal: 'comma' } : {}),
    ...(headerless ? { header: false } : {}),
    ...(sheet.skipLines > 0 ? { skipLines: sheet.skipLines } : {}),
    ...(sheet.comment === null || sheet.comment === '#' ? {} : { comment: sheet.comment }),
    ...(head.guessed ? { encoding: head.encoding } : {}),
    ...(Object.keys(columns).length === 0 ? {} : { columns }),
    ...(parts.units === undefined ? {} : { units: parts.units }),
    ...(Object.keys(time).length === 0 ? {} : { time }),
    ...(parts.fromFileName === undefined ? {} : { fromFileName: parts.fromFileName }),
  };
}

/** Roles and the names or numbers of their columns. */
type ColumnReferences = Partial<Record<ColumnRole, string | number>>;

/** Every column with a role, in the order of the file. */
export const allColumns = ({ roles }: Draft): ColumnReferences => references([...roles]);

const references = (roles: readonly (readonly [ColumnRole, Column])[]): ColumnReferences =>
  Object.fromEntries(
    roles.toSorted(([, a], [, b]) => a.index - b.index).map(([role, { reference }]) => [role, reference]),
  );

/** The columns that must be stated, in the order of the file. */
function statedColumns({ sheet, columns, roles }: Draft): ColumnReferences {
  const spelled = (role: ColumnRole): readonly Column[] =>
    columns.filter(({ name }) => name !== '' && roleOfHeader(name) === role);
  const stated = [...roles].filter(([role, column]) => {
    if (sheet.header === null) return true;
    const spelling = spelled(role);
    return spelling.length !== 1 || spelling[0] !== column;
  });
  return references(stated);
}

/** Whether the reader finds the delimiter in the header by itself. */
function isDelimiterShown(
  { sheet }: Draft,
  { lines }: HeadText,
  columns: DelimitedLayout['columns'],
): boolean {
  const line = lines[sheet.header!.row - 1]!.text;
  return chooseDelimiter(line, { columns, required: [] }) === sheet.cut.character;
}

/** What the structure of the file leaves open: lines that are passed over, letters, names in comments. */
export function structureDoubts({ sheet, isNameless }: Draft, head: HeadText): Doubt[] {
  const doubts: Doubt[] = [];
  if (sheet.titles.length > 0) {
    const first = sheet.titles[0]!;
    doubts.push({
      code: 'title-lines',
      question: `Are the lines above line ${sheet.skipLines + 1} rightly passed over?`,
      because: `They do not look like ${sheet.header === null ? 'the rows below' : 'a header'}; line ${first.row} begins with ${JSON.stringify(first.text.trim().slice(0, 40))}.`,
      key: 'layout.skipLines',
      choices: [],
      decisive: false,
    });
  }
  if (head.guessed) {
    doubts.push({
      code: 'encoding',
      question: 'Are the letters in the rows below right?',
      because: 'The bytes are no UTF-8, and the code of western Europe is a guess.',
      key: 'layout.encoding',
      choices: ['latin1'],
      decisive: false,
    });
  }
  if (!isNameless && sheet.looseNames !== null) {
    doubts.push({
      code: 'names-above',
      question: 'Do the words above the rows name their columns?',
      because:
        'They are as many as the rows have cells, and some are names of columns, but they cannot be read as a header.',
      key: 'layout.columns',
      choices: [],
      decisive: false,
    });
  }
  return doubts;
}
