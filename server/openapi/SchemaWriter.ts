import { z } from 'zod';
import { namedSchemas } from './namedSchemas.js';

export type JsonObject = Record<string, unknown>;

const localPrefix = '#/$defs/';
const sharedPrefix = '#/components/schemas/';

const common = {
  unrepresentable: 'any',
  // A format says it already; the long pattern beside it only hides it from readers.
  override: ({ jsonSchema }: { jsonSchema: z.core.JSONSchema.BaseSchema }) => {
    if (jsonSchema.format) delete jsonSchema.pattern;
  },
} as const;

function pointIntoComponents(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(pointIntoComponents);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, inner]) =>
      key === '$ref' && typeof inner === 'string' && inner.startsWith(localPrefix)
        ? [key, inner.replace(localPrefix, sharedPrefix)]
        : [key, pointIntoComponents(inner)],
    ),
  );
}

/** Turns zod schemas into the JSON Schema of OpenAPI 3.1 and collects those that have a name. */
export class SchemaWriter {
  readonly components: Record<string, unknown> = {};

  /** What a caller may send: defaults are optional here. Written out in place. */
  request(schema: z.ZodType): JsonObject {
    const { $schema: _dialect, ...json } = z.toJSONSchema(schema, { ...common, io: 'input' });
    return json;
  }

  /** What a caller gets; named schemas become references. */
  response(schema: z.ZodType): JsonObject {
    const {
      $schema: _dialect,
      $defs = {},
      id: _id,
      ...json
    } = z.toJSONSchema(schema, { ...common, io: 'output', metadata: namedSchemas });
    for (const [name, definition] of Object.entries($defs)) this.addComponent(name, definition);
    const name = namedSchemas.get(schema)?.id;
    if (!name) return pointIntoComponents(json) as JsonObject;
    this.addComponent(name, json);
    return { $ref: `${sharedPrefix}${name}` };
  }

  private addComponent(name: string, definition: object): void {
    const { id: _id, ...rest } = definition as JsonObject;
    this.components[name] ??= pointIntoComponents(rest);
  }
}
