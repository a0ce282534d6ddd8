import { cpSync } from 'node:fs';
import { join } from 'node:path';
import * as ppmwise from '../../src/index.js';
import { ppmwise as commandLine, emptyFolder, REPOSITORY } from '../cli/ppmwise.js';

/**
 * A page with the outputs that its examples give now. Blocks `ts` run one after another as one program, each followed by
 * a block `text` with what it prints; blocks `console` hold commands after `$`, each followed by its output. All of them
 * find the demo study in `demo/`, as in a folder that `ppmwise new` lays out.
 */
export async function withOutputs(page: string): Promise<string> {
  const folder = emptyFolder();
  cpSync(join(REPOSITORY, 'datasets-demo'), join(folder, 'demo'), { recursive: true });
  const printed = await outputsOf(
    [...page.matchAll(PROGRAM)].map(([, code]) => code!),
    folder,
  );
  let k = 0;
  return page
    .replace(PROGRAM, (_, code: string) => `\`\`\`ts\n${code}\`\`\`\n\n\`\`\`text\n${printed[k++]}\`\`\`\n`)
    .replace(CONSOLE, (_, lines: string) => `\`\`\`console\n${ran(lines, folder)}\`\`\`\n`);
}

const PROGRAM = /```ts\n([\s\S]*?)```\n\n```text\n[\s\S]*?```\n/g;
const CONSOLE = /```console\n([\s\S]*?)```\n/g;

/** What each part of a program writes to the console. */
async function outputsOf(parts: readonly string[], folder: string): Promise<string[]> {
  const outputs = parts.map(() => '');
  const names = parts.flatMap((part) =>
    [...part.matchAll(IMPORT)].flatMap(([, list]) => list!.split(/,\s*/)),
  );
  const body = parts
    .map((part, i) => `begin(${i});\n${part.replace(IMPORT, '').replaceAll("'demo/", `'${folder}/demo/`)}`)
    .join('\n');
  const AsyncFunction = Object.getPrototypeOf(async () => {}).constructor;
  let at = 0;
  const begin = (i: number): void => {
    at = i;
  };
  const log = (...values: unknown[]): void => {
    outputs[at] += `${values.join(' ')}\n`;
  };
  await new AsyncFunction('begin', 'console', `{ ${names.join(', ')} }`, body)(begin, { log }, ppmwise);
  return outputs;
}

const IMPORT = /^import \{ ([^}]+) \} from 'ppmwise';\n/gm;

/** Commands with their outputs; a command that fails shows what it says. */
function ran(lines: string, folder: string): string {
  const commands = [...lines.matchAll(/^\$ npx ppmwise (.*)$/gm)].map(([, command]) => command!);
  return commands
    .map((command) => {
      const { out, err } = commandLine(command.split(' '), folder);
      return `$ npx ppmwise ${command}\n${(out + err).replaceAll(`${folder}/`, '')}`;
    })
    .join('');
}
