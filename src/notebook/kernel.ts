import { createRequire } from 'node:module';

/** One output of a cell in several forms; the reader's program takes the richest that it can show. */
export interface DisplayBundle {
  /** Media type → content; pictures in base64. */
  readonly data: Readonly<Record<string, string>>;
  readonly metadata: Readonly<Record<string, unknown>>;
}

/** Sends a bundle to the cell that is running. */
export type SendBundle = (bundle: DisplayBundle) => void;

interface KernelModule {
  readonly lastWriteDisplayData?:
    | ((content: DisplayBundle & { readonly transient: object }, update: boolean) => void)
    | null;
}

/**
 * The way to the running cell of a tslab notebook, or null outside of one. The kernel is asked through its own module,
 * which is there already when a cell runs; nothing is loaded for the question. Its public `display` sends one media
 * type a call and would show a chart twice, as picture and as text.
 * @param mainScript path of the script that the process was started with
 */
export function runningCell(mainScript: string | undefined = process.argv[1]): SendBundle | null {
  if (mainScript === undefined) return null;
  const require = createRequire(mainScript);
  const path = resolved(require);
  const kernel = path === null ? undefined : (require.cache[path]?.exports as KernelModule | undefined);
  const send = kernel?.lastWriteDisplayData ?? null;
  return send === null ? null : (bundle) => send({ ...bundle, transient: {} }, false);
}

/** Null when there is no tslab where the main script would look for it. */
function resolved(require: NodeJS.Require): string | null {
  try {
    return require.resolve('tslab/dist/jupyter.js');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'MODULE_NOT_FOUND') return null;
    throw error;
  }
}
