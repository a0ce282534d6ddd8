/** One setting of the study file, by its path: `logs[0].layout.kind`. */
export interface StatedSetting {
  readonly key: string;
  readonly value: string;
}

/** Every setting with defaults filled in, one a line, in the order of the study file. */
export function flatSettings(settings: unknown, key = ''): StatedSetting[] {
  if (settings === undefined) return [];
  if (settings === null || typeof settings !== 'object') return [{ key, value: String(settings) }];
  const parts = Array.isArray(settings)
    ? settings.map((part, k): [string, unknown] => [`${key}[${k}]`, part])
    : Object.entries(settings).map(([name, part]): [string, unknown] => [
        key === '' ? name : `${key}.${name}`,
        part,
      ]);
  // An empty list is a setting too.
  if (parts.length === 0) return key === '' ? [] : [{ key, value: Array.isArray(settings) ? '[]' : '{}' }];
  return parts.flatMap(([path, part]) => flatSettings(part, path));
}
