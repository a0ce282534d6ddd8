/*
 * Runs notebooks with the kernel's own converter and executor, without Jupyter or Python:
 *   node notebooks/run-notebook.cjs [--in-place] NOTEBOOK…
 * --in-place keeps the outputs in the file. Exit 1 with the cell and its error when a cell fails.
 */
const fs = require('node:fs');
const path = require('node:path');
const { createRequire } = require('node:module');
const { spawnSync } = require('node:child_process');
const { cannotImport, nodeTooOld, withPlainAnswers } = require('../.jupyter/kernels/tslab/kernel.cjs');

const args = process.argv.slice(2);
const inPlace = args.includes('--in-place');
const files = args.filter((arg) => arg !== '--in-place').map((file) => path.resolve(file));

function fail(text) {
  process.stderr.write(`${text}\n`);
  process.exit(1);
}

if (files.length === 0)
  fail('Expected at least one notebook. Call: node notebooks/run-notebook.cjs [--in-place] NOTEBOOK…');

if (files.length > 1) {
  // A notebook changes folder and takes over the output: each gets a process of its own.
  for (const file of files) {
    const run = spawnSync(process.execPath, [__filename, ...(inPlace ? ['--in-place'] : []), file], {
      stdio: 'inherit',
    });
    if (run.status !== 0) process.exit(run.status ?? 1);
  }
} else void runNotebook(files[0]);

async function runNotebook(file) {
  if (!fs.existsSync(file)) fail(`Expected a notebook, there is no file ${file}. Correct the name.`);
  const notebook = JSON.parse(fs.readFileSync(file, 'utf8'));
  process.chdir(path.dirname(file)); // as Jupyter does
  const told = nodeTooOld(process.versions.node) ?? cannotImport(process.cwd());
  if (told !== null) fail(told);
  const fromNotebook = createRequire(file);
  const kernel = path.join(path.dirname(fromNotebook.resolve('tslab/package.json')), 'dist');
  const { createConverter } = require(path.join(kernel, 'converter.js'));
  const { createExecutor } = require(path.join(kernel, 'executor.js'));
  const jupyter = require(path.join(kernel, 'jupyter.js'));
  const converter = createConverter({ isJS: false, isBrowser: false });
  const executor = withPlainAnswers(createExecutor)(
    process.cwd(),
    { node: converter, close: () => converter.close() },
    console,
  );

  let outputs = [];
  const write = { stdout: process.stdout.write, stderr: process.stderr.write };
  const capture = (name) => (chunk) => {
    const text = typeof chunk === 'string' ? chunk : Buffer.from(chunk).toString();
    const last = outputs.at(-1);
    if (last?.output_type === 'stream' && last.name === name) last.text += text;
    else outputs.push({ name, output_type: 'stream', text });
    return true;
  };
  jupyter.lastWriteDisplayData = ({ data, metadata }) => {
    outputs.push({ data, metadata: metadata ?? {}, output_type: 'display_data' });
  };

  let count = 0;
  for (const cell of notebook.cells) {
    const source = [].concat(cell.source).join('');
    if (cell.cell_type !== 'code' || source.trim() === '') continue;
    outputs = [];
    process.stdout.write = capture('stdout');
    process.stderr.write = capture('stderr');
    let ok = false;
    try {
      ok = await executor.execute(source);
    } finally {
      process.stdout.write = write.stdout;
      process.stderr.write = write.stderr;
    }
    count += 1;
    cell.execution_count = count;
    cell.outputs = outputs;
    if (!ok) {
      const told = outputs.map(({ text }) => text ?? '').join('');
      process.stderr.write(`${path.basename(file)}, cell ${count} failed:\n${source}\n---\n${told}\n`);
      process.exitCode = 1;
      break;
    }
  }
  executor.close();
  if (inPlace && process.exitCode !== 1) fs.writeFileSync(file, `${JSON.stringify(notebook, null, 1)}\n`);
  if (process.exitCode !== 1) process.stdout.write(`${path.basename(file)}: ${count} cells ran\n`);
}
