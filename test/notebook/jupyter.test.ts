import { execFile, spawn } from 'node:child_process';
import { copyFileSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { type Browser, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { emptyFolder, REPOSITORY } from '../cli/ppmwise.js';
import { chromiumPath, noFrontEnd, noNbconvert } from './jupyter.js';

const run = promisify(execFile);
const NOTEBOOKS = join(REPOSITORY, 'notebooks');
const names = readdirSync(NOTEBOOKS).filter((name) => /^\d\d-.*\.ipynb$/.test(name));
const MINUTES = 60_000;

/** The first of the notebooks and one with a mistake, under names that are never committed: Jupyter saves what it shows. */
const copies = ['01-own-ppm', 'mistake'].map((name) => `executed-${process.pid}-browser-${name}.ipynb`);
const [firstCopy, mistakeCopy] = copies as [string, string];

describe.skipIf(noNbconvert !== null)(
  `nbconvert${noNbconvert === null ? '' : ` (skipped: ${noNbconvert})`}`,
  () => {
    const folder = emptyFolder();
    it.each(names)(
      'executes %s',
      async (name) => {
        const args = ['nbconvert', '--to', 'html', '--execute', '--output-dir', folder, `notebooks/${name}`];
        const { stderr } = await run('jupyter', args, {
          cwd: REPOSITORY,
          env: { ...process.env, JUPYTER_PATH: join(REPOSITORY, '.jupyter') },
        });
        expect(stderr).not.toContain('Error');
        const page = readFileSync(join(folder, name.replace('.ipynb', '.html')), 'utf8');
        expect(page).toContain('data:image/png;base64,');
        expect(page).not.toContain('data-mime-type="application/vnd.jupyter.stderr"');
      },
      10 * MINUTES,
    );
  },
);

describe.skipIf(noFrontEnd !== null)(
  `Jupyter in a browser${noFrontEnd === null ? '' : ` (skipped: ${noFrontEnd})`}`,
  () => {
    let server: { readonly address: string; readonly stop: () => void };
    let browser: Browser;
    beforeAll(async () => {
      server = await jupyter();
      browser = await chromium.launch({ executablePath: chromiumPath(), args: ['--no-sandbox'] });
    }, 3 * MINUTES);
    afterAll(async () => {
      await browser?.close();
      server?.stop();
      for (const name of copies) rmSync(join(NOTEBOOKS, name), { force: true });
    });

    it(
      'runs all cells of 01-own-ppm, and shows the charts and no error',
      async () => {
        copyFileSync(join(NOTEBOOKS, '01-own-ppm.ipynb'), join(NOTEBOOKS, firstCopy));
        const page = await opened(browser, `${server.address}/notebooks/${firstCopy}`);
        const outcome = await runAll(page);
        expect(outcome.errors).toEqual([]);
        expect(outcome.unfinished).toBe(0);
        expect(outcome.pictures.length).toBeGreaterThanOrEqual(3);
        for (const { width, height } of outcome.pictures) {
          expect(width).toBeGreaterThan(300);
          expect(height).toBeGreaterThan(200);
        }
        expect(outcome.text).toContain('10450 rows read');
        expect(outcome.tables).toBeGreaterThanOrEqual(4);
        await page.close();
      },
      5 * MINUTES,
    );

    it.each([
      [
        'a notebook in the wrong folder says where files are looked for',
        "import * as ppmwise from 'ppmwise';\nawait ppmwise.readStudy('../demo/study.yaml');",
        /Expected a study file, came a path that does not exist\. .* A notebook looks for files from its own folder/,
      ],
    ])(
      '%s',
      async (_, source, expected) => {
        writeFileSync(join(NOTEBOOKS, mistakeCopy), notebookOf(source));
        const page = await opened(browser, `${server.address}/notebooks/${mistakeCopy}`);
        const outcome = await runAll(page);
        expect(outcome.errors).toHaveLength(1);
        expect(outcome.errors[0]).toMatch(expected);
        expect(outcome.errors[0]!.trim().split('\n')).toHaveLength(1);
        await page.close();
      },
      3 * MINUTES,
    );
  },
);

/** A notebook with one cell. */
const notebookOf = (source: string): string =>
  JSON.stringify({
    cells: [{ cell_type: 'code', execution_count: null, metadata: {}, outputs: [], source: [source] }],
    metadata: { kernelspec: { display_name: 'TypeScript (tslab)', language: 'typescript', name: 'tslab' } },
    nbformat: 4,
    nbformat_minor: 4,
  });

/** Brings Jupyter up as `npm run notebook` does, and waits until it answers. */
async function jupyter(): Promise<{ readonly address: string; readonly stop: () => void }> {
  const port = await freePort();
  const main = join(REPOSITORY, 'dist/cli/main.js');
  const options = ['--no-browser', `--port=${port}`, '--NotebookApp.token=', '--NotebookApp.password='];
  const child = spawn(process.execPath, [main, 'notebook', ...options], { cwd: REPOSITORY });
  let told = '';
  child.stderr.on('data', (chunk) => {
    told += chunk;
  });
  const address = `http://127.0.0.1:${port}`;
  for (let second = 0; second < 120; second++) {
    if (child.exitCode !== null) break;
    const answer = await fetch(`${address}/api/status`).catch(() => null);
    if (answer?.ok) return { address, stop: () => child.kill('SIGTERM') };
    await new Promise((resolve) => setTimeout(resolve, 1000));
  }
  child.kill('SIGTERM');
  throw new Error(`Jupyter did not come up:\n${told}`);
}

function freePort(): Promise<number> {
  return new Promise((resolve) => {
    const server = createServer().listen(0, '127.0.0.1', () => {
      const { port } = server.address() as { port: number };
      server.close(() => resolve(port));
    });
  });
}

async function opened(browser: Browser, address: string): Promise<Page> {
  const page = await browser.newPage();
  await page.goto(address);
  await page.waitForFunction('window.Jupyter?.notebook?.kernel?.is_connected?.()', null, {
    timeout: 2 * MINUTES,
  });
  return page;
}

interface Outcome {
  /** What cells wrote on their error stream. */
  readonly errors: readonly string[];
  /** Cells that still run or wait. */
  readonly unfinished: number;
  readonly pictures: readonly { readonly width: number; readonly height: number }[];
  readonly tables: number;
  readonly text: string;
}

/** Clears what the notebook was saved with, chooses "Run All" in the menu, waits until the kernel rests, and looks. */
async function runAll(page: Page): Promise<Outcome> {
  await page.evaluate('Jupyter.notebook.clear_all_output()');
  await page.click('#celllink');
  await page.click('#run_all_cells');
  await page.waitForFunction('Jupyter.notebook.kernel_busy', null, { timeout: MINUTES });
  await page.waitForFunction(
    "!Jupyter.notebook.kernel_busy && document.querySelectorAll('.code_cell.running').length === 0",
    null,
    { timeout: 4 * MINUTES },
  );
  await page.waitForTimeout(500);
  return page.evaluate(`({
    errors: [...document.querySelectorAll('.output_stderr, .output_error')].map((e) => e.innerText),
    unfinished: document.querySelectorAll('.code_cell.running').length,
    pictures: [...document.querySelectorAll('.output_png img')].map((i) => ({ width: i.naturalWidth && i.width, height: i.naturalHeight && i.height })),
    tables: document.querySelectorAll('.output_html table').length,
    text: [...document.querySelectorAll('.output_text, .output_stdout')].map((e) => e.innerText).join('\\n'),
  })`) as Promise<Outcome>;
}
