import proj4 from 'proj4';
import { crsOfKind } from './crs/index.js';

/** Keys whose value is one number. */
const NUMBER_KEYS = new Set(
  'a b rf r zone lat_0 lat_1 lat_2 lat_ts lon_0 lon_1 lon_2 lonc alpha gamma x_0 y_0 k k_0 to_meter h'.split(
    ' ',
  ),
);
/** Other keys that have a meaning for a projection. */
const OTHER_KEYS = new Set(
  'proj ellps datum south units pm axis approx no_uoff no_off no_rot sweep r_a'.split(' '),
);
/** Keys of frames, heights and bookkeeping: they do not touch the projection and are taken out. */
const LEFT_ASIDE = new Set('towgs84 nadgrids geoidgrids vunits no_defs wktext type'.split(' '));
const NOT_PLANE = new Set(['longlat', 'identity', 'geocent', 'geocentric']);

/** Fields of the projection library's object that tell whether it knew a name; it takes unknown names silently. */
interface KnownFields {
  readonly a?: number;
  readonly b?: number;
  readonly datumName?: string;
  readonly to_meter?: number;
  readonly from_greenwich?: number;
}

function fieldsOf(parameter: string): KnownFields {
  return new proj4.Proj(`+proj=longlat ${parameter}`) as unknown as KnownFields;
}

/** The library falls back to WGS 84 for an ellipsoid that it does not know. */
function knowsEllipsoid(name: string): boolean {
  const fallback = fieldsOf('+ellps=WGS84');
  const found = fieldsOf(`+ellps=${name}`);
  return name.toLowerCase() === 'wgs84' || found.a !== fallback.a || found.b !== fallback.b;
}

/** Why a name cannot be used, or undefined when it can. */
function unknownName(key: string, value: string): string | undefined {
  if (key === 'ellps' && !knowsEllipsoid(value)) return 'no ellipsoid of this name is known';
  if (key === 'datum' && fieldsOf(`+datum=${value}`).datumName === undefined)
    return 'no datum of this name is known';
  if (key === 'units' && value !== 'm' && fieldsOf(`+units=${value}`).to_meter === undefined)
    return 'no unit of this name is known';
  if (key === 'pm' && !Number.isFinite(fieldsOf(`+pm=${value}`).from_greenwich))
    return 'no prime meridian of this name is known';
  return undefined;
}

function refuse(definition: string, reason: string): never {
  throw new Error(
    `projection "${definition}": ${reason}; expected a proj string of a map projection, e.g. "+proj=utm +zone=31 +ellps=WGS84"`,
  );
}

function checkParameter(definition: string, parameter: string, key: string, value: string): void {
  if (!NUMBER_KEYS.has(key) && !OTHER_KEYS.has(key)) refuse(definition, `${parameter} is not supported`);
  if (NUMBER_KEYS.has(key) && (value === '' || !Number.isFinite(Number(value))))
    refuse(definition, `${parameter} is not a decimal number`);
  if (key === 'zone' && !(Number.isInteger(Number(value)) && Number(value) >= 1 && Number(value) <= 60))
    refuse(definition, `${parameter} is not a zone from 1 to 60`);
  const unknown = unknownName(key, value);
  if (unknown) refuse(definition, `${parameter}: ${unknown}`);
}

/**
 * A definition that the projection library can be trusted with: every parameter is known and well formed, it is a map
 * projection, and nothing in it asks for a change of frame.
 * @throws Error naming the definition, the parameter and what was expected.
 */
export function checkedDefinition(definition: string): string {
  const text = definition.trim();
  if (!text.startsWith('+')) return checkedDefinition(definitionOfCode(definition));
  const kept: string[] = [];
  let name = '';
  for (const parameter of text.split(/\s+/)) {
    const [rawKey = '', value = ''] = parameter.slice(1).split('=', 2);
    const key = rawKey.toLowerCase();
    if (!parameter.startsWith('+') || key === '') refuse(definition, `"${parameter}" is not a parameter`);
    if (LEFT_ASIDE.has(key)) continue;
    checkParameter(definition, parameter, key, value);
    if (key === 'proj') name = value;
    kept.push(parameter);
  }
  if (name === '') refuse(definition, '+proj is missing');
  const projName = (libraryName(name) ?? refuse(definition, `+proj=${name} is not known`)).toLowerCase();
  if (NOT_PLANE.has(projName)) refuse(definition, `+proj=${name} is not a map projection`);
  return kept.join(' ');
}

/** @throws Error for text that is no code, an unknown code, or one of coordinates that are not on a plane. */
function definitionOfCode(definition: string): string {
  try {
    return crsOfKind(definition, 'projected').projString;
  } catch (error) {
    return refuse(definition, (error as Error).message);
  }
}

/** First of the library's names for a projection, or undefined when it has none. */
function libraryName(name: string): string | undefined {
  const registry = proj4.Proj as unknown as {
    readonly projections: { get(name: string): { readonly names?: readonly string[] } | null | undefined };
  };
  return registry.projections.get(name)?.names?.[0];
}
