import { type Document, isScalar, LineCounter, parseDocument, visit } from 'yaml';
import { InputError, inputError, type Message, message } from '../logs/index.js';
import { issueMessages } from './issueMessages.js';
import { type PlaceOf, placeFunction } from './places.js';
import { type StudySettings, studySchema } from './settings.js';

/** Settings, and where each of them stands. */
export interface ParsedStudy {
  readonly settings: StudySettings;
  readonly placeOf: PlaceOf;
}

/** Once a file is out of step every further line may seem wrong: so many mistakes are told. */
const MOST_YAML_MISTAKES = 5;

/** Between double quotes a backslash begins an escape sequence. */
const SINGLE_QUOTES =
  "Put a pattern or path with backslashes in single quotes, such as 'CHK (\\d+)': between them a backslash is one.";

/**
 * Text of a study file → settings.
 * @throws InputError with one message for every mistake: line, key, what was expected, what came
 */
export function parseStudyText(text: string, file: string): ParsedStudy {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, prettyErrors: false });
  const mistakes: Message[] = [];
  const broken = (fault: string, offset: number, remedy = 'Correct the line.'): void => {
    const { line } = lines.linePos(offset);
    const sentences = `The file is not valid YAML: ${sentence(fault)} ${remedy}`;
    // A pattern with several backslashes has the same mistake several times.
    if (mistakes.some(({ text: told, row }) => told === sentences && row === line)) return;
    mistakes.push(message('error', 'broken-yaml', sentences, { file, row: line }));
  };
  for (const { code, message: fault, pos } of document.errors) {
    if (code === 'MULTIPLE_DOCS') broken('a line of three dashes begins a second document', pos[0]);
    else broken(fault, pos[0], code === 'BAD_DQ_ESCAPE' ? SINGLE_QUOTES : undefined);
  }
  visit(document, {
    Alias(_, alias) {
      // A pattern such as *.csv is a reference to elsewhere, unless it is quoted.
      if (alias.resolve(document) === undefined)
        broken(`a text that begins with * needs quotes: "*${alias.source}"`, alias.range![0]);
    },
    Pair(_, { key }) {
      if (!isScalar(key)) broken('a key is not a plain text', (key as { range?: [number] }).range?.[0] ?? 0);
    },
  });
  if (mistakes.length > 0) throw new InputError(mistakes.slice(0, MOST_YAML_MISTAKES));
  const value = contents(document, file) ?? {};
  const result = studySchema.safeParse(value);
  const placeOf = placeFunction(document, lines, file);
  if (result.success) return { settings: result.data, placeOf };
  throw new InputError(result.error.issues.flatMap((issue) => issueMessages(issue, value, placeOf)));
}

/** @throws InputError when references inside the file multiply beyond measure */
function contents(document: Document, file: string): unknown {
  try {
    return document.toJS();
  } catch (error) {
    throw inputError(
      'broken-yaml',
      `The file is not valid YAML: ${sentence((error as Error).message)} Write out what is referred to.`,
      { file },
    );
  }
}

const sentence = (fault: string): string => `${fault.trim().replace(/[.:]$/, '')}.`;
