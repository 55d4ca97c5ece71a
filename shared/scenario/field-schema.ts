import * as z from 'zod';
import {type Bounds, type Field, isPlainText, type PairBounds} from '#sim-core/scenario/fields';

/** The last part of a field's path. */
export function keyOf({path}: Field): string {
  return path.slice(path.lastIndexOf('.') + 1);
}

/** Fields below a section, or those of the document itself for ''. */
export function fieldsOf(fields: readonly Field[], section: string): Field[] {
  return fields.filter(({path}) => path.slice(0, Math.max(0, path.lastIndexOf('.'))) === section);
}

/** Keys of one object from its rows of the table; a key that is not required may be left out, never undefined. */
export function shapeOf(fields: readonly Field[]): Record<string, z.ZodType> {
  return Object.fromEntries(
    fields.map((field) => {
      const value = valueOf(field);
      return [keyOf(field), field.required ? value : z.exactOptional(value)];
    }),
  );
}

/** Keys that an act may change: all optional, null takes off those that can be off. */
export function actShapeOf(fields: readonly Field[]): Record<string, z.ZodType> {
  return Object.fromEntries(
    fields.map((field) => {
      const value = valueOf(field);
      return [keyOf(field), z.exactOptional(field.offByNull ? value.nullable() : value)];
    }),
  );
}

/** What may stand in one field. */
export function valueOf(field: Field): z.ZodType {
  const {lowest, highest} = bounds(field);
  switch (field.kind) {
    case 'boolean':
      return z.boolean();
    case 'choice':
      return z.literal([...(field.choices ?? [])]);
    case 'text':
      return z.string().min(lowest).max(highest).refine(isPlainText, 'Must be plain text.');
    case 'whole':
      return z.int().min(lowest).max(highest);
    case 'number':
      return z.number().min(lowest).max(highest);
    case 'pairs':
      return pairs(field.pairs!);
  }
}

function bounds({lowest, highest}: Field): Bounds {
  return {lowest: lowest ?? 0, highest: highest ?? 0};
}

function pairs({x, y, fewest, most, from, to}: PairBounds): z.ZodType {
  return z
    .array(
      z.tuple([z.number().min(x.lowest).max(x.highest), z.number().min(y.lowest).max(y.highest)]),
    )
    .min(fewest)
    .max(most)
    .refine((points) => points.every(([at], place) => at > (points[place - 1]?.[0] ?? -Infinity)), {
      error: 'Each x must be above the one before.',
    })
    .refine((points) => from === undefined || points[0]?.[0] === from, {
      error: `The first x must be ${from ?? ''}.`,
    })
    .refine((points) => to === undefined || points.at(-1)?.[0] === to, {
      error: `The last x must be ${to ?? ''}.`,
    });
}
