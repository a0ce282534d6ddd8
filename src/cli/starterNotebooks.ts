import { cp, mkdir, readdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { packageFolder } from './package.js';

/**
 * The notebooks with their outputs, and the kernel file, in a starter study. They show the demo study until the path in
 * their first cell is changed, because a study without logs has nothing to show.
 */
export async function writeStarterNotebooks(folder: string): Promise<void> {
  const source = join(packageFolder(), 'notebooks');
  await mkdir(join(folder, 'notebooks'), { recursive: true });
  for (const name of (await readdir(source)).filter((file) => /^\d\d-.*\.ipynb$/.test(file))) {
    const text = await readFile(join(source, name), 'utf8');
    await writeFile(join(folder, 'notebooks', name), text.replaceAll('../datasets-demo/', '../demo/'));
  }
  await cp(join(packageFolder(), '.jupyter'), join(folder, '.jupyter'), { recursive: true });
}
