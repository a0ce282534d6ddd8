import { describe, expect, it } from 'vitest';
import { resultsJsonSchema, studyJsonSchema } from '../../src/study/index.js';

interface Schema {
  readonly $schema?: string;
  readonly title?: string;
  readonly type?: string;
  readonly description?: string;
  readonly required?: readonly string[];
  readonly additionalProperties?: unknown;
  readonly properties?: Readonly<Record<string, Schema>>;
}

describe('JSON Schemas', () => {
  it('of the study file explains its keys and requires three', () => {
    const schema = studyJsonSchema() as Schema;
    expect(schema).toMatchObject({
      $schema: 'https://json-schema.org/draft/2020-12/schema',
      title: 'ppmwise study file',
      type: 'object',
      additionalProperties: false,
    });
    expect([...schema.required!].sort()).toEqual(['bases', 'logs', 'marks']);
    const explained = Object.entries(schema.properties!).filter(([, { description }]) => description);
    expect(explained.map(([key]) => key)).toEqual(
      expect.arrayContaining(['title', 'timeZone', 'marks', 'bases', 'period', 'tolerances', 'specSheet']),
    );
    expect(JSON.stringify(schema)).toContain('"pattern":"^\\\\d{4}-\\\\d{2}-\\\\d{2}$"');
  });

  it('of the results requires every key that is written', () => {
    const schema = resultsJsonSchema() as Schema;
    expect(schema.title).toBe('ppmwise results');
    expect([...schema.required!].sort()).toEqual(Object.keys(schema.properties!).sort());
    expect(schema.properties!.version).toMatchObject({ const: 1 });
  });

  it('are JSON', () => {
    for (const schema of [studyJsonSchema(), resultsJsonSchema()]) {
      expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
    }
  });
});
