import { studySchema } from './settings.js';

/** Keys that the schema allows at a path. */
export function knownKeys(path: readonly PropertyKey[]): string[] {
  let schema: unknown = studySchema;
  for (const step of path) {
    const { def } = unwrapped(schema);
    schema = typeof step === 'number' ? def.element : def.shape?.[String(step)];
  }
  const { shape, keyType } = unwrapped(schema).def;
  return Object.keys(shape ?? keyType?.def.entries ?? {});
}

/** What is looked at of a schema's inside. */
interface Definition {
  readonly element?: unknown;
  readonly shape?: Record<string, unknown>;
  readonly keyType?: { readonly def: { readonly entries?: Record<string, string> } };
  readonly innerType?: unknown;
  readonly options?: unknown;
}

/** The object schema inside optional, default, described and union wrappers. */
function unwrapped(schema: unknown): { def: Definition } {
  let current = schema as { def?: Definition } | undefined;
  while (current?.def !== undefined) {
    const { innerType, options } = current.def;
    if (innerType !== undefined) current = innerType as typeof current;
    else if (Array.isArray(options))
      current = options.find((option) => 'shape' in (option as { def: object }).def);
    else return { def: current.def };
  }
  return { def: {} };
}
