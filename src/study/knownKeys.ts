import { studySchema } from './settings.js';

/**
 * Keys that the schema allows at a path.
 * @param value what was written; of alternatives told apart by `kind` the one that it names counts
 */
export function knownKeys(path: readonly PropertyKey[], value: unknown): string[] {
  let schema: unknown = studySchema;
  let written = value;
  for (const step of path) {
    const { def } = unwrapped(schema, written);
    schema = typeof step === 'number' ? def.element : def.shape?.[String(step)];
    written = (written as Record<PropertyKey, unknown> | null | undefined)?.[step];
  }
  const { shape, keyType } = unwrapped(schema, written).def;
  return Object.keys(shape ?? keyType?.def.entries ?? {});
}

/** What is looked at of a schema's inside. */
interface Definition {
  readonly element?: unknown;
  readonly shape?: Record<string, unknown>;
  readonly keyType?: { readonly def: { readonly entries?: Record<string, string> } };
  readonly innerType?: unknown;
  readonly options?: unknown;
  readonly values?: readonly unknown[];
}

/** The object schema inside optional, default, described and union wrappers. */
function unwrapped(schema: unknown, written: unknown): { def: Definition } {
  let current = schema as { def?: Definition } | undefined;
  while (current?.def !== undefined) {
    const { innerType, options } = current.def;
    if (innerType !== undefined) current = innerType as typeof current;
    else if (Array.isArray(options)) {
      const objects = options.filter((option) => 'shape' in (option as { def: object }).def);
      current = objects.find((option) => isOfKind(option, written)) ?? objects[0];
    } else return { def: current.def };
  }
  return { def: {} };
}

function isOfKind(option: { def: Definition }, written: unknown): boolean {
  const kind = (option.def.shape?.kind as { def: Definition } | undefined)?.def.values;
  return kind?.includes((written as { kind?: unknown } | null)?.kind) ?? false;
}
