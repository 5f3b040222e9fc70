import { z } from 'zod';
import { namedSchemas } from './named-schemas';

type JsonObject = Record<string, unknown>;

const names = z.registry<{ id: string }>();
for (const [id, schema] of Object.entries(namedSchemas)) names.add(schema, { id });
const differs = new Map<string, boolean>();
const localPrefix = '#/$defs/';

/**
 * A contract as a JSON Schema for an OpenAPI 3.1 document. Named contracts inside it go into `components` and are
 * referred to; a name that looks different as input and as output gets `Sent` added for the input.
 */
export function toSchemaObject(
  schema: z.ZodType,
  io: 'input' | 'output',
  components: JsonObject,
): JsonObject {
  const { $defs = {}, ...root } = spell(schema, io) as JsonObject & { $defs?: JsonObject };
  delete root.$schema;
  for (const [id, definition] of Object.entries($defs))
    components[componentName(id, io)] ??= withReferences(definition, io);
  return withReferences(root, io) as JsonObject;
}

function spell(schema: z.ZodType, io: 'input' | 'output'): JsonObject {
  return z.toJSONSchema(schema, { metadata: names, io, unrepresentable: 'any' });
}

/** `Recipe` for what is sent and what comes back alike; `RecipeSent` where defaults make the two differ. */
function componentName(id: string, io: 'input' | 'output'): string {
  if (io === 'output' || !(id in namedSchemas)) return id;
  let isDifferent = differs.get(id);
  if (isDifferent === undefined) {
    const schema = namedSchemas[id];
    isDifferent = JSON.stringify(spell(schema, 'input')) !== JSON.stringify(spell(schema, 'output'));
    differs.set(id, isDifferent);
  }
  return isDifferent ? `${id}Sent` : id;
}

function withReferences(value: unknown, io: 'input' | 'output'): unknown {
  if (Array.isArray(value)) return value.map((item) => withReferences(item, io));
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, item]) =>
      key === '$ref' && typeof item === 'string' && item.startsWith(localPrefix)
        ? [key, `#/components/schemas/${componentName(item.slice(localPrefix.length), io)}`]
        : [key, withReferences(item, io)],
    ),
  );
}
