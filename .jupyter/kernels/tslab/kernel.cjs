/*
 * Starts the notebook kernel tslab of the folder that holds this .jupyter, and answers in one line where a notebook
 * cannot work: Node.js too old, kernel not installed, ppmwise not installed or not built, notebook in another folder.
 * Jupyter calls it with the file of its connection; `notebooks/run-notebook.cjs` of the repository shares the answers.
 */
const fs = require('node:fs');
const path = require('node:path');
const { createRequire } = require('node:module');

const OLDEST_NODE = [20, 19];
const PROJECT = path.resolve(__dirname, '../../..');

/** Null when this Node.js will do. */
function nodeTooOld(version) {
  const [major, minor] = version.split('.').map(Number);
  if (major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1])) return null;
  return `Expected Node.js ${OLDEST_NODE.join('.')} or newer, came ${version}. Install a newer one and start Jupyter again.`;
}

/** The file that a name leads to from a folder, null when there is none. */
function resolved(folder, name) {
  try {
    const file = createRequire(path.join(folder, 'any.cjs')).resolve(name);
    return fs.existsSync(file) ? file : null;
  } catch (error) {
    if (error.code === 'MODULE_NOT_FOUND') return null;
    throw error;
  }
}

/** What to do before a notebook in a folder can import ppmwise; null when it can. */
function cannotImport(folder) {
  if (resolved(folder, 'ppmwise') !== null) return null;
  if (resolved(folder, 'ppmwise/package.json') !== null)
    return 'The package ppmwise is not built. Run "npm run build" in the copy of the repository and restart the kernel.';
  return `The package ppmwise is not found from the folder ${folder}. Move the notebook into notebooks/ of the folder that "ppmwise new" laid out, or run "npm install" there, and restart the kernel.`;
}

/** The executor of tslab, with one line where ppmwise is missing and no stack trace for a mistake in a study or a file. */
function withPlainAnswers(createExecutor) {
  return (folder, converters, console) => {
    const plain = {
      ...console,
      error: (first, ...more) =>
        first?.name === 'InputError' && more.length === 0
          ? console.error(`${first.message} A notebook looks for files from its own folder, ${folder}.`)
          : console.error(first, ...more),
    };
    const executor = createExecutor(folder, converters, plain);
    const execute = executor.execute.bind(executor);
    executor.execute = (source) => {
      const told = /(?:from|require\()\s*['"]ppmwise['"]/.test(source) ? cannotImport(folder) : null;
      if (told === null) return execute(source);
      console.error(told);
      return Promise.resolve(false);
    };
    return executor;
  };
}

function start(configPath) {
  const kernel = resolved(PROJECT, 'tslab/dist/main.js');
  const told =
    nodeTooOld(process.versions.node) ??
    (kernel === null
      ? `Expected the notebook kernel tslab in ${PROJECT}, it is not installed. Run "npm install" there and start Jupyter again.`
      : null);
  if (told !== null) {
    process.stderr.write(`${told}\n`);
    process.exit(1);
  }
  const executor = require(path.join(path.dirname(kernel), 'executor.js'));
  executor.createExecutor = withPlainAnswers(executor.createExecutor);
  require(kernel).startKernel({ configPath, enableFindLocal: false });
}

module.exports = { cannotImport, nodeTooOld, withPlainAnswers };
if (require.main === module) start(process.argv[2]);
