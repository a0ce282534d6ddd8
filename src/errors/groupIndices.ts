/** The places at which each key stands, keys in the order in which they are met. */
export function groupIndices(keys: readonly string[]): Map<string, number[]> {
  const groups = new Map<string, number[]>();
  keys.forEach((key, i) => {
    const list = groups.get(key);
    if (list === undefined) groups.set(key, [i]);
    else list.push(i);
  });
  return groups;
}
