/** The oldest Node.js that runs this package: `engines` of package.json, which a test compares. */
const OLDEST = [20, 19] as const;

/** One line for the user of a Node.js that is too old; null for one that will do. */
export function tooOld(version: string): string | null {
  const [major = 0, minor = 0] = version.split('.').map(Number);
  const willDo = major > OLDEST[0] || (major === OLDEST[0] && minor >= OLDEST[1]);
  return willDo
    ? null
    : `error: Expected Node.js ${OLDEST.join('.')} or newer, came ${version}. Install a newer one from your system or from nodejs.org and run again.`;
}
