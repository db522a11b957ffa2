import { z } from 'zod';
import { type Fields, isFields, type Path, setOwn } from './paths';

/** A field of the file that the schema does not name. */
export interface UnknownField {
  path: Path;
  value: unknown;
}

/** The fields that a mapping may have by a schema, or nothing where the schema wants no mapping of named fields. */
function shapeOf(schema: z.ZodType): Record<string, z.ZodType> | undefined {
  if (schema instanceof z.ZodObject) return schema.shape as Record<string, z.ZodType>;
  if (!(schema instanceof z.ZodUnion)) return undefined;
  const shapes = (schema.options as z.ZodType[]).map(shapeOf).filter((shape) => shape !== undefined);
  return shapes.length > 0 ? Object.assign({}, ...shapes) : undefined;
}

function bare(schema: z.ZodType): z.ZodType {
  return schema instanceof z.ZodOptional ? bare(schema.unwrap() as z.ZodType) : schema;
}

/**
 * Parts what a schema knows from what it does not, at every depth. The copy in `known` is fit for the strictest reading of the schema and
 * has its fields in the schema's order; paths of `unknown` are relative to `value`. `extra`, in which unknown fields are kept, is itself no field of a file.
 */
export function separate(schema: z.ZodType, value: unknown, path: Path = []): { known: unknown; unknown: UnknownField[] } {
  const wanted = bare(schema);
  if (wanted instanceof z.ZodArray && Array.isArray(value)) {
    const items = value.map((item, index) => separate(wanted.element as z.ZodType, item, [...path, index]));
    return { known: items.map((item) => item.known), unknown: items.flatMap((item) => item.unknown) };
  }
  const shape = shapeOf(wanted);
  if (!shape || !isFields(value)) return { known: value, unknown: [] };
  const known: Fields = {};
  const unknown: UnknownField[] = [];
  const isKnown = (key: string) => Object.hasOwn(shape, key) && key !== 'extra';
  for (const [key, fieldSchema] of Object.entries(shape)) {
    if (!isKnown(key) || !Object.hasOwn(value, key)) continue;
    const inner = separate(fieldSchema, value[key], [...path, key]);
    setOwn(known, key, inner.known);
    unknown.push(...inner.unknown);
  }
  for (const [key, field] of Object.entries(value)) if (!isKnown(key)) unknown.push({ path: [...path, key], value: field });
  return { known, unknown };
}
